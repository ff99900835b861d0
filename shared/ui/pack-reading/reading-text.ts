/**
 * A pack reading as it is pasted or comes out of a file: what was understood of it, and what was not. Pure.
 * Brings papaparse along: import it late.
 */
import Papa from 'papaparse';
import { bestColumn, numberText, turned, type ColumnReading, type VoltsUnit } from './reading-column';

export const separators = ['comma', 'semicolon', 'tab', 'space', 'none'] as const;
export type Separator = (typeof separators)[number];
export type { VoltsUnit };

export interface ReadingText {
  /** V, in the order of the groups; only those that were understood. */
  groupVolts: number[];
  separator: Separator;
  decimal: 'point' | 'comma' | 'none';
  unit: VoltsUnit;
  /** 'rows': a group a line; 'columns': all groups in one line. */
  orientation: 'rows' | 'columns';
  headerLines: number;
  /** Columns and lines that were not used, by name. */
  ignored: string[];
  /** What was not understood, by the line of the file, from 1. */
  problems: { line: number; text: string }[];
  /** Why nothing of it can be saved; null: it can. */
  refusal: string | null;
  /** The first lines as they stand in the text, beside the groups (0-based) they were read as; null: as none. */
  lines: { line: number; text: string; header: boolean; groups: number[] | null }[];
}

export interface ReadingWish {
  /** Groups of the pack. */
  groupCount: number;
  /** Where a person has said it; null: as it looks. */
  separator?: Separator | null;
  unit?: VoltsUnit | null;
}

/** Stands for no separator: no text that has passed the check of its signs holds it. */
const NEVER = '\u001f';
const signs: Record<Separator, string> = { comma: ',', semicolon: ';', tab: '\t', space: ' ', none: NEVER };
const LINES_SHOWN = 5;

interface Row {
  /** Of the file, from 1. */
  line: number;
  cells: string[];
}

function rowsOf(text: string, separator: Separator): { rows: Row[]; open: number | null } {
  const plain = separator === 'space' ? text.replace(/^ +| +$/gm, '').replace(/ {2,}/g, ' ') : text;
  const parsed = Papa.parse<string[]>(plain, { delimiter: signs[separator], newline: '\n' });
  const rows: Row[] = [];
  const lineOfRow: number[] = [];
  let line = 1;
  for (const cells of parsed.data) {
    lineOfRow.push(line);
    if (cells.some((cell) => cell.trim() !== '')) rows.push({ line, cells });
    // A cell in quotes may go over several lines.
    line += 1 + cells.reduce((sum, cell) => sum + (cell.match(/\n/g)?.length ?? 0), 0);
  }
  const quotes = parsed.errors.find((error) => error.code === 'MissingQuotes');
  return { rows, open: quotes ? (lineOfRow[quotes.row ?? 0] ?? 1) : null };
}

/** A cell a spreadsheet would reckon with; a sign alone stands for 'nothing'. */
const isFormula = (cell: string): boolean => /^[=+\-@]./.test(cell.trim()) && numberText(cell) === null;

interface Candidate {
  separator: Separator;
  orientation: ReadingText['orientation'];
  rows: Row[];
  open: number | null;
  column: ColumnReading;
  score: number;
}

/** '3,949' as the only cell of a line: a decimal comma, unless it is the number of a group and its millivolts. */
function againstOneColumn(rows: readonly Row[]): number {
  const parts = rows.flatMap(({ cells }) => /^(\d+),(\d+)$/.exec(cells[0]?.trim() ?? '') ?? []);
  if (parts.length === 0) return 0;
  const whole = Number(parts[1]);
  const rest = parts[2]!;
  const numbersItsMillivolts = whole <= 1 && rest.length === 4 && Number(rest) >= 1000 && Number(rest) <= 5000;
  return whole > 100 ? 30 : numbersItsMillivolts && rows.length === 1 ? 60 : 0;
}

/** Two whole numbers a line that together are a decimal comma. */
function againstComma(rows: readonly Row[], column: ColumnReading): number {
  if (column.numbering !== null) return 0;
  const pairs = rows.filter(
    ({ cells }) => cells.length === 2 && /^[0-5]$/.test(cells[0]!.trim()) && /^\d+$/.test(cells[1]!.trim()),
  );
  return pairs.length * 2 > rows.length ? 60 : 0;
}

