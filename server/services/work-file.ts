import type { EntityManager } from 'typeorm';
import type { Work } from '../entities/work';
import type { WorkStint } from '../entities/work-stint';
import { notFound } from '../errors/domain-error';
import { findWork, stintsOfWork } from '../repositories/work.repository';

/** A piece of work with its stints in the order of time, those given back too. */
export interface WorkFile {
  work: Work;
  stints: WorkStint[];
}

/** Puts the stints to several pieces, with one query. */
export async function loadWorkFiles(
  manager: EntityManager,
  workshopId: string,
  work: readonly Work[],
): Promise<WorkFile[]> {
  const stints = await stintsOfWork(
    manager,
    workshopId,
    work.map(({ id }) => id),
  );
  return work.map((one) => ({ work: one, stints: stints.get(one.id) ?? [] }));
}

/** @throws DomainError 404 where the workshop has no such work */
export async function loadWorkFile(manager: EntityManager, workshopId: string, id: string): Promise<WorkFile> {
  const work = await findWork(manager, workshopId, id);
  if (!work) throw notFound('This work');
  const [file] = await loadWorkFiles(manager, workshopId, [work]);
  return file!;
}

/** Taken or begun. */
export const standing = ({ stints }: Pick<WorkFile, 'stints'>): WorkStint[] =>
  stints.filter(({ state }) => state === 'taken' || state === 'begun');
