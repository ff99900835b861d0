/** Repairs: the list, the page, booking one and changing what was booked. */
import type { EntityManager } from 'typeorm';
import type {
  ChangeRepairInput,
  RepairCardDto,
  RepairInput,
  RepairListDto,
  RepairPageDto,
  RepairsQuery,
} from '@/shared/contract/repair';
import type { Deps, Member } from '../deps';
import { Repair } from '../entities/repair';
import { invalid } from '../errors/domain-error';
import { peopleById } from '../repositories/charge-stock.repository';
import { findPackType } from '../repositories/pack-types.repository';
import { countOpenWaits, replacePeople } from '../repositories/repair-rows.repository';
import {
  adoptCharges,
  countRepairs,
  findRepairNumbered,
  insertRepair,
  listOpenRepairs,
  listRepairs,
  repairNumbers,
} from '../repositories/repairs.repository';
import { newId } from './ids';
import { nameTaken } from './name-taken';
import { packColumnsOf, refuseOddPack } from './pack-rules';
import { repairCard, repairPageOf } from './repair-dto';
import { loadRepairFile, loadRepairFiles } from './repair-file';
import { announceRepair, changeRepair, settleRepair } from './repair-write';
import { refusingTaken } from './unique-taken';
import { inTransaction } from './unit-of-work';

const PAGE_SIZE = 50;

/** One page of the repairs in a state; the open ones by what needs somebody, then by module ready, then by promise. */
export async function repairs(deps: Deps, member: Member, query: RepairsQuery, now: number): Promise<RepairListDto> {
  const { manager } = deps.dataSource;
  const { workshopId } = member;
  const page = Number(query.page ?? 1);
  const looked = query.q?.trim().toLowerCase() ?? '';
  const state = query.state ?? 'open';
  // Counts are of all open ones, so these are read whatever is shown: a workshop has some dozens at most.
  const open = await loadRepairFiles(manager, workshopId, await listOpenRepairs(manager, workshopId));
  const cards = open.map((file) => ({ card: repairCard(file, now), searched: file.repair.searchText }));
  const found =
    state === 'open'
      ? inOrder(cards.filter(({ searched }) => searched.includes(looked)).map(({ card }) => card)).slice(
          (page - 1) * PAGE_SIZE,
          page * PAGE_SIZE + 1,
        )
      : await cardsOf(manager, workshopId, state, looked, page, now);
  return {
    repairs: found.slice(0, PAGE_SIZE),
    counts: {
      open: cards.length,
      needsSomebody: cards.filter(({ card }) => card.needsSomebody).length,
      waiting: await countOpenWaits(manager, workshopId),
      handedOver: await countRepairs(manager, workshopId, 'handed-over'),
    },
    nextPage: found.length > PAGE_SIZE ? page + 1 : null,
  };
}

/** One more than a page, where there is one more. */
async function cardsOf(
  manager: EntityManager,
  workshopId: string,
  state: 'handed-over' | 'archived' | 'deleted',
  looked: string,
  page: number,
  now: number,
): Promise<RepairCardDto[]> {
  const rows = await listRepairs(manager, workshopId, state, looked, page, PAGE_SIZE);
  const [next] = await listRepairs(manager, workshopId, state, looked, page * PAGE_SIZE + 1, 1);
  const files = await loadRepairFiles(manager, workshopId, next ? [...rows, next] : rows);
  return files.map((file) => repairCard(file, now));
}

const last = Number.MAX_SAFE_INTEGER;
const instantOr = (instant: string | null | undefined): number => (instant ? Date.parse(instant) : last);

const inOrder = (cards: RepairCardDto[]): RepairCardDto[] =>
  [...cards].sort(
    (one, other) =>
      Number(other.needsSomebody) - Number(one.needsSomebody) ||
      readyAt(one) - readyAt(other) ||
      instantOr(one.promisedAt) - instantOr(other.promisedAt) ||
      one.number.localeCompare(other.number, 'en', { numeric: true }),
  );

/** When its module is, or was, ready, epoch ms. */
const readyAt = ({ charge }: RepairCardDto): number => instantOr(charge?.readyAt ?? charge?.ready?.likely);

/** @throws DomainError 404 */
export const repair = (deps: Deps, member: Member, id: string, now: number): Promise<RepairPageDto> =>
  repairPageOf(deps.dataSource.manager, member.workshopId, id, now);

/**
 * Books a repair. Open charges that name its number already are its own from now.
 * @throws DomainError 409 number taken, 400 with the field at fault
 */
