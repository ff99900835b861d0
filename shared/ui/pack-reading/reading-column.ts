/** Which column of a table holds the voltages of the groups. Pure; a table with the groups in one line comes turned over. */

export type VoltsUnit = 'V' | 'mV';

/** Voltages of the groups as one column gives them. */
export interface ColumnReading {
  column: number;
  /** Row of each group, in the order of the groups. */
  rows: number[];
  /** V, in the order of the groups; those that could not be read left out. */
  volts: number[];
  unit: VoltsUnit;
  /** The column that numbers the groups; null: they follow each other. */
  numbering: number | null;
  /** Rows of groups that were not understood, and why. */
  bad: { row: number; text: string }[];
  /** Rows before the first group, and after or between the groups, that hold none. */
  before: number[];
  beside: number[];
  /** How much speaks for it; only to compare with others of the same text. */
  score: number;
}

const MOST_VOLTS = 5;
/** Group volts end at 5 and millivolts of a cell that is not dead begin far over this. */
const UNIT_LIMIT = 50;

const wordsOfVolts = /volt|spannung|tension|\bm?v\b/i;
const wordsOfOthers =
  /temp|°|soc|%|ohm|Ω|resist|capac|\bah\b|amp|current|time|date|module|\bmin\b|\bmax\b|delta|diff|deviation|average|mean/i;
const wordsOfNumbers = /group|cell|no\b|nr|number|^#|^g$|^n$/i;

