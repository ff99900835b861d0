import { In, IsNull, LessThanOrEqual, type EntityManager } from 'typeorm';
import { Wall } from '../entities/wall';

/** A wall by the hash of its token alone: the token says no workshop, the row does. */
export const findWallByTokenHash = (manager: EntityManager, tokenHash: string): Promise<Wall | null> =>
  manager.findOneBy(Wall, { tokenHash });

export const findWall = (manager: EntityManager, workshopId: string, id: string): Promise<Wall | null> =>
  manager.findOneBy(Wall, { workshopId, id });

/** Walls that are not revoked, oldest first. */
export const listWalls = (manager: EntityManager, workshopId: string): Promise<Wall[]> =>
  manager.find(Wall, { where: { workshopId, revokedAt: IsNull() }, order: { createdAt: 'ASC', id: 'ASC' } });

export const insertWall = async (manager: EntityManager, wall: Wall): Promise<void> => {
  await manager.insert(Wall, wall);
};

export const updateWall = async (
  manager: EntityManager,
  workshopId: string,
  id: string,
  change: Partial<Wall>,
): Promise<void> => {
  await manager.update(Wall, { workshopId, id }, change);
};

/** Notes when walls were last heard of; the connected ones of all workshops at once, by the ids their tokens proved. */
export const touchWalls = async (manager: EntityManager, ids: string[], now: number): Promise<void> => {
  await manager.update(Wall, { id: In(ids) }, { lastHeardAt: now });
};

/** Walls that were last heard of at `before` or earlier, of all workshops: asked by the sleeper alone. */
export const listWallsHeardBefore = (manager: EntityManager, before: number): Promise<Wall[]> =>
  manager.findBy(Wall, { revokedAt: IsNull(), lastHeardAt: LessThanOrEqual(before) });

export const wallsById = async (manager: EntityManager, ids: readonly string[]): Promise<Map<string, Wall>> => {
  if (ids.length === 0) return new Map();
  const rows = await manager.findBy(Wall, { id: In([...ids]) });
  return new Map(rows.map((row) => [row.id, row]));
};
