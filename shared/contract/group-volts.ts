/** Group voltages against the type they belong to: one set of sentences for the form and the API. */
import * as z from 'zod/mini';
import { quantity } from './quantity';
import { readQuantity } from './read-quantity';

export interface TypeWindow {
  groupsInSeries: number;
  chargeLimitVolts: number;
  dischargeLimitVolts: number;
}

/** A meter's error and a slightly overcharged group are true readings; beyond this over the limit it is a slip, V. */
const OVER_LIMIT_VOLTS = 0.05;

/** What a meter can show on a group at all, V: beyond it the sentence of the type's window still says what was meant. */
const MOST_TYPED_VOLTS = 99_999;

const unit = '\u00a0V';
const limit = (volts: number): string => `${volts.toFixed(2)}${unit}`;

/** The sentence where another number of voltages was typed than the type has groups; null: it is right. */
export function groupCountProblem(count: number, type: Pick<TypeWindow, 'groupsInSeries'>): string | null {
  const groups = type.groupsInSeries;
  if (count === groups) return null;
  const has = groups === 1 ? '1 group' : `${groups} groups`;
  const typed = count === 1 ? '1 voltage was' : `${count} voltages were`;
  return `This type has ${has}; ${typed} typed.`;
}

/**
 * The sentence where a group cannot be at this voltage, V; null: it can.
 * Volts under the discharge limit or the floor are true readings: the plan refuses them, the form only warns.
 */
export function groupVoltsProblem(volts: number, type: TypeWindow): string | null {
  const { chargeLimitVolts: most, dischargeLimitVolts: least } = type;
  if (volts <= most + OVER_LIMIT_VOLTS) return null;
  const inside = (value: number): boolean => value >= least && value <= most;
  const over = `${volts}${unit} is over this type's ${limit(most)}.`;
  if (inside(volts / 1000)) return `${over} In millivolts? Then it is ${(volts / 1000).toFixed(3)}${unit}.`;
  if (type.groupsInSeries > 1 && inside(volts / type.groupsInSeries))
    return `${over} That looks like the whole module. Type each group.`;
  if (inside(volts / 10) || inside(volts / 100)) return `${over} A point in the wrong place?`;
  return `${over} Read it again, or check the type.`;
}

/**
 * The sentence where this cannot be the target of a type, as a person types it; null: it can. A number that is no
 * voltage at all is left to the schema.
 * @param offsetVolts known offset of the meter it was read with, V: taken off before it is judged, as in the plan
 */
export function targetProblem(raw: unknown, type: TypeWindow, offsetVolts = 0): string | null {
  const reading = readQuantity(raw, { name: 'The voltage', unit: 'V', min: 0, max: MOST_TYPED_VOLTS });
  if (!reading.ok) return null;
  const { value } = reading;
  const { chargeLimitVolts: most, dischargeLimitVolts: least } = type;
  // To the microvolt: 4.202 − 0.002 is no more than 4.2.
  const volts = Math.round((value - offsetVolts) * 1e6) / 1e6;
  const each = value / type.groupsInSeries;
  if (volts > most && type.groupsInSeries > 1 && each >= least && each <= most)
    return `${value}${unit} is over this type's ${limit(most)}. That looks like the whole module: ${each.toFixed(3)}${unit} a group.`;
  if (volts > most && value <= most)
    return `${value}${unit} is ${volts.toFixed(3)}${unit} without the meter's offset, over this type's ${limit(most)}.`;
  if (volts > most)
    return groupVoltsProblem(value, type) ?? `${value}${unit} is over this type's ${limit(most)}. Type that or less.`;
  if (volts < least) return `${value}${unit} is under this type's ${limit(least)}. Type that or more.`;
  return null;
}

/**
 * Sentence per field of a list of group voltages, under the list's own path: empty where all is well.
 * @param path 'groupVolts' or 'reading.groupVolts'
 */
export function groupVoltsProblems(volts: readonly number[], type: TypeWindow, path: string): Record<string, string> {
  const count = groupCountProblem(volts.length, type);
  if (count !== null) return { [path]: count };
  return Object.fromEntries(
    volts.flatMap((value, group) => {
      const problem = groupVoltsProblem(value, type);
      return problem === null ? [] : [[`${path}.${group}`, problem]];
    }),
  );
}

/**
 * Voltages of the groups of one module as they are typed; whether they can be is judged against the type, by
 * `groupVoltsProblems`, with a better sentence than a general limit could give.
 */
export const typedGroupVolts = z
  .array(quantity({ name: 'The voltage', unit: 'V', min: 0, max: MOST_TYPED_VOLTS }))
  .check(
    z.minLength(1, 'Type the voltage of each group.'),
    z.maxLength(24, 'More than 24 groups is no module. Type those of one module.'),
  );
