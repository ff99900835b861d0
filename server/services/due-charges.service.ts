import type { EntityManager } from 'typeorm';
import type { Deps } from '../deps';
import { findCharge, listDueCharges } from '../repositories/charges.repository';
import { loadFiles } from './charge-file';
import { announce, settle, type Announcement } from './charge-write';
import { inTransaction } from './unit-of-work';

type Waker = Pick<Deps, 'dataSource' | 'hub' | 'log' | 'sleeper' | 'outbox'>;

export interface DueWork {
  done: number;
  /** Charges that could not be brought on; they are tried again later and hold up nobody else. */
  failed: string[];
}

/**
 * Brings every charge on whose due instant has come: stages change, alerts are raised, each in a transaction of its own.
 * @param skip ids that failed a moment ago
 */
export async function bringDueCharges(deps: Waker, now: number, skip: ReadonlySet<string>): Promise<DueWork> {
  const work: DueWork = { done: 0, failed: [] };
  const due = await listDueCharges(deps.dataSource.manager, now, 500);
  for (const { id, workshopId } of due) {
    if (skip.has(id)) continue;
    try {
      const announcement = await inTransaction(deps, (manager) => bringOn(manager, workshopId, id, now));
      if (announcement) announce(deps, announcement, now);
      work.done += 1;
    } catch (error) {
      work.failed.push(id);
      deps.log.error({ error, chargeId: id, workshopId }, 'a charge could not be brought to its due instant');
    }
  }
  return work;
}

/** Somebody may have been quicker: what is not due any more is left alone. */
async function bringOn(
  manager: EntityManager,
  workshopId: string,
  id: string,
  now: number,
): Promise<Announcement | null> {
  const charge = await findCharge(manager, workshopId, id);
  if (!charge || charge.nextDueAt === null || charge.nextDueAt > now) return null;
  const [file] = await loadFiles(manager, workshopId, [charge]);
  return settle(manager, file!, now, []);
}
