import { In, type EntityManager } from 'typeorm';
import { openStages } from '@/shared/contract/charge';
import { Charge } from '../entities/charge';
import { Spare } from '../entities/spare';
import { SpareReading } from '../entities/spare-reading';

export const listSpares = (manager: EntityManager, workshopId: string): Promise<Spare[]> =>
  manager.find(Spare, { where: { workshopId }, order: { label: 'ASC' } });

export const findSpare = (manager: EntityManager, workshopId: string, id: string): Promise<Spare | null> =>
  manager.findOneBy(Spare, { workshopId, id });

export const findSpareLabelled = (manager: EntityManager, workshopId: string, label: string): Promise<Spare | null> =>
  manager.findOneBy(Spare, { workshopId, label });

export const saveSpare = (manager: EntityManager, spare: Spare): Promise<Spare> => manager.save(Spare, spare);

export const countSparesOfType = (manager: EntityManager, workshopId: string, moduleTypeId: string): Promise<number> =>
  manager.countBy(Spare, { workshopId, moduleTypeId });

export const insertSpareReading = (manager: EntityManager, reading: SpareReading): Promise<SpareReading> =>
  manager.save(SpareReading, reading);

/** Newest first. */
export const listSpareReadings = (
  manager: EntityManager,
  workshopId: string,
  spareId: string,
): Promise<SpareReading[]> =>
  manager.find(SpareReading, {
    where: { workshopId, spareId },
    order: { at: 'DESC', createdAt: 'DESC', id: 'ASC' },
  });

export async function findLastSpareReading(
  manager: EntityManager,
  workshopId: string,
  spareId: string,
): Promise<SpareReading | null> {
  const [last] = await manager.find(SpareReading, {
    where: { workshopId, spareId },
    order: { at: 'DESC', createdAt: 'DESC', id: 'ASC' },
    take: 1,
  });
  return last ?? null;
}

/** The last reading of every spare of a workshop, by the spare's id. */
export async function lastSpareReadings(
  manager: EntityManager,
  workshopId: string,
): Promise<Map<string, SpareReading>> {
  const rows = await manager
    .createQueryBuilder(SpareReading, 'reading')
    .where('reading.workshopId = :workshopId', { workshopId })
    .andWhere((query) => {
      const newer = query
        .subQuery()
        .select('1')
        .from(SpareReading, 'newer')
        .where('newer.workshopId = reading.workshopId AND newer.spareId = reading.spareId')
        .andWhere('(newer.at > reading.at OR (newer.at = reading.at AND newer.createdAt > reading.createdAt))')
        .getQuery();
      return `NOT EXISTS ${newer}`;
    })
    .orderBy('reading.id', 'DESC')
    .getMany();
  return new Map(rows.map((reading) => [reading.spareId, reading]));
}

export type SpareCharge = Pick<
  Charge,
  'id' | 'number' | 'repairRef' | 'spareId' | 'stage' | 'targetVolts' | 'createdAt' | 'rev'
>;

const chargeColumns = {
  id: true,
  number: true,
  repairRef: true,
  spareId: true,
  stage: true,
  targetVolts: true,
  createdAt: true,
  rev: true,
} as const;

/** The open charge of each spare that has one, by the spare's id. */
export async function openChargesBySpare(
  manager: EntityManager,
  workshopId: string,
): Promise<Map<string, SpareCharge>> {
  const charges = await manager.find(Charge, {
    where: { workshopId, stage: In([...openStages]) },
    select: chargeColumns,
  });
  return new Map(charges.map((charge) => [charge.spareId, charge]));
}

/** All charges of a spare, newest first. */
export const listChargesOfSpare = (
  manager: EntityManager,
  workshopId: string,
  spareId: string,
): Promise<SpareCharge[]> =>
  manager.find(Charge, { where: { workshopId, spareId }, select: chargeColumns, order: { createdAt: 'DESC' } });
