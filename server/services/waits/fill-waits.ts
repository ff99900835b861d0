import type { EntityManager } from 'typeorm';
import { unrecordedCharges } from '../../repositories/waits.repository';
import { workshopForPlans } from '../../repositories/workshop-for-plans.repository';
import { recordWaits } from './record-waits';

/** Charges written at once. */
const AT_ONCE = 200;

/**
 * Writes the rows of the statistics that are not there: of charges of before there were any, and of those that were put
 * into the database otherwise than by living through them.
 * @returns how many were written
 */
export async function fillWaits(manager: EntityManager): Promise<number> {
  const missing = await unrecordedCharges(manager);
  for (const [workshopId, ids] of missing) {
    const workshop = await workshopForPlans(manager, workshopId);
    for (let from = 0; from < ids.length; from += AT_ONCE)
      await recordWaits(manager, workshop, ids.slice(from, from + AT_ONCE));
  }
  return [...missing.values()].reduce((sum, ids) => sum + ids.length, 0);
}
