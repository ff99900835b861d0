/** Who is to look in at a charge, for its alerts: the same person as on the bench plan. */
import type { EntityManager } from 'typeorm';
import { staffingByPerson } from '../repositories/staffing.repository';
import { daysOf } from './bench-plan/days';
import { loadGround } from './bench-plan/ground';
import { linesOf } from './bench-plan/people-lines';
import type { ChargeFile } from './charge-file';
import { presentSpans } from './presence';

/** Whether anybody has working hours at this moment. */
export async function isAnybodyThere(
  manager: EntityManager,
  { workshop, people }: Pick<ChargeFile, 'workshop' | 'people'>,
  now: number,
): Promise<boolean> {
  const staffing = await staffingByPerson(manager, workshop.id);
  return [...people.values()].some(
    ({ id, disabledAt }) =>
      disabledAt === null && presentSpans(workshop, staffing.get(id) ?? null, now, now + 1).length > 0,
  );
}

/**
 * Null: nobody is there for it, or none is due. Null too where the day cannot be laid out because another charge cannot
 * be reckoned: the alert must come all the same. What failed is said in the log.
 */
export async function lookInPerson(manager: EntityManager, file: ChargeFile, now: number): Promise<string | null> {
  try {
    return await assignedPerson(manager, file, now);
  } catch (error) {
    const failed = new Error(`who looks in at charge ${file.charge.id} is not known: its own person is told`, {
      cause: error,
    });
    manager.dataSource.logger.log('warn', failed);
    return null;
  }
}

async function assignedPerson(
  manager: EntityManager,
  { charge, workshop }: ChargeFile,
  now: number,
): Promise<string | null> {
  const ground = await loadGround(manager, charge.workshopId, daysOf(workshop.zone, undefined, 1, now), now);
  const due = linesOf(ground).lookIns.filter(
    (one) => one.file.charge.id === charge.id && one.doneAt === null && one.dueAt <= now,
  );
  return due.at(-1)?.personId ?? null;
}
