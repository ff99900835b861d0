/**
 * The one way a charge is changed: in one transaction the rows are read, the revision is compared, the act is done, the
 * charge is brought to what its numbers say, alerts and look-ins follow, and the board is counted up. What screens must
 * hear is announced after the commit.
 */
import type { EntityManager } from 'typeorm';
import type { ChargeDto } from '@/shared/contract/charge';
import type { Deps, Member } from '../deps';
import type { Alert } from '../entities/alert';
import type { Charge } from '../entities/charge';
import type { ChargeEvent } from '../entities/charge-event';
import type { LookIn } from '../entities/look-in';
import { deleteLookIns, insertEvents, insertLookIns } from '../repositories/charge-rows.repository';
import { raiseBoardRev, updateCharge } from '../repositories/charges.repository';
import { alertDto } from './alert-dto';
import { syncAlerts, type AlertChanges } from './charge-alerts';
import { nextDueAt } from './charge-due';
import { chargeDto } from './charge-dto';
import { loadFile, type ChargeFile } from './charge-file';
import { syncHolds } from './charge-holds';
import { lookInChanges } from './charge-look-ins';
import { isWrongStage } from './charge-stage-conflict';
import { progress, type Note } from './charge-progress';
import { newId } from './ids';
import { toInstant } from './instants';
import { announceRepair } from './repair-write';
import { followCharge, type RepairRev } from './repair-charges';
import { refusingTaken } from './unique-taken';
import { inTransaction } from './unit-of-work';
import { recordWaits } from './waits/record-waits';
import { lastChange, staleCharge, toldBy } from './who-changed';

export interface ChargeWrite {
  manager: EntityManager;
  file: ChargeFile;
  member: Member;
  now: number;
  /** Writes a line into the log of the charge. */
  note: (kind: string, text: string, at?: number) => void;
  /** Alerts that have gone over to somebody else, to be told to that person. */
  passed: Alert[];
}

/** What is announced after the commit. */
export interface Announcement {
  workshopId: string;
  boardRev: number;
  charge: Pick<Charge, 'id' | 'rev'>;
  alerts: AlertChanges;
  /** Alerts that are somebody else's from now. */
  passed?: Alert[];
  /** Where the spare stands has changed; who holds which channel has. */
  stock: boolean;
  channels: boolean;
  /** Its repair, which has followed it; null or left out: none. */
  repair?: RepairRev | null;
  people: ChargeFile['people'];
}

/**
 * Does one act of a person on a charge.
 * @param rev revision the person saw; null where the act does not depend on it
 * @throws DomainError 404 unknown charge, 412 with the present charge where somebody else was quicker
 */
export async function changeCharge(
  deps: Deps,
  member: Member,
  id: string,
  rev: number | null,
  now: number,
  act: (write: ChargeWrite) => Promise<void> | void,
): Promise<ChargeDto> {
  const changed = inTransaction(deps, async (manager) => {
    const file = await loadFile(manager, member.workshopId, id);
    const last = () => lastChange(manager, file, member, now);
    if (rev !== null && file.charge.rev !== rev)
      throw staleCharge(await chargeDto(manager, deps.config, file, member, now), await last());
    const notes: Note[] = [];
    const write: ChargeWrite = {
      manager,
      file,
      member,
      now,
      note: (kind, text, at = now) => notes.push({ at, kind, personId: member.personId, text }),
      passed: [],
    };
    try {
      await act(write);
    } catch (error) {
      // Who names a revision has seen the stage; who names none hears who brought it there.
      throw rev === null && isWrongStage(error) ? toldBy(error, await last()) : error;
    }
    file.charge.rev += 1;
    const done = await settle(manager, file, now, notes);
    return {
      dto: await chargeDto(manager, deps.config, file, member, now),
      announcement: { ...done, passed: write.passed },
    };
  });
  const { dto, announcement } = await refusingTaken(changed);
  announce(deps, announcement, now);
  return dto;
}

/** Columns that a charge changes in its life, beside its plan. */
const living = [
  'personId',
  'stage',
  'heldFrom',
  'reckoning',
  'clipOnAt',
  'plannedEarlyAt',
  'plannedLikelyAt',
  'plannedLateAt',
  'earlyAt',
  'likelyAt',
  'lateAt',
  'queuedAt',
  'startedAt',
  'taperAt',
  'currentEndAt',
  'currentOffSaid',
  'checkDueAt',
  'checkedAt',
  'readyAt',
  'closedAt',
  'heldAt',
  'stoppedAt',
  'stopReason',
  'nextDueAt',
  'rev',
] as const satisfies readonly (keyof Charge)[];

