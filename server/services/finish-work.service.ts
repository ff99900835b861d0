/** The end of a piece of work by other ways than doing it: dropped, with its repair, or with a person who leaves. */
import type { EntityManager } from 'typeorm';
import type { WorkDto } from '@/shared/contract/work';
import type { Deps, Member } from '../deps';
import type { Repair } from '../entities/repair';
import { conflict } from '../errors/domain-error';
import { personRefs } from '../repositories/person-refs.repository';
import { findPlace } from '../repositories/places.repository';
import { findRepair } from '../repositories/repairs.repository';
import { findSkill } from '../repositories/skills.repository';
import { listOpenWorkOf, listOverWorkOf, listStandingStints, updateStint } from '../repositories/work.repository';
import { workshopForPlans } from '../repositories/workshop-for-plans.repository';
import { clockText } from './charge-words';
import { returnStint } from './stints.service';
import { loadWorkFile, loadWorkFiles, standing, type WorkFile } from './work-file';
import { changeOneWork, saveWork, type Acting } from './work-write';

/** It is not to be done any more; whoever has taken it has it no longer. @throws DomainError 409 while somebody is at it */
export const dropWork = (
  deps: Deps,
  member: Member,
  id: string,
  input: { reason: string },
  now: number,
): Promise<WorkDto> =>
  changeOneWork(deps, member, id, now, {}, async (write) => {
    const { manager, file, workshop } = write;
    const begun = file.stints.find(({ state }) => state === 'begun');
    if (begun) {
      const who = (await personRefs(manager, workshop.id)).get(begun.personId)?.name ?? '';
      const since = clockText(begun.fromAt, workshop.zone, now);
      throw conflict('at_work', `${who} is at it since ${since}. End that first, or give it back.`);
    }
    await drop(write, file, input.reason);
  });

async function drop(acting: Acting, file: WorkFile, dropReason: string): Promise<void> {
  for (const stint of standing(file)) await returnStint(acting, file, stint);
  Object.assign(file.work, { overAt: acting.now, overById: acting.member.personId, dropReason });
}

/**
 * Brings back what is over. Of dropped work is left what was; of done work what the stint took that ended last: it was not
 * done after all. What has gone from the lists meanwhile it needs no longer.
 * @throws DomainError 409 where it is not over, or its repair is
 */
export const reopenWork = (deps: Deps, member: Member, id: string, now: number): Promise<WorkDto> =>
  changeOneWork(deps, member, id, now, { over: true }, async ({ manager, file, workshop }) => {
    const { work } = file;
    const repair = work.repairId === null ? null : await findRepair(manager, workshop.id, work.repairId);
    if (repair && (repair.handedOverAt !== null || repair.deletedAt !== null))
      throw conflict('wrong_state', `${repair.number}, which it is for, is over. Add new work instead.`);
    await reopen(manager, file);
  });

async function reopen(manager: EntityManager, file: WorkFile): Promise<void> {
  const { work } = file;
  const { workshopId } = work;
  if (work.dropReason === null) {
    const done = file.stints.filter(({ state }) => state === 'done');
    const last = done.sort((one, other) => (other.endedAt ?? 0) - (one.endedAt ?? 0))[0];
    work.leftMinutes += last?.likelyMinutes ?? work.likelyMinutes;
    work.leftLongMinutes += last?.longMinutes ?? work.longMinutes;
    if (last) await updateStint(manager, workshopId, last.id, { likelyMinutes: 0, longMinutes: 0 });
  }
  const skill = work.skillId === null ? null : await findSkill(manager, workshopId, work.skillId);
  const place = work.placeId === null ? null : await findPlace(manager, workshopId, work.placeId);
  Object.assign(work, {
    ...{ skillId: skill?.id ?? null, placeId: place?.id ?? null },
    ...{ overAt: null, overById: null, dropReason: null },
  });
}

const overReason = ({ number, deletedAt }: Pick<Repair, 'number' | 'deletedAt'>): string =>
  `${number} was ${deletedAt === null ? 'handed over' : 'deleted'}.`;

/**
 * Drops what is open of the work for a repair that is over from now on, in its transaction. Whoever is at some of it has
 * done that much.
 */
export async function dropWorkOfRepair(
  manager: EntityManager,
  member: Member,
  repair: Repair,
  now: number,
): Promise<void> {
  const { workshopId } = repair;
  const acting: Acting = { manager, workshop: await workshopForPlans(manager, workshopId), member, now };
  const open = await listOpenWorkOf(manager, workshopId, { repairId: repair.id });
  for (const file of await loadWorkFiles(manager, workshopId, open)) {
    const begun = file.stints.filter(({ state }) => state === 'begun');
    for (const stint of begun) {
      Object.assign(stint, { state: 'done', endedAt: now, toAt: Math.max(now, stint.fromAt + 1000) });
      await updateStint(manager, workshopId, stint.id, { state: 'done', endedAt: now, toAt: stint.toAt });
    }
    await drop(acting, file, overReason(repair));
    await saveWork(manager, file);
  }
}

/** Brings back the work that went with a repair which is brought back; before the repair's own columns are cleared. */
export async function restoreWorkOfRepair(manager: EntityManager, repair: Repair): Promise<void> {
  const { workshopId, id, deletedAt } = repair;
  if (deletedAt === null || repair.handedOverAt !== null) return;
  const gone = (await listOverWorkOf(manager, workshopId, id)).filter(
    ({ overAt, dropReason }) => overAt === deletedAt && dropReason === overReason(repair),
  );
  for (const file of await loadWorkFiles(manager, workshopId, gone)) {
    await reopen(manager, file);
    await saveWork(manager, file);
  }
}

/** Gives back everything that somebody has in hand who is there no more, in the transaction of their leaving. */
export async function giveBackAllOf(
  manager: EntityManager,
  member: Member,
  personId: string,
  now: number,
): Promise<void> {
  const { workshopId } = member;
  const acting: Acting = { manager, workshop: await workshopForPlans(manager, workshopId), member, now };
  for (const stint of await listStandingStints(manager, workshopId, personId)) {
    // Read anew for each: two stints may be parts of one piece.
    const file = await loadWorkFile(manager, workshopId, stint.workId);
    await returnStint(acting, file, stint);
    await saveWork(manager, file);
  }
}
