import Papa from 'papaparse';

/** What stands in a cell; null: nothing. */
export type CsvCell = string | number | null;

/** A spreadsheet takes what begins so for a formula, after white space too; NUL hides what follows it. */
const formula = /^[\s\u0000]*[=+\-@\t\r\n\u0000＝＋－＠]/u;

/**
 * Lines of a CSV that no spreadsheet runs: a text that would begin a formula stands behind an apostrophe, a number stays
 * a number. Every CSV of the server is written here.
 */
export const csvLines = (rows: readonly (readonly CsvCell[])[]): string =>
  `${Papa.unparse(rows as CsvCell[][], { escapeFormulae: formula, newline: '\r\n' })}\r\n`;

/** Said first, so that a spreadsheet reads the file as UTF-8. */
export const csvBegin = '\ufeff';
