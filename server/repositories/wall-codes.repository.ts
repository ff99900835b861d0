import { IsNull, MoreThan, type EntityManager } from 'typeorm';
import { WallCode } from '../entities/wall-code';

export const findCodeByDevice = (manager: EntityManager, deviceCodeHash: string): Promise<WallCode | null> =>
  manager.findOneBy(WallCode, { deviceCodeHash });

/** A code that is shown now and waits for an answer. It belongs to no workshop yet. */
export const findWaitingCode = (manager: EntityManager, userCode: string, now: number): Promise<WallCode | null> =>
  manager.findOneBy(WallCode, { userCode, expiresAt: MoreThan(now), wallId: IsNull(), collectedAt: IsNull() });

export const insertCode = async (manager: EntityManager, code: WallCode): Promise<void> => {
  await manager.insert(WallCode, code);
};

export const updateCode = async (manager: EntityManager, id: string, change: Partial<WallCode>): Promise<void> => {
  await manager.update(WallCode, { id }, change);
};

export const deleteCodesBefore = async (manager: EntityManager, before: number): Promise<void> => {
  await manager.createQueryBuilder().delete().from(WallCode).where('expires_at < :before', { before }).execute();
};
