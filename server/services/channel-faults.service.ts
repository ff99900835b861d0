/** Somebody says that a channel is out of order, or that it works again: the charges on it hear of it in the same transaction. */
import type { EntityManager } from 'typeorm';
import type { ChannelFaultInput, ChargerDto } from '@/shared/contract/equipment';
import type { Deps, Member } from '../deps';
import type { Channel } from '../entities/channel';
import { conflict, notFound } from '../errors/domain-error';
import { findChannel, saveChannels } from '../repositories/chargers.repository';
import { findWorkshop, peopleById } from '../repositories/charge-stock.repository';
import { findCharge } from '../repositories/charges.repository';
import { listOpenHolds } from '../repositories/open-holds.repository';
import { announceEquipment } from './announce';
import { faultWords, isFaulty } from './channel-fault';
import type { Note } from './charge-progress';
import { loadFiles } from './charge-file';
import { clockText } from './charge-words';
import { announce, settle, type Announcement } from './charge-write';
import { charger } from './chargers.service';
import { inTransaction } from './unit-of-work';

/**
 * A channel is out of order from now on: plans leave it out, no charge starts on it, and each charge that has it or is to
 * have it gets its alert. Bidewell switches nothing: whoever stands at it does.
 * @throws DomainError 404 unknown or out of service, 409 where somebody has said so already
 */
export function channelFailed(
  deps: Deps,
  member: Member,
  id: string,
  { seen }: ChannelFaultInput,
  now: number,
): Promise<ChargerDto> {
  return changeChannel(deps, member, id, now, async (manager, channel) => {
    if (isFaulty(channel)) {
      const people = await peopleById(manager, member.workshopId);
      const zone = (await findWorkshop(manager, member.workshopId))?.zone ?? 'UTC';
      const who = people.get(channel.faultById ?? '')?.name ?? 'Somebody';
      throw conflict(
        'fault_known',
        `${who} has said so at ${clockText(channel.faultAt, zone, now)}: ${faultWords(channel)}`,
      );
    }
    Object.assign(channel, { faultAt: now, faultSeen: seen, faultById: member.personId });
    return { kind: 'channel-failed', text: isFaulty(channel) ? faultWords(channel) : '' };
  });
}

/**
 * A channel is in order again: plans offer it, and the alerts about it are over.
 * @throws DomainError 404 unknown or out of service, 409 where nothing was wrong with it
 */
export const channelWorks = (deps: Deps, member: Member, id: string, now: number): Promise<ChargerDto> =>
  changeChannel(deps, member, id, now, async (_, channel) => {
    if (!isFaulty(channel)) throw conflict('no_fault', `Nobody has said that ${channel.name} is out of order.`);
    Object.assign(channel, { faultAt: null, faultSeen: null, faultById: null });
    return { kind: 'channel-works', text: `${channel.name} is in order again.` };
  });

async function changeChannel(
  deps: Deps,
  member: Member,
  id: string,
  now: number,
  change: (manager: EntityManager, channel: Channel) => Promise<Pick<Note, 'kind' | 'text'>>,
): Promise<ChargerDto> {
  const { workshopId, personId } = member;
  const { chargerId, announcements } = await inTransaction(deps, async (manager) => {
    const channel = await findChannel(manager, workshopId, id);
    if (!channel || channel.retired) throw notFound('This channel');
    const note = { at: now, personId, ...(await change(manager, channel)) };
    await saveChannels(manager, [channel]);
    const told = await tellCharges(manager, workshopId, id, note, now);
    return { chargerId: channel.chargerId, announcements: told };
  });
  announceEquipment(deps, member, now);
  for (const one of announcements) announce(deps, one, now);
  return charger(deps, member, chargerId, now);
}

async function tellCharges(
  manager: EntityManager,
  workshopId: string,
  channelId: string,
  note: Note,
  now: number,
): Promise<Announcement[]> {
  const holds = await listOpenHolds(manager, workshopId);
  const ids = new Set(holds.filter(({ hold }) => hold.channelId === channelId).map(({ charge }) => charge.id));
  const announcements: Announcement[] = [];
  for (const id of ids) {
    const charge = await findCharge(manager, workshopId, id);
    if (!charge) continue;
    const [file] = await loadFiles(manager, workshopId, [charge]);
    announcements.push({ ...(await settle(manager, file!, now, [note])), channels: true });
  }
  return announcements;
}