function candidatesOf(text: string, separator: Separator, wish: ReadingWish): Candidate[] {
  const { rows, open } = rowsOf(text, separator);
  const table = rows.map(({ cells }) => cells);
  const found: Candidate[] = [];
  for (const orientation of ['rows', 'columns'] as const) {
    const column = bestColumn(orientation === 'rows' ? table : turned(table), {
      groupCount: wish.groupCount,
      unit: wish.unit ?? null,
    });
    if (!column) continue;
    const against =
      (separator === 'none' ? againstOneColumn(rows) : 0) +
      (separator === 'comma' && orientation === 'rows' ? againstComma(rows, column) : 0) +
      (orientation === 'columns' ? 1 : 0);
    found.push({ separator, orientation, rows, open, column, score: column.score - against });
  }
  return found;
}

/** Whether the comma cuts the voltages in two: '1,3,949'. */
function commaClash({ separator, orientation, rows, column }: Candidate): boolean {
  if (separator !== 'comma') return false;
  const isPair = (cells: readonly string[], at: number) =>
    /^[0-5]$/.test(cells[at]?.trim() ?? '') &&
    (/^\d{1,3}$/.test(cells[at + 1]?.trim() ?? '') || Number(cells[at + 1]?.trim() || 0) > 5000);
  if (orientation === 'rows') {
    if (column.volts.some((volts) => volts > 1) && column.unit === 'mV') return false;
    const cut = rows.filter(
      ({ cells }) => isPair(cells, column.column - 1) || (column.column > 0 && isPair(cells, column.column)),
    );
    return cut.length * 2 > rows.length;
  }
  const cells = rows[column.column]!.cells;
  const cut = cells.filter((_, at) => at % 2 === 0 && isPair(cells, at)).length;
  return cells.length > 2 && cut * 4 > cells.length;
}

const listed = (words: readonly string[]): string =>
  words.length < 2 ? words.join('') : `${words.slice(0, -1).join(', ')} and ${words.at(-1)}`;

/** Names of what was not used. */
function ignoredOf({ orientation, rows, column }: Candidate): string[] {
  const lineName = ({ line, cells }: Row): string => {
    const word = cells.find((cell) => cell.trim() !== '' && numberText(cell) === null)?.trim();
    return word ? `line ${line}, “${word.slice(0, 24)}”` : `line ${line}`;
  };
  if (orientation === 'columns')
    return rows.filter((_, row) => row !== column.column && !isHeaderLine(row, column)).map(lineName);
  const width = rows.reduce((most, { cells }) => Math.max(most, cells.length), 0);
  const names = Array.from({ length: width }, (_, at) => at).flatMap((at) => {
    if (at === column.column || at === column.numbering) return [];
    if (column.rows.every((row) => (rows[row]!.cells[at] ?? '').trim() === '')) return [];
    const heading = column.before.map((row) => rows[row]!.cells[at]?.trim() ?? '').find((cell) => cell !== '');
    return [heading ? heading.slice(0, 24) : `column ${at + 1}`];
  });
  return [...names, ...column.beside.map((row) => lineName(rows[row]!))];
}

/** In a table with all groups in one line: the lines over it that number or head them. */
const isHeaderLine = (row: number, column: ColumnReading): boolean =>
  row < column.column && (row === column.numbering || column.numbering === null);

const nothing = (refusal: string, separator: Separator, problems: ReadingText['problems'] = []): ReadingText => ({
  ...{ groupVolts: [], separator, decimal: 'none', unit: 'V', orientation: 'rows', headerLines: 0, ignored: [] },
  ...{ problems, refusal, lines: [] },
});

/** The lines of a list as a person names them: 'line 4', 'lines 4, 7 and 9', 'lines 4, 7, 9 and 12 more'. */
export function linesNamed(lines: readonly number[]): string {
  const names = lines.map(String);
  if (names.length === 1) return `line ${names[0]}`;
  return `lines ${names.length > 4 ? `${names.slice(0, 3).join(', ')} and ${names.length - 3} more` : listed(names)}`;
}

const notATable =
  'No table of group voltages stands here. It needs a group a line, or all groups in one line, in volts or millivolts.';

/**
 * Reads the voltages of a pack's groups from a table: comma, semicolon, tab or space between the cells, decimal comma or
 * point, V or mV by their size, with or without header, groups in lines or in columns. Whatever cannot be read is
 * named by its line and nothing is guessed in its place.
 */
