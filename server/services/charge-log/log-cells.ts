import Papa from 'papaparse';
import type { LogSeparator } from '@/shared/contract/charge-log-words';

/**
 * The cells of lines, in their order; null for one with a quote that nothing closes. Lines without quotes are read
 * together, which is some ten times as fast.
 */
export function cellsOf(lines: readonly string[], separator: LogSeparator): (string[] | null)[] {
  const options = { delimiter: separator, newline: '\n', header: false, skipEmptyLines: false } as const;
  if (!lines.some((line) => line.includes('"'))) {
    const { data } = Papa.parse<string[]>(lines.join('\n'), options);
    if (data.length === lines.length) return data;
  }
  return lines.map((line) => {
    const { data, errors } = Papa.parse<string[]>(line, options);
    return errors.some(({ type }) => type === 'Quotes') ? null : (data[0] ?? ['']);
  });
}

/** What loggers write where nothing was read. */
const NOTHING = /^(|-+|nan|n\/?a|null|none|\.+)$/i;
const NUMBER = /^([+\-\u2212]?)(\d+\.?\d*|\.\d+)(e[+-]?\d+)?\s*(v|mv|a|ma|°?c|°?f|s|ms|min|h)?$/i;

/** The number in a cell; null where nothing was read, undefined where it is no number. */
export function numberIn(cell: string, decimal: '.' | ','): number | null | undefined {
  const text = cell.replace(/[\s\u00a0\u202f]+/g, ' ').trim();
  if (NOTHING.test(text)) return null;
  if (decimal === ',' && text.includes('.')) return undefined;
  const found = NUMBER.exec(decimal === ',' ? text.replace(',', '.') : text);
  if (found === null) return undefined;
  const value = Number(`${found[2]}${found[3] ?? ''}`);
  if (!Number.isFinite(value)) return undefined;
  return found[1] === '' || found[1] === '+' ? value : -value;
}