export async function addRepair(deps: Deps, member: Member, input: RepairInput, now: number): Promise<RepairPageDto> {
  const { workshopId } = member;
  const booked = inTransaction(deps, async (manager) => {
    const number = await freeNumber(manager, workshopId, input.number ?? null);
    await refuseUnknown(manager, workshopId, input);
    const row: Repair = Object.assign(new Repair(), columnsOf(input), {
      id: newId(),
      workshopId,
      number,
      target: null,
      spareId: null,
      spareAt: null,
      spareById: null,
      bookedAt: now,
      bookedById: member.personId,
      handedOverAt: null,
      handedOverById: null,
      handOverNote: null,
      archivedAt: null,
      deletedAt: null,
      deletedById: null,
      deleteReason: null,
      erasedAt: null,
      erasedById: null,
      eraseReason: null,
      searchText: '',
      rev: 0,
      createdAt: now,
    });
    await insertRepair(manager, row);
    await writePeople(manager, row, input.personIds);
    await adoptCharges(manager, workshopId, row);
    const file = await loadRepairFile(manager, workshopId, row.id);
    await settleRepair(manager, file, now, member.personId, [{ text: `booked ${input.vehicle}`, at: now }]);
    return repairPageOf(manager, workshopId, row.id, now);
  });
  const dto = await refusingTaken(booked);
  announceRepair(deps, workshopId, dto, now);
  return dto;
}

/**
 * Changes what was booked.
 * @throws DomainError 412 stale, 400 with the field at fault: the groups of a pack that was read stay as many
 */
export const changeBooked = (
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  input: ChangeRepairInput,
  now: number,
): Promise<RepairPageDto> =>
  changeRepair(deps, member, id, now, { rev, whileIn: ['open', 'handed-over'] }, async ({ manager, file, note }) => {
    const { repair } = file;
    await refuseUnknown(manager, member.workshopId, input);
    const read = file.readings.some(({ setAsideAt }) => setAsideAt === null);
    if (read && input.pack.groupCount !== repair.groupCount)
      throw invalid({
        'pack.groupCount': `This pack was read with ${repair.groupCount} groups. Set its readings aside first, or leave it.`,
      });
    Object.assign(repair, columnsOf(input));
    await writePeople(manager, repair, input.personIds);
    note('changed what was booked');
  });

function columnsOf(input: ChangeRepairInput) {
  return {
    ...packColumnsOf(input.pack),
    vehicle: input.vehicle,
    packTypeId: input.packTypeId,
    customerName: input.customerName,
    customerContact: input.customerContact,
    promisedAt: input.promisedAt === null ? null : Date.parse(input.promisedAt),
    bay: input.bay,
    note: input.note,
  };
}

async function writePeople(manager: EntityManager, repair: Repair, personIds: readonly string[]): Promise<void> {
  const { id: repairId, workshopId } = repair;
  const rows = [...new Set(personIds)].map((personId, place) => ({
    id: newId(),
    workshopId,
    repairId,
    personId,
    place,
  }));
  await replacePeople(manager, workshopId, repairId, rows);
}

/** @throws DomainError 400 with the field that names what the workshop does not have */
async function refuseUnknown(manager: EntityManager, workshopId: string, input: ChangeRepairInput): Promise<void> {
  await refuseOddPack(manager, workshopId, input.pack);
  if (input.packTypeId !== null && !(await findPackType(manager, workshopId, input.packTypeId)))
    throw invalid({ packTypeId: 'This pack type is not on the list. Choose another.' });
  const people = await peopleById(manager, workshopId);
  const unknown = input.personIds.findIndex((id) => !people.has(id));
  if (unknown >= 0) throw invalid({ [`personIds.${unknown}`]: 'This person is not on the list. Choose another.' });
}

/** The typed number, or the one after the highest 'R-…' that the workshop has ever used. */
async function freeNumber(manager: EntityManager, workshopId: string, typed: string | null): Promise<string> {
  if (typed !== null) {
    if (await findRepairNumbered(manager, workshopId, typed))
      throw nameTaken('number', `There is a repair ${typed} already. Type another number, or none.`);
    return typed;
  }
  const used = (await repairNumbers(manager, workshopId)).map((number) =>
    Number(/^R-(\d{1,9})$/.exec(number)?.[1] ?? 0),
  );
  return `R-${used.reduce((highest, one) => Math.max(highest, one), 0) + 1}`;
}
