/** Grid lines: at most four, on round numbers. */

const steps = [0.01, 0.02, 0.05, 0.1, 0.2, 0.5, 1, 2, 5, 10, 20, 25, 50, 100, 200, 250, 500, 1000, 2000, 5000];
const tidy = (value: number) => Math.round(value * 1e6) / 1e6;

/** The multiples of `step` between two ends, both included. */
export function multiples(low: number, high: number, step: number): number[] {
  const found: number[] = [];
  for (let i = Math.ceil(low / step - 1e-9); i * step <= high + step * 1e-9; i++) found.push(tidy(i * step) || 0);
  return found;
}

/**
 * Grid lines of a volt axis: each 0.1 V where that gives no more than four lines, wider apart on a long axis, closer on
 * one that is shorter than two tenths.
 */
export function voltLines(low: number, high: number): number[] {
  const least = high - low < 0.2 ? 0 : 0.1;
  const step = steps.find((each) => each >= least && multiples(low, high, each).length <= 4) ?? 1;
  return multiples(low, high, step);
}

/** Decimals a set of lines needs so that no two read alike. */
export const lineDecimals = (lines: readonly number[]): number =>
  [0, 1, 2].find((decimals) => lines.every((line) => Math.abs(line - Number(line.toFixed(decimals))) < 1e-6)) ?? 2;

/** The top of an axis that begins at 0, and its lines: the least round number of at most `most` steps over `value`. */
export function fromZero(value: number, most = 3): { top: number; lines: number[] } {
  const wanted = Math.max(value, 1e-6);
  const step = steps.find((each) => each * most >= wanted - 1e-9) ?? wanted / most;
  const top = tidy(Math.ceil(wanted / step - 1e-9) * step);
  return { top, lines: multiples(0, top, step) };
}
