/** The form of the check after the rest, and the verdict as it is typed. */
import { judgeCheck } from '@/calc/plan/judge-check';
import type { ChemistryId, GroupVerdict } from '@/calc/plan-types';
import type { ChargeDto, RestCheckInput } from '@/shared/contract/charge';
import type { TypeWindow } from '@/shared/contract/group-volts';
import { readCheckedGroup } from '@/shared/contract/rest-check';
import type { LocaleMarks } from '../format/marks';
import { voltsNumber } from '../format/quantities';

export interface CheckValues {
  groupVolts: string[];
  celsius: string;
  meterId: string | null;
}

/** A check that nobody has typed yet; the pack's own meter is best. */
export const emptyCheck = (charge: Pick<ChargeDto, 'groups' | 'meterId'>): CheckValues => ({
  groupVolts: charge.groups.map(() => ''),
  celsius: '',
  meterId: charge.meterId,
});

/** A check that waits on this device, to be typed anew. */
export const checkOf = (
  { groupVolts, celsius, meterId }: Pick<RestCheckInput, 'groupVolts' | 'celsius' | 'meterId'>,
  groups: number,
  marks: LocaleMarks,
): CheckValues => ({
  groupVolts: Array.from({ length: groups }, (_, group) =>
    groupVolts[group] === undefined ? '' : voltsNumber(groupVolts[group], marks),
  ),
  celsius: celsius === null ? '' : String(celsius).replace('.', marks.decimal),
  meterId,
});

/**
 * The verdict of each group as it is typed so far; null where it cannot be judged yet.
 *
 * @param offsetVolts known offset of the meter, taken off each reading
 */
export function judgeTyped(
  typed: readonly string[],
  {
    window,
    targetVolts,
    toleranceVolts,
    offsetVolts,
    chemistry,
    capacityAh,
  }: {
    window: TypeWindow;
    targetVolts: number;
    toleranceVolts: number;
    offsetVolts: number;
    chemistry: ChemistryId;
    capacityAh: number;
  },
): (GroupVerdict | null)[] {
  const read = typed.map((text) => (text.trim() === '' ? null : readCheckedGroup(text, window, toleranceVolts)));
  const known = read.flatMap((one, group) => (one && 'volts' in one ? [{ group, volts: one.volts }] : []));
  if (known.length === 0) return typed.map(() => null);
  // As the server takes the offset off: to the microvolt, so that 3.968 − 0.002 is 3.966.
  const volts = known.map((one) => Math.round((one.volts - offsetVolts) * 1e6) / 1e6);
  const verdict = judgeCheck(
    volts,
    { volts: targetVolts, toleranceVolts },
    { chemistry, curve: null, groupsInSeries: volts.length },
    capacityAh,
  );
  return typed.map((_, group) => {
    const at = known.findIndex((one) => one.group === group);
    return at < 0 ? null : { ...verdict.groups[at]!, group };
  });
}
