/** A curve as it is pasted or comes out of a file: what was understood of it, and what to change. Pure. */
import Papa from 'papaparse';
import { checkOwnCurve, type OwnCurve } from '@/calc';
import type { Chemistry } from './curve-layout';

export type CurveSeparator = 'semicolon' | 'tab' | 'comma';
const signs: Readonly<Record<CurveSeparator, string>> = { semicolon: ';', tab: '\t', comma: ',' };

export interface CurveRead {
  own: OwnCurve;
  separator: CurveSeparator;
  /** The first row is words. */
  heading: boolean;
  /** The first lines as they stand in the text, beside what they were read as; null: as no point. */
  lines: { text: string; soc: string | null; volts: string | null }[];
}

const linesShown = 4;

/**
 * A semicolon or a tab anywhere tells: where the comma is the decimal mark a guess by counting takes it for the separator.
 */
export const separatorOf = (text: string): CurveSeparator =>
  text.includes(';') ? 'semicolon' : text.includes('\t') ? 'tab' : 'comma';

/** Reads the rows of a table of states of charge and rest volts; null where there is nothing to read. */
export function readCurveText(text: string, chemistry: Chemistry): CurveRead | null {
  if (text.trim() === '') return null;
  const separator = separatorOf(text);
  const rows = Papa.parse<string[]>(text, { delimiter: signs[separator] }).data;
  const heading = (rows[0] ?? []).slice(0, 2).every((cell) => !/^\s*[-+]?[\d.,]/.test(cell));
  const checked = checkOwnCurve(rows, chemistry);
  const own: OwnCurve =
    !checked.ok && separator === 'comma' && rows.some((row) => row.length === 4)
      ? {
          ok: false,
          problems: [
            {
              row: null,
              text: 'The comma separates the columns and is the decimal mark too. Separate the columns by semicolons.',
            },
          ],
        }
      : checked;
  const source = text.split(/\r\n|\n|\r/);
  return {
    own,
    separator,
    heading,
    lines: rows.slice(0, linesShown).map((row, at) => ({
      text: (source[at] ?? '').replaceAll('\t', ' ⇥ '),
      soc: heading && at === 0 ? null : (row[0]?.trim() ?? null),
      volts: heading && at === 0 ? null : (row[1]?.trim() ?? null),
    })),
  };
}

/** Characters that no table holds; a spreadsheet's own file and a picture are full of them. */
const isBinary = (text: string): boolean => [...text].some((sign) => sign < ' ' && !'\t\n\v\f\r'.includes(sign));

/** Why a file is no table at all, and what to do; null: it is read as one. */
export function fileProblem({ name, text }: { name: string; text: string }): string | null {
  if (text.trim() === '') return `${name} is empty. Choose another file, or paste the rows.`;
  if (isBinary(text)) return `${name} is no plain text. Save the table as CSV, then choose that file.`;
  return null;
}

/** '13 points understood: semicolon, charge in per cent, one heading line skipped.' */
export function understoodWords({ own, separator, heading }: CurveRead): string {
  if (!own.ok) return '';
  return `${own.curve.soc.length} points understood: ${[
    separator,
    `charge ${own.inPercent ? 'in per cent' : 'as a share'}`,
    ...(heading ? ['one heading line skipped'] : []),
  ].join(', ')}.`;
}
