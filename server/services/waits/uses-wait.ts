import type { Charge } from '../../entities/charge';
import type { WorkStint } from '../../entities/work-stint';

/**
 * Whose other work uses the wait of charges: that of the people on their repair, where nobody is on it that of the charges'
 * own, and work that was taken for the wait of one of them, whosever it is.
 * @param onRepair ids of the people on the repair
 */
export function usesWaitOf(
  onRepair: readonly string[],
  charges: readonly Pick<Charge, 'id' | 'personId'>[],
): (stint: Pick<WorkStint, 'personId' | 'waitChargeId'>) => boolean {
  const people = onRepair.length > 0 ? onRepair : charges.map(({ personId }) => personId);
  return ({ personId, waitChargeId }) => people.includes(personId) || charges.some(({ id }) => id === waitChargeId);
}
