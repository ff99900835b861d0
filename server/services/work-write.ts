/**
 * The one way a piece of other work is changed: in one transaction it is read, the revision is compared, the act is done
 * and the revision rises. What screens must hear is announced after the commit.
 */
import type { EntityManager } from 'typeorm';
import type { WorkDto } from '@/shared/contract/work';
import type { Deps, Member } from '../deps';
import type { Workshop } from '../entities/workshop';
import { conflict, stale } from '../errors/domain-error';
import { updateWork } from '../repositories/work.repository';
import { workshopForPlans } from '../repositories/workshop-for-plans.repository';
import { announceBench } from './announce';
import { clockText } from './charge-words';
import { refusingTaken } from './unique-taken';
import { inTransaction } from './unit-of-work';
import { recordWaitsWithin } from './waits/record-waits';
import { oneWorkDto } from './work-dto';
import { loadWorkFile, type WorkFile } from './work-file';
import { workName } from './work-words';

/** What every act on work knows. */
export interface Acting {
  manager: EntityManager;
  workshop: Workshop;
  member: Member;
  now: number;
}
export interface WorkWrite extends Acting {
  file: WorkFile;
}

interface WorkChange {
  /** Revision the person saw; left out where the act does not depend on it. */
  rev?: number;
  /** The act is for work that is over; left out: for work that is not. */
  over?: boolean;
}

/**
 * Does one act of a person on a piece of work.
 * @throws DomainError 404 unknown, 412 with the present one where somebody else was quicker, 409 where it is over
 */
export async function changeOneWork(
  deps: Deps,
  member: Member,
  id: string,
  now: number,
  change: WorkChange,
  act: (write: WorkWrite) => Promise<void> | void,
): Promise<WorkDto> {
  const { workshopId } = member;
  const dto = await refusingTaken(
    inTransaction(deps, async (manager) => {
      const file = await loadWorkFile(manager, workshopId, id);
      if (change.rev !== undefined && file.work.rev !== change.rev)
        throw stale(await oneWorkDto(manager, workshopId, file));
      const workshop = await workshopForPlans(manager, workshopId);
      if ((file.work.overAt !== null) !== (change.over ?? false))
        throw conflict(
          'wrong_state',
          overText(file.work, workshop.zone, now),
          await oneWorkDto(manager, workshopId, file),
        );
      await act({ manager, workshop, member, now, file });
      await saveWork(manager, file);
      return oneWorkDto(manager, workshopId, await loadWorkFile(manager, workshopId, id));
    }),
  );
  announceBench(deps, workshopId, now);
  return dto;
}

/** Writes the work's own columns as one more revision. */
export async function saveWork(manager: EntityManager, { work, stints }: WorkFile): Promise<void> {
  work.rev += 1;
  const { id, workshopId, createdAt: _made, ...columns } = work;
  await updateWork(manager, workshopId, id, columns);
  const worked = lastWorked(stints);
  if (worked !== null) await recordWaitsWithin(manager, workshopId, worked);
}

/** The stretch in which an act on the work may have changed what somebody was at: what goes on, or what ended last. */
function lastWorked(stints: WorkFile['stints']): { from: number; to: number } | null {
  const begun = stints.filter(({ begunAt }) => begunAt !== null);
  const endOf = ({ endedAt }: (typeof stints)[number]): number => endedAt ?? Number.MAX_SAFE_INTEGER;
  const until = Math.max(...begun.map(endOf));
  const last = begun.filter((stint) => endOf(stint) === until);
  return last.length === 0 ? null : { from: Math.min(...last.map(({ begunAt }) => begunAt!)), to: until };
}

function overText(work: WorkFile['work'], zone: string, now: number): string {
  if (work.overAt === null) return `${workName(work)} is not over yet.`;
  const at = clockText(work.overAt, zone, now);
  return work.dropReason === null
    ? `${workName(work)} was done at ${at}. Bring it back first.`
    : `${workName(work)} was dropped at ${at}. Bring it back first.`;
}
