/** Other work: the list, one piece, adding one and changing what was written down. */
import type { EntityManager } from 'typeorm';
import type { WorkDto, WorkInput, WorkListDto, WorkQuery } from '@/shared/contract/work';
import { workWeights } from '@/shared/contract/work-terms';
import type { Deps, Member } from '../deps';
import { Work } from '../entities/work';
import { invalid } from '../errors/domain-error';
import { findPlace } from '../repositories/places.repository';
import { findRepair } from '../repositories/repairs.repository';
import { findSkill } from '../repositories/skills.repository';
import {
  countOverWork,
  insertWork,
  listOpenWork,
  listOpenWorkOf,
  listOverWork,
  workNumbers,
} from '../repositories/work.repository';
import { workshopForPlans } from '../repositories/workshop-for-plans.repository';
import { announceBench } from './announce';
import { clockText } from './charge-words';
import { newId } from './ids';
import { refusingTaken } from './unique-taken';
import { inTransaction } from './unit-of-work';
import { refuseChangeInHand } from './work-change-rules';
import { oneWorkDto, workDtos, workState } from './work-dto';
import { loadWorkFile, loadWorkFiles } from './work-file';
import { changeOneWork } from './work-write';

const PAGE_SIZE = 50;
/** Long is half as long again as likely, where nobody says otherwise. A guess. */
const LONG_OF_LIKELY = 1.5;

/**
 * One page of the work that is not over, what is worth most and due first at the top, or of that which is, the last to end
 * first. With a repair only what is for that one, also in the counts.
 */
export async function workList(deps: Deps, member: Member, query: WorkQuery): Promise<WorkListDto> {
  const { manager } = deps.dataSource;
  const { workshopId } = member;
  const page = Number(query.page ?? 1);
  const { repairId } = query;
  // Counts are of all that is open, so it is read whatever is shown: a workshop has some dozens at most.
  const standing = await (repairId === undefined
    ? listOpenWork(manager, workshopId)
    : listOpenWorkOf(manager, workshopId, { repairId }));
  const open = await loadWorkFiles(manager, workshopId, standing.sort(byWorth));
  const from = (page - 1) * PAGE_SIZE;
  const found =
    query.state === 'over'
      ? await loadWorkFiles(
          manager,
          workshopId,
          await listOverWork(manager, workshopId, { repairId, skip: from, take: PAGE_SIZE + 1 }),
        )
      : open.slice(from, from + PAGE_SIZE + 1);
  const counted = (state: 'open' | 'taken' | 'begun') => open.filter((file) => workState(file) === state).length;
  return {
    work: await workDtos(manager, workshopId, found.slice(0, PAGE_SIZE)),
    counts: {
      open: counted('open'),
      taken: counted('taken'),
      begun: counted('begun'),
      over: await countOverWork(manager, workshopId, repairId),
    },
    nextPage: found.length > PAGE_SIZE ? page + 1 : null,
  };
}

const byWorth = (one: Work, other: Work): number =>
  workWeights[other.priority] - workWeights[one.priority] ||
  (one.dueAt ?? Infinity) - (other.dueAt ?? Infinity) ||
  one.createdAt - other.createdAt ||
  one.number.localeCompare(other.number, 'en', { numeric: true });

/** @throws DomainError 404 */
export async function oneWork(deps: Deps, member: Member, id: string): Promise<WorkDto> {
  const { manager } = deps.dataSource;
  return oneWorkDto(manager, member.workshopId, await loadWorkFile(manager, member.workshopId, id));
}

