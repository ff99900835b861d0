import type { LogChoices } from '@/shared/contract/charge-log';
import type { LogUse } from '@/shared/contract/charge-log-words';
import { numberIn } from './log-cells';
import type { LogValues } from './log-bounds';
import type { TimeOrWhy } from './log-time';

/** Why a line is no reading; `key` is the same for the same reason. */
export interface Why {
  key: string;
  reason: string;
}
export interface LineReading extends LogValues {
  at: number;
}

interface Place {
  at: number;
  unit: string;
  name: string;
}

const factor: Record<string, number> = { V: 1, mV: 1e-3, A: 1, mA: 1e-3, '-A': -1, '-mA': -1e-3, C: 1 };
const inUnit = (value: number, unit: string): number =>
  unit === 'F' ? (value - 32) / 1.8 : tidy(value * (factor[unit] ?? 1));
/** A factor of a thousandth leaves no tail of digits behind: the same line gives the same number. */
const tidy = (value: number): number => Number(value.toPrecision(12));

/**
 * Makes the reader of a line's cells, by the columns as they are chosen.
 * @param names of the columns, for the reasons
 */
export function makeLineReader(
  choices: LogChoices,
  names: readonly string[],
  timeOf: (time: string, date: string | null) => TimeOrWhy,
): (cells: readonly string[]) => LineReading | Why {
  const places = (use: LogUse): Place[] =>
    choices.columns.flatMap((column, at) =>
      column.use === use ? [{ at, unit: column.unit, name: names[at] ?? `Column ${at + 1}` }] : [],
    );
  const [time] = places('time');
  const [date] = places('date');
  const [volts, amps, celsius] = (['volts', 'amps', 'celsius'] as const).map((use) => places(use)[0]);
  const groups = numbered(places('group'));
  const least =
    1 + Math.max(time?.at ?? 0, date?.at ?? 0, ...[volts, amps, celsius, ...groups].map((one) => one?.at ?? 0));

  return (cells) => {
    if (cells.length < least) return { key: 'short', reason: 'Fewer columns than the others.' };
    let why: Why | null = null;
    const read = (place: Place | undefined): number | null => {
      if (place === undefined) return null;
      const cell = cells[place.at]!;
      const value = numberIn(cell, choices.decimal);
      if (value === undefined)
        why ??= { key: `number ${place.at}`, reason: `${place.name}: “${shortened(cell)}” is no number.` };
      return value === null || value === undefined ? null : inUnit(value, place.unit);
    };
    const [terminalVolts, ampsRead, celsiusRead] = [read(volts), read(amps), read(celsius)];
    const each = groups.map(read);
    if (why !== null) return why;
    const readGroups = each.filter((value) => value !== null);
    if (readGroups.length > 0 && readGroups.length < groups.length)
      return { key: 'groups', reason: 'Some groups have volts, others none.' };
    const groupVolts = readGroups.length === 0 ? null : readGroups;
    if (terminalVolts === null && ampsRead === null && celsiusRead === null && groupVolts === null)
      return { key: 'nothing', reason: 'Nothing was read in it.' };
    const at = timeOf(cells[time?.at ?? 0]!, date ? cells[date.at]! : null);
    if (typeof at === 'string') return { key: `time ${at}`, reason: at };
    return { at, terminalVolts, amps: ampsRead, celsius: celsiusRead, groupVolts };
  };
}

/** Groups by the number in their names, where each has one of its own; else as they stand. */
function numbered(groups: Place[]): Place[] {
  const numbers = groups.map(({ name }) => Number(/(\d+)\D*$/.exec(name)?.[1] ?? NaN));
  if (numbers.some(Number.isNaN) || new Set(numbers).size < numbers.length) return groups;
  return groups
    .map((group, at) => ({ group, number: numbers[at]! }))
    .sort((one, other) => one.number - other.number)
    .map(({ group }) => group);
}

const shortened = (cell: string): string => (cell.length > 24 ? `${cell.trim().slice(0, 24)}…` : cell.trim());
