import type { LogChoices } from '@/shared/contract/charge-log';
import type { LogSeparator, LogUse } from '@/shared/contract/charge-log-words';
import { cellsOf, numberIn } from './log-cells';
import { clockMs, dayIn } from './log-time';

type Column = LogChoices['columns'][number];
const separators: readonly LogSeparator[] = [';', '\t', ','];

/**
 * How a file is most likely to be read, by its first lines. The person looks at it and changes what is wrong.
 * @param groups in series in the module
 * @param given what parts the columns, where the person has said so
 */
export function guessChoices(lines: readonly string[], groups: number, given?: LogSeparator): LogChoices {
  const filled = lines.filter((line) => line.trim() !== '');
  const separator = given ?? separators.reduce((best, one) => (score(filled, one) > score(filled, best) ? one : best));
  const rows = cellsOf(lines, separator).map((row) => row ?? []);
  const width = usualWidth(rows);
  const commas = rows.flat().filter((cell) => /^\s*[-+]?\d+,\d+\s*\D{0,3}$/.test(cell)).length;
  const points = rows.flat().filter((cell) => /^\s*[-+]?\d+\.\d+\s*\D{0,3}$/.test(cell)).length;
  const decimal = commas > points ? ',' : '.';
  const first = rows.findIndex((row) => row.length === width && row.some((cell) => isValue(cell, decimal)));
  const named =
    first > 0 && rows[first - 1]!.length >= width - 1 && !rows[first - 1]!.every((cell) => cell.trim() === '');
  const header = named ? first : 0;
  const names = named ? rows[first - 1]! : [];
  const values = rows.slice(Math.max(first, 0)).filter((row) => row.length === width);
  const cellsAt = (column: number): string[] => values.map((row) => row[column]!.trim()).filter((cell) => cell !== '');
  const columns = Array.from({ length: Math.max(1, Math.min(width, 64)) }, (_, at) =>
    guessColumn(names[at] ?? '', cellsAt(at), decimal),
  );
  settle(columns, named, groups);
  return { separator, decimal, headerLine: header, columns, zeroAt: null, takenAt: null };
}

/** How many lines fall into the usual number of two cells or more. */
function score(lines: readonly string[], separator: LogSeparator): number {
  const rows = cellsOf(lines, separator).map((row) => row ?? []);
  const width = usualWidth(rows);
  return width < 2 ? 0 : rows.filter((row) => row.length === width).length;
}

function usualWidth(rows: readonly string[][]): number {
  const counts = new Map<number, number>();
  for (const { length } of rows) if (length > 1) counts.set(length, (counts.get(length) ?? 0) + 1);
  const [usual] = [...counts].sort((one, other) => other[1] - one[1] || other[0] - one[0]);
  return usual?.[0] ?? 1;
}

const isValue = (cell: string, decimal: '.' | ','): boolean =>
  typeof numberIn(cell, decimal) === 'number' || timeUnit('', [cell], decimal) !== null;