export function readReadingText(raw: string, wish: ReadingWish): ReadingText {
  let text = raw.replace(/^\ufeff/, '').replace(/\r\n?/g, '\n');
  // The first line by which some spreadsheets say their separator is no line of the table, but stays counted.
  const said = /^sep=(.)\n/i.exec(text)?.[1];
  if (said) text = text.replace(/^.*\n/, '\n');
  if (text.trim() === '') return nothing('Nothing stands here. Paste the table, or choose a file.', 'none');
  const bySaid = separators.find((one) => signs[one] === said);
  const asked = wish.separator ?? bySaid ?? null;
  const tried = asked
    ? [asked]
    : separators.filter((one) => one !== 'space' && (one === 'none' || text.includes(signs[one])));
  let candidates = tried.flatMap((one) => candidatesOf(text, one, wish));
  if (!asked && !candidates.some(({ column }) => column.volts.length === wish.groupCount) && text.includes(' '))
    candidates = [...candidates, ...candidatesOf(text, 'space', wish)];
  const best = candidates.reduce<Candidate | null>((top, one) => (top && top.score >= one.score ? top : one), null);

  const anyRows = best?.rows ?? rowsOf(text, asked ?? tried[0]!).rows;
  const formulas = anyRows.flatMap(({ line, cells }) =>
    cells
      .filter(isFormula)
      .slice(0, 1)
      .map((cell) => ({ line, text: `“${cell.trim().slice(0, 24)}” is a formula.` })),
  );
  if (!best) {
    if (formulas.length > 0)
      return nothing(`${formulaSentence(formulas.map(({ line }) => line))}`, asked ?? 'none', formulas);
    return nothing(notATable, asked ?? 'none');
  }
  const { rows, column, orientation, separator } = best;
  const cellOf = (row: number): string =>
    (orientation === 'rows' ? rows[row]!.cells[column.column] : rows[column.column]!.cells[row]) ?? '';
  const lineOf = (row: number): number => (orientation === 'rows' ? rows[row]! : rows[column.column]!).line;
  const marked = column.rows.map(cellOf).find((cell) => /[.,]/.test(cell));
  const groupOfRow = new Map(column.rows.map((row, group) => [row, group]));
  const source = text.split('\n');
  const headerRows =
    orientation === 'rows' ? column.before.length : rows.filter((_, row) => isHeaderLine(row, column)).length;
  const problems = [
    ...formulas,
    ...column.bad
      .map(({ row, text: sentence }) => ({ line: lineOf(row), text: sentence, cell: cellOf(row) }))
      .filter(({ cell }) => !isFormula(cell))
      .map(({ line, text: sentence }) => ({ line, text: sentence })),
  ].sort((a, b) => a.line - b.line);
  return {
    groupVolts: column.volts,
    separator,
    decimal: marked === undefined ? 'none' : marked.includes(',') ? 'comma' : 'point',
    unit: column.unit,
    orientation,
    headerLines: headerRows + (said ? 1 : 0),
    ignored: ignoredOf(best),
    problems,
    refusal: refusalOf(
      best,
      wish.groupCount,
      formulas.map(({ line }) => line),
    ),
    lines: rows.slice(0, LINES_SHOWN).map(({ line }, row) => ({
      line,
      text: (source[line - 1] ?? '').replaceAll('\t', ' ⇥ '),
      header: orientation === 'rows' ? column.before.includes(row) : isHeaderLine(row, column),
      groups:
        orientation === 'rows'
          ? groupOfRow.has(row)
            ? [groupOfRow.get(row)!]
            : null
          : row === column.column
            ? column.volts.map((_, group) => group)
            : null,
    })),
  };
}

const formulaSentence = (lines: readonly number[]): string =>
  `${capital(linesNamed(lines))} ${lines.length === 1 ? 'holds a formula' : 'hold formulas'}, no voltage. Save the table with its values only.`;

const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);

function refusalOf(best: Candidate, groupCount: number, formulas: readonly number[]): string | null {
  const { column, open } = best;
  if (open !== null)
    return `From line ${open} on a quotation mark stands open. Close it, or take it out, and read the table again.`;
  if (formulas.length > 0) return formulaSentence(formulas);
  if (commaClash(best))
    return 'The comma separates the columns and is the decimal mark too. Separate the columns by semicolons.';
  const count = column.volts.length;
  if (count === groupCount) return null;
  if (count < (count + column.bad.length) / 2) return notATable;
  const has = `${count} ${count === 1 ? 'group was' : 'groups were'} understood; this pack has ${groupCount}.`;
  return column.bad.length > 0
    ? `${has} ${capital(linesNamed([...new Set(column.bad.map(({ row }) => (best.orientation === 'rows' ? best.rows[row]! : best.rows[column.column]!).line))]))} ${column.bad.length === 1 ? 'was' : 'were'} not understood.`
    : `${has} Choose the table of this pack, or correct the pack.`;
}
