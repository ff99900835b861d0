import { type EntityManager } from 'typeorm';
import { Photo } from '../entities/photo';

export const findPhoto = (manager: EntityManager, workshopId: string, id: string): Promise<Photo | null> =>
  manager.findOneBy(Photo, { workshopId, id });

export const countPhotos = (manager: EntityManager, workshopId: string, repairId: string): Promise<number> =>
  manager.countBy(Photo, { workshopId, repairId });

/** The files that rows name, of all workshops: what lies beside them belongs to nobody. */
export const namedPhotoFiles = async (manager: EntityManager): Promise<Set<string>> =>
  new Set((await manager.find(Photo, { select: { file: true } })).map(({ file }) => file));

export async function insertPhoto(manager: EntityManager, photo: Photo): Promise<void> {
  await manager.insert(Photo, photo);
}
export async function updatePhoto(
  manager: EntityManager,
  workshopId: string,
  id: string,
  patch: Partial<Photo>,
): Promise<void> {
  await manager.update(Photo, { workshopId, id }, patch);
}
export async function deletePhoto(manager: EntityManager, workshopId: string, id: string): Promise<void> {
  await manager.delete(Photo, { workshopId, id });
}