/** Brings a charge to `now` and writes it, with all that follows from it. */
export async function settle(
  manager: EntityManager,
  file: ChargeFile,
  now: number,
  notes: Note[],
): Promise<Announcement> {
  const { charge } = file;
  const stageBefore = charge.stage;
  const storedStage = file.storedStage;
  const dueWas = charge.nextDueAt;
  const happened = progress(file, now);
  // A person who saw 'charging' must not act on 'resting' without knowing. A mere refresh of the levels is no new revision.
  if (charge.stage !== stageBefore) charge.rev += 1;
  const channels = await syncHolds(manager, file, now);
  await syncLookIns(manager, file, now);
  const alerts = await syncAlerts(manager, file, now, dueWas);
  charge.nextDueAt = nextDueAt(file, now);
  const patch = Object.fromEntries(living.map((column) => [column, charge[column]]));
  await updateCharge(manager, charge.workshopId, charge.id, patch as Partial<Charge>);
  await insertEvents(
    manager,
    [...notes, ...happened].map((note, place) => eventOf(charge, note, now + place)),
  );
  const repair = await followCharge(manager, file, now, [...notes, ...happened]);
  // That of a charge with a repair follows the repair's wait.
  if (repair === null) await recordWaits(manager, file.workshop, [charge]);
  const boardRev = await raiseBoardRev(manager, charge.workshopId);
  const stock = charge.stage !== storedStage;
  return {
    workshopId: charge.workshopId,
    boardRev,
    charge,
    alerts,
    people: file.people,
    stock,
    repair,
    channels: channels || stock,
  };
}

/** Lines written together keep their order by their instants of writing. */
const eventOf = (charge: Charge, note: Note, createdAt: number): ChargeEvent => ({
  id: newId(),
  workshopId: charge.workshopId,
  chargeId: charge.id,
  at: note.at,
  kind: note.kind,
  personId: note.personId,
  text: note.text,
  createdAt,
});

async function syncLookIns(manager: EntityManager, file: ChargeFile, now: number): Promise<void> {
  const { charge } = file;
  const { add, drop } = lookInChanges(file, now);
  const added = add.map((dueAt): LookIn => ({
    id: newId(),
    workshopId: charge.workshopId,
    chargeId: charge.id,
    dueAt,
    doneAt: null,
    personId: null,
    note: null,
  }));
  const dropped = new Set(drop.map((lookIn) => lookIn.id));
  await deleteLookIns(manager, charge.workshopId, [...dropped]);
  await insertLookIns(manager, added);
  if (added.length === 0 && dropped.size === 0) return;
  file.lookIns = [...file.lookIns.filter((lookIn) => !dropped.has(lookIn.id)), ...added].sort(
    (one, other) => one.dueAt - other.dueAt,
  );
}

/** Tells the workshop's screens what was committed, and the sleeper that it may have to wake earlier. */
export function announce(deps: Pick<Deps, 'hub' | 'sleeper' | 'outbox'>, done: Announcement, now: number): void {
  const at = toInstant(now);
  const { workshopId, charge, alerts } = done;
  deps.hub.toWorkshop(workshopId, 'board:changed', { rev: done.boardRev, at, chargeId: charge.id });
  deps.hub.toWorkshop(workshopId, 'charge:changed', { id: charge.id, rev: charge.rev, at });
  if (done.repair) announceRepair(deps, workshopId, done.repair, now);
  if (done.stock) deps.hub.toWorkshop(workshopId, 'stock:changed', { at });
  if (done.channels) deps.hub.toWorkshop(workshopId, 'equipment:changed', { at });
  for (const alert of alerts.raised)
    deps.hub.toWorkshop(workshopId, 'alert:raised', alertDto(alert as Alert, done.people));
  for (const alert of done.passed ?? []) {
    // What the same act has settled is nobody's to hear any more.
    if (alert.personId === null || alerts.changed.includes(alert.id)) continue;
    deps.hub.toPerson(workshopId, alert.personId, 'alert:raised', alertDto(alert, done.people));
    deps.hub.toWorkshop(workshopId, 'alert:changed', { id: alert.id, at });
  }
  for (const id of alerts.changed) deps.hub.toWorkshop(workshopId, 'alert:changed', { id, at });
  deps.sleeper.poke();
  deps.outbox.poke();
}
