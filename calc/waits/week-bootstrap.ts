import { CalcInputError } from '../errors';
import { quantileOfSorted } from '../statistics/quantile';
import { seededRandom } from '../statistics/seeded-random';
import type { WaitFigure } from './waits-types';

const DRAWS = 200;

/** Rows of a history, each in a week. */
export interface WeekRows {
  /** Week of each row, 0 … weeks − 1. */
  week: Int32Array;
  weeks: number;
  waitHours: Float64Array;
  lostHours: Float64Array;
}

/**
 * Lost hours per week and type-7 percentiles of the waits, each with its 80 % interval: whole weeks are drawn with
 * replacement 200 times, since the waits of one week hang together (block bootstrap, percentile interval).
 *
 * @throws CalcInputError for a history without rows
 */
export function weekBootstrap(
  { week, weeks, waitHours, lostHours }: WeekRows,
  seed: number,
): { lost: WaitFigure; p50: WaitFigure; p90: WaitFigure } {
  if (waitHours.length === 0) throw new CalcInputError('charges', [], 'a list of one or more');
  const order = Array.from(waitHours.keys()).sort((a, b) => waitHours[a]! - waitHours[b]!);
  const sorted = Float64Array.from(order, (at) => waitHours[at]!);
  const weekOf = Int32Array.from(order, (at) => week[at]!);
  const lostOf = new Float64Array(weeks);
  const rowsOf = new Int32Array(weeks);
  week.forEach((one, at) => {
    lostOf[one]! += lostHours[at]!;
    rowsOf[one]! += 1;
  });
  const random = seededRandom(seed);
  const drawn = { lost: [] as number[], p50: [] as number[], p90: [] as number[] };
  for (let draw = 0; draw < DRAWS; draw += 1) {
    const times = new Int32Array(weeks);
    let lost = 0;
    let rows = 0;
    for (let at = 0; at < weeks; at += 1) {
      const one = Math.floor(random() * weeks);
      times[one]! += 1;
      lost += lostOf[one]!;
      rows += rowsOf[one]!;
    }
    drawn.lost.push(lost / weeks);
    if (rows === 0) continue;
    const [p50, p90] = repeated(sorted, weekOf, times, rows);
    drawn.p50.push(p50);
    drawn.p90.push(p90);
  }
  const figure = (value: number, draws: number[]): WaitFigure => {
    const rising = draws.sort((a, b) => a - b);
    return { value, low: quantileOfSorted(rising, 0.1), high: quantileOfSorted(rising, 0.9) };
  };
  return {
    lost: figure(lostOf.reduce((sum, one) => sum + one, 0) / weeks, drawn.lost),
    p50: figure(quantileOfSorted(sorted, 0.5), drawn.p50),
    p90: figure(quantileOfSorted(sorted, 0.9), drawn.p90),
  };
}

/** Median and 90th percentile, type 7, of a rising list in which each row stands as often as its week was drawn. */
function repeated(sorted: Float64Array, weekOf: Int32Array, times: Int32Array, rows: number): [number, number] {
  let at = -1;
  let passed = 0;
  const valueAt = (place: number) => {
    while (passed <= place) passed += times[weekOf[(at += 1)]!]!;
    return sorted[at]!;
  };
  const at7 = (p: number) => {
    const place = (rows - 1) * p;
    const low = valueAt(Math.floor(place));
    const high = valueAt(Math.min(Math.floor(place) + 1, rows - 1));
    return low + (place - Math.floor(place)) * (high - low);
  };
  return [at7(0.5), at7(0.9)];
}
