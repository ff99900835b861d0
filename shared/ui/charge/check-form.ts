/** The form of the check after the rest: three decimals, all groups, and the verdict as it is typed. */
import * as z from 'zod/mini';
import { judgeCheck } from '@/calc/plan/judge-check';
import type { ChemistryId, GroupVerdict } from '@/calc/plan-types';
import { restCheckSchema, type RestCheckInput } from '@/shared/contract/charge';
import { groupVoltsProblem, type TypeWindow } from '@/shared/contract/group-volts';
import { readQuantity } from '@/shared/contract/quantity';
import { millivolts } from '../format/quantities';
import { typedDecimals } from '../format/parse';

export interface CheckValues {
  groupVolts: string[];
  celsius: string;
  meterId: string | null;
}

/** A tolerance under this is not judged by hundredths of a volt. */
const threeDecimalsBelowVolts = 0.01;

/** 'Two decimals are not enough to judge 5 mV. Type three.'; null: they are enough. */
export function decimalsProblem(text: string, toleranceVolts: number): string | null {
  if (toleranceVolts >= threeDecimalsBelowVolts || /mv\s*$/i.test(text)) return null;
  const decimals = typedDecimals(text.replace(/\s*v$/i, ''));
  if (decimals >= 3) return null;
  const count = decimals === 0 ? 'Whole volts' : decimals === 1 ? 'One decimal' : 'Two decimals';
  return `${count} ${decimals === 1 ? 'is' : 'are'} not enough to judge ${millivolts(toleranceVolts)}. Type three.`;
}

/** Why one group cannot be judged as it is typed; null: it can. */
function groupProblem(
  text: string,
  window: TypeWindow,
  toleranceVolts: number,
): { volts: number } | { problem: string } {
  const read = readQuantity(text, { name: 'The voltage', unit: 'V', min: 0, max: 99_999 });
  if (!read.ok) return { problem: read.message };
  const beyond = groupVoltsProblem(read.value, window);
  if (beyond !== null) return { problem: beyond };
  const coarse = decimalsProblem(text, toleranceVolts);
  return coarse === null ? { volts: read.value } : { problem: coarse };
}

/** Reads what is typed into a check that can be sent. */
export const checkSchema = (window: TypeWindow, toleranceVolts: number) =>
  z.transform((raw: unknown, context): RestCheckInput => {
    const values = raw as CheckValues;
    const issue = (message: string, ...path: (string | number)[]) =>
      context.issues.push({ code: 'custom', message, input: raw, path });
    values.groupVolts.forEach((text, group) => {
      const read = groupProblem(text, window, toleranceVolts);
      if ('problem' in read) issue(read.problem, 'groupVolts', group);
    });
    const read = restCheckSchema.safeParse(values);
    if (read.success) return read.data;
    for (const found of read.error.issues)
      if (found.path[0] !== 'groupVolts') issue(found.message, ...(found.path as (string | number)[]));
    return { groupVolts: [], celsius: null, meterId: null };
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
  const read = typed.map((text) => (text.trim() === '' ? null : groupProblem(text, window, toleranceVolts)));
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