/** Digits of a cell with a point, without its unit; null: no number. */
export function numberText(cell: string): string | null {
  const match = /^([+-]?)(\d+(?:[.,]\d+)?|[.,]\d+)(?:m?v)?$/i.exec(
    cell.replace(/[\s\u00a0\u202f']/g, '').replace('−', '-'),
  );
  return match ? `${match[1]}${match[2]!.replace(',', '.')}` : null;
}

/** 12 of '12', 'G12', 'Cell 12'; null: it numbers nothing. */
const labelNumber = (cell: string): number | null => {
  const match = /^[^\d.,+−-]{0,12}(\d{1,4})$/.exec(cell.trim());
  return match ? Number(match[1]) : null;
};

const median = (values: readonly number[]): number => {
  const sorted = [...values].sort((a, b) => a - b);
  const half = sorted.length >> 1;
  return sorted.length % 2 ? sorted[half]! : (sorted[half - 1]! + sorted[half]!) / 2;
};

/** The longest run of rows numbered 0, 1, 2 … or 1, 2, 3 … */
function runOf(labels: readonly (number | null)[]): number[] {
  let best: number[] = [];
  for (let row = 0; row < labels.length; row += 1) {
    if (labels[row] !== 0 && labels[row] !== 1) continue;
    const run = [row];
    while (labels[row + run.length] === labels[row]! + run.length) run.push(row + run.length);
    if (run.length > best.length) best = run;
    row += run.length - 1;
  }
  return best;
}

/** Rows in the order of their numbers, where a column headed as a number gives each of 1 … n once. */
function shuffledOf(labels: readonly (number | null)[], heading: string): number[] {
  if (!wordsOfNumbers.test(heading)) return [];
  const numbered = labels.flatMap((label, row) => (label === null ? [] : [{ label, row }]));
  const sorted = numbered.sort((a, b) => a.label - b.label);
  const first = sorted[0]?.label;
  if (first !== 0 && first !== 1) return [];
  return sorted.every(({ label }, at) => label === first + at) ? sorted.map(({ row }) => row) : [];
}

interface Numbering {
  column: number;
  rows: number[];
}

function numberingOf(rows: readonly (readonly string[])[], width: number): Numbering | null {
  let best: Numbering | null = null;
  for (let column = 0; column < width; column += 1) {
    const labels = rows.map((row) => labelNumber(row[column] ?? ''));
    const run = runOf(labels);
    const shuffled = shuffledOf(labels, rows[0]?.[column] ?? '');
    const found = shuffled.length > run.length ? shuffled : run;
    if (found.length > (best?.rows.length ?? 0)) best = { column, rows: found };
  }
  return best;
}

/** The one sentence of a cell that gives no voltage; null: it does. */
function cellProblem(cell: string, volts: number | null, unit: VoltsUnit): string | null {
  const shown = cell.trim().slice(0, 24);
  if (shown === '') return 'No voltage stands here.';
  if (volts === null) return `“${shown}” is no voltage.`;
  if (volts < 0) return `${shown} ${unit} is under 0.`;
  return volts > MOST_VOLTS ? `${shown} ${unit} is over ${unit === 'V' ? '5' : '5000'} ${unit}.` : null;
}

function readColumn(
  rows: readonly (readonly string[])[],
  column: number,
  numbering: Numbering | null,
  wish: { groupCount: number; unit: VoltsUnit | null },
): ColumnReading | null {
  const texts = rows.map((row) => numberText(row[column] ?? ''));
  const first = texts.findIndex((text) => text !== null);
  if (first < 0) return null;
  const numbered =
    numbering !== null && numbering.column !== column && numbering.rows.some((row) => texts[row] !== null);
  const data = numbered ? numbering.rows : rows.flatMap((_, row) => (row >= first ? [row] : []));
  const values = data.flatMap((row) => (texts[row] == null ? [] : [Number(texts[row])]));
  if (values.length === 0) return null;
  const unit = wish.unit ?? (median(values) > UNIT_LIMIT ? 'mV' : 'V');
  const bad: ColumnReading['bad'] = [];
  const volts: number[] = [];
  const whose: number[] = [];
  for (const row of data) {
    const text = texts[row] ?? null;
    // The point is moved in the text: a division would change the last digit of some.
    const value = text === null ? null : Number(unit === 'mV' ? `${text}e-3` : text);
    const problem = cellProblem(rows[row]![column] ?? '', value, unit);
    if (problem === null) {
      volts.push(value!);
      whose.push(row);
    } else bad.push({ row, text: problem });
  }
  if (volts.length === 0 && wish.unit === null) return null;
  const start = Math.min(...[data[0]!, ...data]);
  const heading = rows
    .slice(0, start)
    .map((row) => row[column] ?? '')
    .join(' ');
  const middle = volts.length > 0 ? median(volts) : 0;
  const near = volts.filter((value) => Math.abs(value - middle) <= 0.3 * middle).length;
  const isNumbering = numbering?.column === column && numbering.rows.length > 1;
  const inData = new Set(data);
  return {
    column,
    rows: whose,
    volts,
    unit,
    numbering: numbered ? numbering.column : null,
    bad,
    before: rows.flatMap((_, row) => (row < start ? [row] : [])),
    beside: rows.flatMap((_, row) => (row > start && !inData.has(row) ? [row] : [])),
    score:
      (volts.length === wish.groupCount ? 300 : 0) +
      (60 * volts.length) / data.length +
      (volts.length > 0 ? (40 * near) / volts.length : 0) +
      (wordsOfVolts.test(heading) ? 80 : 0) -
      (wordsOfOthers.test(heading) ? 80 : 0) +
      6 * Math.log(volts.length + 1) +
      (middle >= 0.5 ? 20 : 0) +
      (unit === 'mV' || values.some((value) => !Number.isInteger(value)) ? 10 : 0) -
      (isNumbering ? 150 : 0) -
      column / 1000,
  };
}

/** The column that most speaks for as the groups' voltages; null: none holds any. */
export function bestColumn(
  rows: readonly (readonly string[])[],
  wish: { groupCount: number; unit: VoltsUnit | null },
): ColumnReading | null {
  const width = rows.reduce((most, row) => Math.max(most, row.length), 0);
  const numbering = numberingOf(rows, width);
  let best: ColumnReading | null = null;
  for (let column = 0; column < width; column += 1) {
    const one = readColumn(rows, column, numbering, wish);
    // The numbers of the groups are no voltages where something else stands beside them, however many it lacks.
    const counts = one !== null && !(column === numbering?.column && best !== null && best.numbering === column);
    if (counts && (best === null || one.score > best.score || best.column === one.numbering)) best = one;
  }
  return best;
}

/** Lines to columns. */
export function turned(rows: readonly (readonly string[])[]): string[][] {
  const width = rows.reduce((most, row) => Math.max(most, row.length), 0);
  return Array.from({ length: width }, (_, column) => rows.map((row) => row[column] ?? ''));
}