/** @throws DomainError 400 with the field at fault */
export async function addWork(deps: Deps, member: Member, input: WorkInput, now: number): Promise<WorkDto> {
  const { workshopId } = member;
  const work = inTransaction(deps, async (manager) => {
    const columns = columnsOf(input);
    await refuseUnknown(manager, workshopId, input, null);
    await refuseOverdue(manager, workshopId, columns.dueAt, null, now);
    const row: Work = Object.assign(new Work(), columns, {
      id: newId(),
      workshopId,
      number: await nextNumber(manager, workshopId),
      leftMinutes: columns.likelyMinutes,
      leftLongMinutes: columns.longMinutes,
      overAt: null,
      overById: null,
      dropReason: null,
      createdById: member.personId,
      createdAt: now,
      rev: 1,
    });
    await insertWork(manager, row);
    return oneWorkDto(manager, workshopId, { work: row, stints: [] });
  });
  const dto = await refusingTaken(work);
  announceBench(deps, workshopId, now);
  return dto;
}

/**
 * Changes what was written down. While somebody has it in hand, what their stint stands on stays.
 * @throws DomainError 412 stale, 409 where it is over, 400 with the field at fault
 */
export const changeWork = (
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  input: WorkInput,
  now: number,
): Promise<WorkDto> =>
  changeOneWork(deps, member, id, now, { rev }, async (write) => {
    const { manager, file, workshop } = write;
    const { work } = file;
    const columns = columnsOf(input);
    await refuseUnknown(manager, workshop.id, input, work);
    await refuseOverdue(manager, workshop.id, columns.dueAt, work, now);
    await refuseChangeInHand(write, columns);
    // What is done or in hand stays as it is: a longer or shorter estimate is one of what is left.
    const leftMinutes = work.leftMinutes + columns.likelyMinutes - work.likelyMinutes;
    const leftLongMinutes = work.leftLongMinutes + columns.longMinutes - work.longMinutes;
    Object.assign(work, columns, { leftMinutes, leftLongMinutes });
  });

const columnsOf = (input: WorkInput) => ({
  ...input,
  longMinutes: input.longMinutes ?? Math.ceil(input.likelyMinutes * LONG_OF_LIKELY),
  dueAt: input.dueAt === null ? null : Date.parse(input.dueAt),
});
export type WorkColumns = ReturnType<typeof columnsOf>;

/** @throws DomainError 400 with the field that names what the workshop does not have, or what is over */
async function refuseUnknown(
  manager: EntityManager,
  workshopId: string,
  input: WorkInput,
  before: Work | null,
): Promise<void> {
  const { skillId, placeId, repairId } = input;
  if (skillId !== null && !(await findSkill(manager, workshopId, skillId)))
    throw invalid({ skillId: 'This skill is not on the list. Choose another.' });
  if (placeId !== null && !(await findPlace(manager, workshopId, placeId)))
    throw invalid({ placeId: 'This place is not on the list. Choose another.' });
  if (repairId === null || repairId === before?.repairId) return;
  const repair = await findRepair(manager, workshopId, repairId);
  if (!repair) throw invalid({ repairId: 'This repair is not on the list. Choose another.' });
  if (repair.handedOverAt !== null || repair.deletedAt !== null)
    throw invalid({ repairId: `${repair.number} is over. Choose another, or none.` });
}

/** A new due time lies ahead; one that has passed meanwhile may stay. @throws DomainError 400 at `dueAt` */
async function refuseOverdue(
  manager: EntityManager,
  workshopId: string,
  dueAt: number | null,
  before: Work | null,
  now: number,
): Promise<void> {
  if (dueAt === null || dueAt === before?.dueAt || dueAt > now) return;
  const { zone } = await workshopForPlans(manager, workshopId);
  throw invalid({ dueAt: `${clockText(dueAt, zone, now)} is over. Type a time that is still to come, or none.` });
}

/** The number after the highest that was ever given: 'W-0001' is the first. */
async function nextNumber(manager: EntityManager, workshopId: string): Promise<string> {
  const used = (await workNumbers(manager, workshopId)).map((number) => Number(/^W-(\d+)$/.exec(number)?.[1] ?? 0));
  const next = used.reduce((highest, one) => Math.max(highest, one), 0) + 1;
  return `W-${String(next).padStart(4, '0')}`;
}
