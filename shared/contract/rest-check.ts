/** The check after the rest as it is typed: one set of sentences for the form and the API. */
import * as z from 'zod/mini';
import { restCheckSchema, type RestCheckInput } from './charge';
import { groupCountProblem, groupVoltsProblem, type TypeWindow } from './group-volts';
import { readQuantity } from './read-quantity';

/** A tolerance under this is not judged by hundredths of a volt. */
const THREE_DECIMALS_BELOW_VOLTS = 0.01;

/**
 * 'Two decimals are not enough to judge 5 mV. Type three.'; null: they are enough.
 * @param raw as typed; a number has no digits to count and stands for itself: 3.96 may be 3.960
 */
export function decimalsProblem(raw: unknown, toleranceVolts: number): string | null {
  if (typeof raw !== 'string' || toleranceVolts >= THREE_DECIMALS_BELOW_VOLTS || /mv\s*$/i.test(raw)) return null;
  const decimals = /[.,](\d*)/.exec(raw.replace(/[\s\u00a0\u202f]+/g, ''))?.[1]?.length ?? 0;
  if (decimals >= 3) return null;
  const count = decimals === 0 ? 'Whole volts' : decimals === 1 ? 'One decimal' : 'Two decimals';
  const tolerance = `${Math.round(toleranceVolts * 1000)}\u00a0mV`;
  return `${count} ${decimals === 1 ? 'is' : 'are'} not enough to judge ${tolerance}. Type three.`;
}

/** One group's voltage, V, or why it cannot be judged as it is typed. */
export function readCheckedGroup(
  raw: unknown,
  window: TypeWindow,
  toleranceVolts: number,
): { volts: number } | { problem: string } {
  const read = readQuantity(raw, { name: 'The voltage', unit: 'V', min: 0, max: 99_999 });
  if (!read.ok) return { problem: read.message };
  const problem = groupVoltsProblem(read.value, window) ?? decimalsProblem(raw, toleranceVolts);
  return problem === null ? { volts: read.value } : { problem };
}

/** Reads a check that can be judged: all groups of the type, each as fine as the tolerance asks for. */
export const restCheckSchemaFor = (window: TypeWindow, toleranceVolts: number) =>
  z.transform((raw: unknown, context): RestCheckInput => {
    const issue = (message: string, ...path: PropertyKey[]) =>
      context.issues.push({ code: 'custom', message, input: raw, path });
    const body = restCheckSchema.safeParse(raw);
    for (const found of body.error?.issues ?? []) issue(found.message, ...found.path);
    if (!body.success) return { groupVolts: [], celsius: null, meterId: null };
    const count = groupCountProblem(body.data.groupVolts.length, window);
    if (count !== null) issue(count, 'groupVolts');
    const groupVolts = body.data.groupVolts.map((typed, group) => {
      const read = readCheckedGroup(typed, window, toleranceVolts);
      if ('volts' in read) return read.volts;
      issue(read.problem, 'groupVolts', group);
      return Number.NaN;
    });
    return { ...body.data, groupVolts };
  });