const TIME = /time|zeit|elapsed|seconds|stamp|^t$|^t[_ [(]|^(s|sec|ms|min|h)$/i;
const DAY = /^(date|day|datum|tag)\b/i;
const NOT_READ = /[mk]?[aw]h\b|capacity|energy|power|watt|\bsoc\b|ohm|resist|index|cycle|set ?point/i;
const GROUP = /(?:cell|zelle|group|gruppe|\bc|\bu|\bv)[ _#]*\d+/i;
const VOLTS = /volt|spannung|\bu\b|(?:^|[^a-z])m?v(?:$|[^a-z])/i;
const AMPS = /curr|amp|strom|\bi\b|(?:^|[^a-z])m?a(?:$|[^a-z])/i;
const CELSIUS = /temp|celsius|°|\ufffdc/i;

function guessColumn(name: string, cells: readonly string[], decimal: '.' | ','): Column {
  const use = kindOf(name.trim(), cells, decimal);
  if (use === 'none') return { use, unit: '' };
  if (use === 'time') return { use, unit: timeUnit(name, cells, decimal) ?? 's' };
  if (use === 'date') return { use, unit: dayUnit(cells) ?? 'ymd' };
  const milli = /(?:^|[^a-z])m[va](?:$|[^a-z])|milli/i.test(name);
  if (use === 'celsius') return { use, unit: /°f|fahrenheit|[([_]f[)\]]?$/i.test(name) ? 'F' : 'C' };
  return { use, unit: `${milli ? 'm' : ''}${use === 'amps' ? 'A' : 'V'}` };
}

function kindOf(name: string, cells: readonly string[], decimal: '.' | ','): LogUse {
  const unit = timeUnit(name, cells, decimal);
  if (unit !== null && !/^(s|ms|min|h)$/.test(unit) && !unit.startsWith('epoch')) return 'time';
  if (dayUnit(cells) !== null) return 'date';
  if (!cells.some((cell) => typeof numberIn(cell, decimal) === 'number')) return 'none';
  if (NOT_READ.test(name)) return 'none';
  if (DAY.test(name) || TIME.test(name)) return 'time';
  if (GROUP.test(name)) return 'group';
  if (CELSIUS.test(name)) return 'celsius';
  if (VOLTS.test(name)) return 'volts';
  return AMPS.test(name) ? 'amps' : 'none';
}

/** Unit of a time by how it is written; null: it is no time. */
function timeUnit(name: string, cells: readonly string[], decimal: '.' | ','): string | null {
  const [first] = cells;
  if (first === undefined) return null;
  const number = numberIn(first, decimal);
  if (typeof number === 'number') {
    if (number > 1e11) return 'epoch-ms';
    if (number > 1e9) return 'epoch-s';
    if (!TIME.test(name)) return null;
    if (/(^|[^a-z])(ms|msec)($|[^a-z])|milli/i.test(name)) return 'ms';
    if (/(^|[^a-z])min/i.test(name)) return 'min';
    return /(^|[^a-z])(h|hours?|hrs?|std)($|[^a-z])/i.test(name) ? 'h' : 's';
  }
  const ms = clockMs(first, Infinity);
  if (ms !== null) return ms < 60_000 || ms >= 86_400_000 ? 'span' : 'clock';
  const stamps = cells.map((cell) => /^(\d{1,4}[./-]\d{1,2}[./-]\d{1,4})[ ,T]+\d/.exec(cell)?.[1] ?? '');
  return stamps.every((text) => text === '') ? null : dayUnit(stamps);
}

/** The order of day, month and year that fits all of the cells; a slash alone does not tell. */
function dayUnit(cells: readonly string[]): string | null {
  if (cells.length === 0) return null;
  // A line or two may be spoilt; most are not.
  const fits = (unit: string) => cells.filter((cell) => dayIn(cell, unit) !== null).length >= 0.8 * cells.length;
  if (cells.some((cell) => /^\d{4}/.test(cell))) return fits('ymd') ? 'ymd' : null;
  return ['dmy', 'mdy'].find(fits) ?? null;
}

/** One column of a kind, and groups only where there are as many as the module has. */
function settle(columns: Column[], named: boolean, groups: number): void {
  const drop = (column: Column): void => void Object.assign(column, { use: 'none', unit: '' });
  const free = (): Column | undefined => columns.find(({ use }) => use === 'none');
  if (!named && !columns.some(({ use }) => use === 'time')) {
    // Nothing names them: time, volts, amps is how most write it, and the person sees the numbers beside it.
    for (const [use, unit] of [
      ['time', 's'],
      ['volts', 'V'],
      ['amps', 'A'],
    ] as const)
      Object.assign(free() ?? {}, { use, unit });
  }
  for (const use of ['time', 'date', 'volts', 'amps', 'celsius'] as const)
    columns
      .filter((column) => column.use === use)
      .slice(1)
      .forEach(drop);
  const grouped = columns.filter(({ use }) => use === 'group');
  if (grouped.length !== groups) grouped.forEach(drop);
  const time = columns.find(({ use }) => use === 'time');
  const date = columns.find(({ use }) => use === 'date');
  if (date && time?.unit !== 'clock') {
    // A day beside a time that has its own is no help; midnight by the clock reads like an elapsed time.
    if (time?.unit === 'span') time.unit = 'clock';
    else drop(date);
  }
}
