import { cellText, upperFirst, groupsText } from './charge-words';

/** Differences down to this are the rounding of numbers, V. */
const ROUNDING_VOLTS = 1e-6;

/**
 * Sentence where a module no longer reads what it was planned with: charged by the plan's numbers it would end beside
 * its target, or past its limit. Names the group that has moved furthest.
 * @param name how the sentence calls the module: 'It'
 * @param planned and `read` groups' volts, V
 * @param toleranceVolts what a group may have moved, V
 * @returns null where every group reads the same within the tolerance
 */
export function readsOtherwise(
  name: string,
  planned: readonly number[],
  read: readonly number[],
  toleranceVolts: number,
): string | null {
  const moves = planned.map((volts, group) => Math.abs((read[group] ?? Number.POSITIVE_INFINITY) - volts));
  const furthest = moves.indexOf(Math.max(...moves));
  if (!(moves[furthest]! > toleranceVolts + ROUNDING_VOLTS)) return null;
  const volts = cellText(read[furthest] ?? Number.NaN);
  const alike = read.every((one) => cellText(one) === volts);
  const group = name === 'It' ? upperFirst(groupsText([furthest])) : `${name}, ${groupsText([furthest])},`;
  return `${alike ? name : group} reads ${volts} now. Plan it again.`;
}
