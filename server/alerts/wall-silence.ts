/** Walls that the server has not heard of while people work: somebody trusts what stands still there. Called by the sleeper. */
import type { EntityManager } from 'typeorm';
import type { Deps } from '../deps';
import type { Alert } from '../entities/alert';
import type { Wall } from '../entities/wall';
import type { Workshop } from '../entities/workshop';
import { listOpenWallAlerts, toldCauses } from '../repositories/alerts.repository';
import { findWorkshop, peopleById } from '../repositories/charge-stock.repository';
import { listWallsHeardBefore, wallsById } from '../repositories/walls.repository';
import { alertDto } from '../services/alert-dto';
import { clockText } from '../services/charge-words';
import { newId } from '../services/ids';
import { toInstant } from '../services/instants';
import { inTransaction } from '../services/unit-of-work';
import { openingOf } from '../services/working-hours';
import { clearAlert, raiseAlert } from './turns';

/** So long a wall may be silent within the working hours, ms. */
const SILENT_MS = 10 * 60_000;

type Waker = Pick<Deps, 'dataSource' | 'hub' | 'log' | 'outbox'>;

/**
 * Raises an alert for each wall that fell silent, one a silence, and clears it when the wall is heard of again or revoked.
 * @returns how many were raised or cleared
 */
export async function tellSilentWalls(deps: Waker, now: number): Promise<number> {
  const { manager } = deps.dataSource;
  const silent = await listWallsHeardBefore(manager, now - SILENT_MS);
  const told = await toldCauses(manager, silent.map(causeOf));
  const fresh = silent.filter((wall) => !told.has(causeOf(wall)));
  const open = await listOpenWallAlerts(manager);
  let done = 0;
  if (open.length > 0) {
    const walls = await wallsById(manager, [...new Set(open.map((alert) => alert.wallId!))]);
    for (const alert of open) {
      const wall = walls.get(alert.wallId!);
      if (wall && wall.revokedAt === null && causeOf(wall) === alert.cause) continue;
      await inTransaction(deps, (one) => clearAlert(one, alert, now));
      deps.hub.toWorkshop(alert.workshopId, 'alert:changed', { id: alert.id, at: toInstant(now) });
      done += 1;
    }
  }
  for (const wall of fresh) {
    const raised = await inTransaction(deps, (one) => raiseSilence(one, wall, now));
    if (raised === null) continue;
    deps.hub.toWorkshop(wall.workshopId, 'alert:raised', raised);
    deps.outbox.poke();
    done += 1;
  }
  return done;
}

/** One cause a silence: it begins when the wall was last heard of. */
const causeOf = (wall: Wall): string => `wall-unseen:${wall.id}:${wall.lastHeardAt}`;

/** Since when a wall is missed: its last word, or the opening where that came later; null: nobody is there to look at it. */
export function missedSince(wall: Pick<Wall, 'lastHeardAt'>, workshop: Workshop, now: number): number | null {
  const opening = openingOf(workshop, now);
  if (wall.lastHeardAt === null || opening === null || now < opening.from || now >= opening.to) return null;
  const since = Math.max(wall.lastHeardAt, opening.from);
  return now - since >= SILENT_MS ? since : null;
}

async function raiseSilence(manager: EntityManager, wall: Wall, now: number) {
  const workshop = await findWorkshop(manager, wall.workshopId);
  const since = workshop === null ? null : missedSince(wall, workshop, now);
  if (workshop === null || since === null) return null;
  const alert: Alert = {
    id: newId(),
    workshopId: wall.workshopId,
    cause: causeOf(wall),
    kind: 'wall-unseen',
    level: 'tell',
    chargeId: null,
    wallId: wall.id,
    personId: null,
    title: wall.name,
    seen: `It was last heard of at ${clockText(wall.lastHeardAt!, workshop.zone, now)}. What it shows is old.`,
    checkFirst: 'Its power, then its network. A wall that is not needed any more is taken off under Workshop.',
    raisedAt: now,
    lateByS: 0,
    takenById: null,
    takenAt: null,
    passedAt: null,
    turn: 0,
    forRole: 'foreman',
    passDueAt: null,
    clearedAt: null,
  };
  await raiseAlert(manager, alert, workshop, now);
  return alertDto(alert, await peopleById(manager, wall.workshopId));
}
