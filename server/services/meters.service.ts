import type { EntityManager } from 'typeorm';
import type { MeterDto, MeterInput } from '@/shared/contract/equipment';
import type { Deps, Member } from '../deps';
import { Meter } from '../entities/meter';
import { conflict, invalid, notFound, stale } from '../errors/domain-error';
import { countChargersWithMeter } from '../repositories/chargers.repository';
import {
  countReadingsWithMeter,
  deleteMeter,
  findMeter,
  findMeterNamed,
  listMeters,
  saveMeter,
} from '../repositories/meters.repository';
import { announceEquipment } from './announce';
import { newId } from './ids';
import { toInstant } from './instants';
import { nameTaken } from './name-taken';
import { inTransaction } from './unit-of-work';

/** A day typed as midnight of a zone ahead of ours is not the future yet, ms. */
const ZONE_SLACK_MS = 14 * 3_600_000;

const meterDto = (meter: Meter): MeterDto => ({
  id: meter.id,
  name: meter.name,
  offsetMillivolts: meter.offsetMillivolts,
  checkedAt: meter.checkedAt === null ? null : toInstant(meter.checkedAt),
  rev: meter.rev,
});

export const meters = async (deps: Deps, member: Member): Promise<MeterDto[]> =>
  (await listMeters(deps.dataSource.manager, member.workshopId)).map(meterDto);

export async function addMeter(deps: Deps, member: Member, input: MeterInput, now: number): Promise<MeterDto> {
  const { workshopId } = member;
  const meter = await inTransaction(deps, async (manager) => {
    await refuseTakenName(manager, workshopId, input.name, null);
    return saveMeter(manager, Object.assign(new Meter(), columnsOf(input, now), { id: newId(), workshopId, rev: 1 }));
  });
  announceEquipment(deps, member, now);
  return meterDto(meter);
}

/** @throws DomainError 412 stale, 409 name taken, 400 a cross-check in the future */
export async function changeMeter(
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  input: MeterInput,
  now: number,
): Promise<MeterDto> {
  const { workshopId } = member;
  const changed = await inTransaction(deps, async (manager) => {
    const meter = await known(manager, workshopId, id);
    if (meter.rev !== rev) throw stale(meterDto(meter));
    await refuseTakenName(manager, workshopId, input.name, id);
    return saveMeter(manager, Object.assign(meter, columnsOf(input, now), { rev: rev + 1 }));
  });
  announceEquipment(deps, member, now);
  return meterDto(changed);
}

/** @throws DomainError 412 stale, 409 while readings or chargers name it */
export async function removeMeter(deps: Deps, member: Member, id: string, rev: number, now: number): Promise<void> {
  const { workshopId } = member;
  await inTransaction(deps, async (manager) => {
    const meter = await known(manager, workshopId, id);
    if (meter.rev !== rev) throw stale(meterDto(meter));
    if ((await countReadingsWithMeter(manager, workshopId, id)) > 0)
      throw conflict('meter_in_use', `Readings were taken with ${meter.name}. A meter in use cannot be removed.`);
    if ((await countChargersWithMeter(manager, workshopId, id)) > 0)
      throw conflict('meter_in_use', `A charger names ${meter.name} as its meter. Change the charger first.`);
    await deleteMeter(manager, workshopId, id);
  });
  announceEquipment(deps, member, now);
}

function columnsOf(input: MeterInput, now: number): Pick<Meter, 'name' | 'offsetMillivolts' | 'checkedAt'> {
  const checkedAt = input.checkedAt === null ? null : Date.parse(input.checkedAt);
  if (checkedAt !== null && checkedAt > now + ZONE_SLACK_MS)
    throw invalid({ checkedAt: 'This day is still to come. Type the day of the last cross-check.' });
  return { name: input.name, offsetMillivolts: input.offsetMillivolts, checkedAt };
}

async function known(manager: EntityManager, workshopId: string, id: string): Promise<Meter> {
  const meter = await findMeter(manager, workshopId, id);
  if (!meter) throw notFound('This meter');
  return meter;
}

async function refuseTakenName(
  manager: EntityManager,
  workshopId: string,
  name: string,
  ownId: string | null,
): Promise<void> {
  const other = await findMeterNamed(manager, workshopId, name);
  if (other && other.id !== ownId)
    throw nameTaken('name', `There is a meter called ${name} already. Choose another name.`);
}
