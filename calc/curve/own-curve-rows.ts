/** A cell of a table as a reader of CSV gives it. */
export type CurveCell = string | number | null | undefined;

export interface CurvePoint {
  row: number;
  soc: number;
  volts: number;
  percentSign: boolean;
}

/** One row: a point, null where it is to be passed over, or what is wrong with it. */
export function readRow(cells: readonly CurveCell[], row: number): CurvePoint | { row: number; text: string } | null {
  const words = cells.map((cell) => String(cell ?? '').trim());
  if (words.every((word) => word === '')) return null;
  const soc = toNumber(words[0] ?? '');
  const volts = toNumber(words[1] ?? '');
  // A heading: words in the first row.
  if (row === 1 && soc === null && volts === null) return null;
  if (words.length < 2 || words[1] === '')
    return { row, text: 'One column only. Give the state of charge and the volts side by side.' };
  if (soc === null) return { row, text: `'${words[0]}' is no state of charge. Give a number, 0.35 or 35 for example.` };
  if (volts === null) return { row, text: `'${words[1]}' is no voltage. Give a number, 3.652 for example.` };
  return { row, soc, volts, percentSign: words[0]!.includes('%') };
}

/** With point or comma, with or without its unit; null: no number. */
function toNumber(word: string): number | null {
  const bare = word
    .replace(/\s*(%|V)$/i, '')
    .replace(',', '.')
    .trim();
  if (!/^[-+]?(\d+\.?\d*|\.\d+)(e[-+]?\d+)?$/i.test(bare)) return null;
  const value = Number(bare);
  return Number.isFinite(value) ? value : null;
}
