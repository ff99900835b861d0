import { CHEMISTRIES } from '../parameters/chemistries';
import { publishedCurves } from '../parameters/published-curves';
import type { ChemistryId } from '../plan-types';
import type { OcvTable } from '../types';
import { compileCurve } from './compiled-curve';
import { readRow, type CurveCell, type CurvePoint } from './own-curve-rows';

/** What stands in the way of a curve, and what to change. */
export interface CurveProblem {
  /** 1-based, as the file has them; null: the whole of it. */
  row: number | null;
  text: string;
}

export type OwnCurve =
  | { ok: true; curve: OcvTable; fromSoc: number; toSoc: number; inPercent: boolean }
  | { ok: false; problems: CurveProblem[] };

const LEAST_POINTS = 8;
const MOST_POINTS = 2000;
/** A curve that begins later or ends earlier says nothing of what workshops meet. */
const FROM_SOC = 0.1;
const TO_SOC = 0.9;
/** Between two points farther apart than this a curve is a guess. */
const WIDEST_GAP = 0.2;
/** A rest voltage may lie this far past the limits of its chemistry, V. */
const BEYOND_VOLTS = 0.1;
/** From here on the sentences repeat themselves. */
const MOST_PROBLEMS = 20;

/**
 * A workshop's own open-circuit curve from the rows of a table: state of charge and rest volts of one cell.
 *
 * States of charge may be shares or per cent, rising or falling, with point or comma; a first row of words is a heading, empty
 * rows do not count. Both columns must rise strictly, there must be 8 points or more from 10 to 90 % of charge with no gap
 * over 20 %, and the volts must be possible for the chemistry.
 *
 * @param rows cells as a reader of CSV gives them, first and second column
 * @returns the curve, ready for use, or sentences by row that say what to change
 */
export function checkOwnCurve(rows: readonly (readonly CurveCell[])[], chemistry: ChemistryId): OwnCurve {
  const problems: CurveProblem[] = [];
  const points: CurvePoint[] = [];
  rows.forEach((cells, at) => {
    const read = readRow(cells, at + 1);
    if (read === null) return;
    if ('text' in read) problems.push(read);
    else points.push(read);
  });
  if (problems.length > 0 && points.length === 0 && rows.length > 0) return failed(problems);
  // Per cent where somebody wrote the sign, or where a value can be nothing else.
  const inPercent = points.some((point) => point.percentSign || point.soc > 1.5);
  const shares = points.map((point) => ({ ...point, soc: inPercent ? point.soc / 100 : point.soc }));
  if (shares.length > 1 && shares[0]!.soc > shares[shares.length - 1]!.soc) shares.reverse();
  problems.push(...rangeProblems(shares, chemistry), ...orderProblems(shares), ...wholeProblems(shares));
  if (problems.length > 0) return failed(problems);
  const curve = { soc: shares.map(({ soc }) => soc), volts: shares.map(({ volts }) => volts) };
  compileCurve(curve);
  return { ok: true, curve, fromSoc: curve.soc[0]!, toSoc: curve.soc[curve.soc.length - 1]!, inPercent };
}

function failed(problems: CurveProblem[]): OwnCurve {
  const sorted = [...problems].sort((a, b) => (a.row ?? 0) - (b.row ?? 0));
  if (sorted.length <= MOST_PROBLEMS) return { ok: false, problems: sorted };
  const more = sorted.length - MOST_PROBLEMS;
  return {
    ok: false,
    problems: [...sorted.slice(0, MOST_PROBLEMS), { row: null, text: `And ${more} more of the kind further down.` }],
  };
}

function rangeProblems(points: readonly CurvePoint[], chemistry: ChemistryId): CurveProblem[] {
  const { chargeLimitVolts, dischargeLimitVolts } = CHEMISTRIES[chemistry];
  const shipped = publishedCurves(chemistry).map(({ curve }) => curve.volts[0]!);
  const least = Math.min(dischargeLimitVolts, ...shipped) - BEYOND_VOLTS;
  const most = chargeLimitVolts + BEYOND_VOLTS;
  return points.flatMap(({ row, soc, volts }): CurveProblem[] => {
    const found: CurveProblem[] = [];
    if (soc < 0 || soc > 1)
      found.push({ row, text: `A state of charge of ${percent(soc)} cannot be. Give 0 to 100\u00a0%.` });
    if (volts >= least && volts <= most) return found;
    const millivolts = volts / 1000 >= least && volts / 1000 <= most;
    found.push({
      row,
      text: millivolts
        ? `${volts} looks like millivolts. In volts it is ${(volts / 1000).toFixed(3)}. Give volts.`
        : `${volts}\u00a0V cannot be a cell of this chemistry at rest: those lie between ${least.toFixed(2)} and ${most.toFixed(2)}\u00a0V. Give the volts of one cell, or choose the chemistry.`,
    });
    return found;
  });
}

function orderProblems(points: readonly CurvePoint[]): CurveProblem[] {
  return points.slice(1).flatMap((point, at): CurveProblem[] => {
    const before = points[at]!;
    if (point.soc === before.soc)
      return [{ row: point.row, text: `The same state of charge as in row ${before.row}. Keep one of them.` }];
    if (point.soc < before.soc)
      return [
        { row: point.row, text: `The state of charge goes back against row ${before.row}. Sort the rows by it.` },
      ];
    if (point.volts <= before.volts)
      return [
        {
          row: point.row,
          text: `${point.volts}\u00a0V does not rise above the ${before.volts}\u00a0V of row ${before.row}. Take out the one that was read wrong.`,
        },
      ];
    return [];
  });
}

function wholeProblems(points: readonly CurvePoint[]): CurveProblem[] {
  if (points.length < LEAST_POINTS)
    return [
      {
        row: null,
        text: `${points.length} ${points.length === 1 ? 'point' : 'points'} are too few. Give ${LEAST_POINTS} or more.`,
      },
    ];
  if (points.length > MOST_POINTS)
    return [
      {
        row: null,
        text: `${points.length} points are too many. Give ${MOST_POINTS} at most: one for each half per cent is plenty.`,
      },
    ];
  const found: CurveProblem[] = [];
  const first = points[0]!.soc;
  const last = points[points.length - 1]!.soc;
  if (first > FROM_SOC)
    found.push({
      row: null,
      text: `The curve begins at ${percent(first)}. Add points down to ${percent(FROM_SOC)} or lower.`,
    });
  if (last < TO_SOC)
    found.push({
      row: null,
      text: `The curve ends at ${percent(last)}. Add points up to ${percent(TO_SOC)} or higher.`,
    });
  points.slice(1).forEach((point, at) => {
    const before = points[at]!;
    if (point.soc - before.soc > WIDEST_GAP + 1e-9)
      found.push({
        row: point.row,
        text: `Nothing between ${percent(before.soc)} and ${percent(point.soc)}. Add a point there.`,
      });
  });
  return found;
}

const percent = (soc: number): string => `${Math.round(soc * 1000) / 10}\u00a0%`;
