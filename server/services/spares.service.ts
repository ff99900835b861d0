/** The shelf: what is in stock, where it is and how each spare may be changed. */
import type { EntityManager } from 'typeorm';
import type { NewSpareInput, SpareDto, SpareHistoryDto, SpareInput, SparesQuery } from '@/shared/contract/spare';
import type { Deps, Member } from '../deps';
import { Spare } from '../entities/spare';
import { invalid, stale } from '../errors/domain-error';
import { listModuleTypes } from '../repositories/module-types.repository';
import { personRefs } from '../repositories/person-refs.repository';
import { capacitiesBySpare, insertSpareCapacity } from '../repositories/spare-capacities.repository';
import { lastMoveOf, lastMoves } from '../repositories/spare-moves.repository';
import {
  findLastSpareReading,
  findSpareLabelled,
  insertSpareReading,
  lastSpareReadings,
  listChargesOfSpare,
  listSpareReadings,
  listSpares,
  openChargesBySpare,
  saveSpare,
} from '../repositories/spares.repository';
import { announceStock } from './announce';
import { titleOf } from './charge-words';
import { newId } from './ids';
import { toInstant } from './instants';
import { nameTaken } from './name-taken';
import { usedCapacity } from './spare-capacity';
import { knownSpare, spareDtoOf, typeOf } from './spare-file';
import { readingRow } from './spare-readings.service';
import { spareDto, spareReadingDto } from './spares-dto';
import { inTransaction } from './unit-of-work';

/** Spares by label; `q` looks in label, type and shelf place. */
export async function spares(deps: Deps, member: Member, query: SparesQuery): Promise<SpareDto[]> {
  const manager = deps.dataSource.manager;
  const { workshopId } = member;
  const types = new Map((await listModuleTypes(manager, workshopId)).map((type) => [type.id, type]));
  const readings = await lastSpareReadings(manager, workshopId);
  const charges = await openChargesBySpare(manager, workshopId);
  const moves = await lastMoves(manager, workshopId);
  const people = await personRefs(manager, workshopId);
  const capacities = await capacitiesBySpare(manager, workshopId);
  const looked = query.q?.trim().toLowerCase() ?? '';
  return (await listSpares(manager, workshopId)).flatMap((spare) => {
    const type = types.get(spare.moduleTypeId);
    if (!type || (query.moduleTypeId !== undefined && type.id !== query.moduleTypeId)) return [];
    const dto = spareDto(spare, type, {
      reading: readings.get(spare.id),
      charge: charges.get(spare.id),
      move: moves.get(spare.id),
      people,
      capacities: capacities.get(spare.id) ?? [],
    });
    if (query.where === undefined ? dto.where === 'fitted' : dto.where !== query.where) return [];
    const found = [dto.label, dto.typeName, dto.shelfPlace ?? ''].some((text) => text.toLowerCase().includes(looked));
    return found ? [dto] : [];
  });
}

export const spare = (deps: Deps, member: Member, id: string): Promise<SpareDto> =>
  spareDtoOf(deps.dataSource.manager, member.workshopId, id);

export async function spareHistory(deps: Deps, member: Member, id: string): Promise<SpareHistoryDto> {
  const manager = deps.dataSource.manager;
  const { workshopId } = member;
  await knownSpare(manager, workshopId, id);
  const people = await personRefs(manager, workshopId);
  const move = (await lastMoveOf(manager, workshopId, id)) ?? undefined;
  const readings = await listSpareReadings(manager, workshopId, id);
  return {
    readings: readings.map((reading) => spareReadingDto(reading, people, move)),
    charges: (await listChargesOfSpare(manager, workshopId, id)).map((charge) => ({
      id: charge.id,
      title: titleOf(charge),
      stage: charge.stage,
      at: toInstant(charge.createdAt),
      targetVolts: charge.targetVolts,
    })),
  };
}

