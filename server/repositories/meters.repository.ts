import type { EntityManager } from 'typeorm';
import { ChargeReading } from '../entities/charge-reading';
import { Charge } from '../entities/charge';
import { Meter } from '../entities/meter';
import { PackReading } from '../entities/pack-reading';
import { RestCheck } from '../entities/rest-check';
import { SecondSource } from '../entities/second-source';
import { SpareReading } from '../entities/spare-reading';

export const listMeters = (manager: EntityManager, workshopId: string): Promise<Meter[]> =>
  manager.find(Meter, { where: { workshopId }, order: { name: 'ASC' } });

export const findMeter = (manager: EntityManager, workshopId: string, id: string): Promise<Meter | null> =>
  manager.findOneBy(Meter, { workshopId, id });

export const findMeterNamed = (manager: EntityManager, workshopId: string, name: string): Promise<Meter | null> =>
  manager.findOneBy(Meter, { workshopId, name });

export const saveMeter = (manager: EntityManager, meter: Meter): Promise<Meter> => manager.save(Meter, meter);

export async function deleteMeter(manager: EntityManager, workshopId: string, id: string): Promise<void> {
  await manager.delete(Meter, { workshopId, id });
}

/** Readings, checks and targets that name a meter: it cannot be deleted then, or nobody knows what they were read with. */
export async function countReadingsWithMeter(
  manager: EntityManager,
  workshopId: string,
  meterId: string,
): Promise<number> {
  const counts = [
    await manager.countBy(SpareReading, { workshopId, meterId }),
    await manager.countBy(ChargeReading, { workshopId, meterId }),
    await manager.countBy(RestCheck, { workshopId, meterId }),
    await manager.countBy(Charge, { workshopId, targetMeterId: meterId }),
    await manager.countBy(PackReading, { workshopId, meterId }),
    await manager.countBy(SecondSource, { workshopId, meterId }),
  ];
  return counts.reduce((sum, count) => sum + count, 0);
}
