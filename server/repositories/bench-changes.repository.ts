import { IsNull, type EntityManager } from 'typeorm';
import { BenchChange } from '../entities/bench-change';

export async function insertBenchChange(manager: EntityManager, change: BenchChange): Promise<void> {
  await manager.insert(BenchChange, change);
}

export const findBenchChange = (manager: EntityManager, workshopId: string, id: string): Promise<BenchChange | null> =>
  manager.findOneBy(BenchChange, { workshopId, id });

/** The last change since an instant that nobody has undone. */
export async function lastBenchChange(
  manager: EntityManager,
  workshopId: string,
  since: number,
): Promise<BenchChange | null> {
  const last = await manager.findOne(BenchChange, {
    where: { workshopId, undoneAt: IsNull() },
    order: { at: 'DESC', id: 'DESC' },
  });
  return last !== null && last.at >= since ? last : null;
}

export async function markUndone(manager: EntityManager, workshopId: string, id: string, at: number): Promise<void> {
  await manager.update(BenchChange, { workshopId, id }, { undoneAt: at });
}