/** @throws DomainError 409 label taken, 400 with the field at fault */
export async function addSpare(deps: Deps, member: Member, input: NewSpareInput, now: number): Promise<SpareDto> {
  const { workshopId } = member;
  const { reading, ...columns } = input;
  const dto = await inTransaction(deps, async (manager) => {
    await refuseTakenLabel(manager, workshopId, input.label, null);
    refuseUnmeasured(input);
    const type = await typeOf(manager, workshopId, input.moduleTypeId);
    const row = Object.assign(new Spare(), columns, {
      id: newId(),
      workshopId,
      capacitySdAh: null,
      quarantineReason: null,
      quarantinedAt: null,
      quarantinedById: null,
      fittedAt: null,
      rev: 1,
      createdAt: now,
    });
    const first = await readingRow(manager, member, row.id, type, reading, now, 'reading.');
    await saveSpare(manager, row);
    await insertSpareReading(manager, first);
    await noteTyped(manager, member, row, now);
    return spareDtoOf(manager, workshopId, row.id);
  });
  announceStock(deps, member, now);
  return dto;
}

/** @throws DomainError 412 stale, 409 label taken, 400 with the field at fault */
export async function changeSpare(
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  input: SpareInput,
  now: number,
): Promise<SpareDto> {
  const { workshopId } = member;
  const dto = await inTransaction(deps, async (manager) => {
    const row = await knownSpare(manager, workshopId, id);
    if (row.rev !== rev) throw stale(await spareDtoOf(manager, workshopId, id));
    await refuseTakenLabel(manager, workshopId, input.label, id);
    refuseUnmeasured(input);
    if (input.moduleTypeId !== row.moduleTypeId) await refuseOtherType(manager, workshopId, row, input.moduleTypeId);
    const typed =
      input.capacityAh !== row.capacityAh ||
      input.healthPercent !== row.healthPercent ||
      input.capacitySource !== row.capacitySource;
    // What a charge has told of the doubt belongs to the number that it told.
    if (typed) row.capacitySdAh = null;
    await saveSpare(manager, Object.assign(row, input, { rev: rev + 1 }));
    if (typed) await noteTyped(manager, member, row, now);
    return spareDtoOf(manager, workshopId, id);
  });
  announceStock(deps, member, now);
  return dto;
}

/** A capacity in ampere-hours that somebody has typed, with what its source is good for. */
async function noteTyped(manager: EntityManager, member: Member, row: Spare, now: number): Promise<void> {
  if (row.capacityAh === null) return;
  const { capacityAh, sdAh } = usedCapacity(row, { ratedAh: row.capacityAh });
  await insertSpareCapacity(manager, {
    id: newId(),
    workshopId: row.workshopId,
    spareId: row.id,
    ampHours: capacityAh,
    sdAh,
    source: 'typed',
    state: 'used',
    apart: null,
    chargeId: null,
    at: now,
    personId: member.personId,
  });
}

async function refuseTakenLabel(
  manager: EntityManager,
  workshopId: string,
  label: string,
  ownId: string | null,
): Promise<void> {
  const other = await findSpareLabelled(manager, workshopId, label);
  if (other && other.id !== ownId)
    throw nameTaken('label', `There is a spare labelled ${label} already. Each spare has its own label.`);
}

function refuseUnmeasured(input: Pick<SpareInput, 'capacityAh' | 'healthPercent' | 'capacitySource'>): void {
  if (input.capacitySource === 'measured' && input.capacityAh === null && input.healthPercent === null)
    throw invalid({ capacityAh: 'Type what was measured, in Ah or as health. Else choose label or guessed.' });
}

/** Another type must have as many groups as the readings, and a charge keeps the type it was planned with. */
async function refuseOtherType(manager: EntityManager, workshopId: string, row: Spare, typeId: string): Promise<void> {
  const type = await typeOf(manager, workshopId, typeId);
  const charge = (await openChargesBySpare(manager, workshopId)).get(row.id);
  if (charge)
    throw invalid({ moduleTypeId: `${row.label} is on ${titleOf(charge)}. Change the type when that charge is over.` });
  const groups = (await findLastSpareReading(manager, workshopId, row.id))?.groupVolts.length;
  if (groups !== undefined && groups !== type.groupsInSeries)
    throw invalid({
      moduleTypeId: `The readings of ${row.label} have ${groups} groups, ${type.name} has ${type.groupsInSeries}. Choose another type.`,
    });
}
