import { updateLookIn } from '../repositories/charge-rows.repository';
import { lookInOfVisit } from './charge-look-ins';
import type { ChargeWrite } from './charge-write';

/**
 * Whoever does something at the bench has looked: the look-in that is due, or due within ten minutes, is done with it.
 * @returns whether there was one
 */
export async function markVisit(
  { manager, file, member }: ChargeWrite,
  at: number,
  note: string | null,
): Promise<boolean> {
  const lookIn = lookInOfVisit(file, at);
  if (lookIn === null) return false;
  const patch = { doneAt: at, personId: member.personId, note };
  await updateLookIn(manager, file.charge.workshopId, lookIn.id, patch);
  Object.assign(lookIn, patch);
  return true;
}
