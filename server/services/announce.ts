import type { Deps, Member } from '../deps';
import { toInstant } from './instants';

/** Tells the workshop's screens to read the equipment again; after the commit. */
export const announceEquipment = (deps: Deps, member: Member, now: number): void =>
  deps.hub.toWorkshop(member.workshopId, 'equipment:changed', { at: toInstant(now) });

/** Tells the workshop's screens to read the stock again; after the commit. */
export const announceStock = (deps: Deps, member: Member, now: number): void =>
  deps.hub.toWorkshop(member.workshopId, 'stock:changed', { at: toInstant(now) });

/** Tells the workshop's screens to read other work, hours, places and the bench plan again; after the commit. */
export const announceBench = (deps: Pick<Deps, 'hub'>, workshopId: string, now: number): void =>
  deps.hub.toWorkshop(workshopId, 'bench:changed', { at: toInstant(now) });
