import { CalcInputError } from '../errors';
import type { OcvTable } from '../types';
import { pchipSlopes } from './pchip-slopes';
import { PieceFinder } from './piece-finder';

/** Numbers kept for each piece: start, U there and the three higher coefficients, and ∫U dz from the first knot. */
export const PIECE = 6;
/** And for its inverse: the three coefficients of the cubic through both ends in ΔU, near enough to begin at. */
export const INVERSE = 3;

/**
 * A table made ready for use: one cubic a piece in local coordinates, a straight piece before the first knot and one
 * after the last. Piece k holds soc in [knots[k − 1], knots[k]).
 */
export interface CompiledCurve {
  knots: Float64Array;
  volts: Float64Array;
  pieces: Float64Array;
  inverses: Float64Array;
  /** The piece that holds a state of charge, and the one that holds a voltage. */
  ofSoc: PieceFinder;
  ofVolts: PieceFinder;
}

const cache = new WeakMap<OcvTable, CompiledCurve>();

/**
 * Checks a table and works out its pieces, once for each table object (a table must not be changed after its first
 * use).
 *
 * @throws CalcInputError where the columns differ in length, hold fewer than two points, or do not rise strictly
 */
export function compileCurve(table: OcvTable): CompiledCurve {
  const known = cache.get(table);
  if (known) return known;
  checkColumn('curve.soc', table.soc);
  checkColumn('curve.volts', table.volts);
  if (table.soc.length !== table.volts.length)
    throw new CalcInputError('curve.volts', table.volts, `a list of ${table.soc.length}, as many as curve.soc`);
  const compiled = build(Float64Array.from(table.soc), Float64Array.from(table.volts));
  cache.set(table, compiled);
  return compiled;
}

function checkColumn(field: string, column: number[]): void {
  if (!Array.isArray(column) || column.length < 2) throw new CalcInputError(field, column, 'a list of two or more');
  for (let k = 0; k < column.length; k++) {
    const value = column[k]!;
    if (!Number.isFinite(value)) throw new CalcInputError(`${field}[${k}]`, value, 'a number');
    if (k > 0 && value <= column[k - 1]!)
      throw new CalcInputError(`${field}[${k}]`, value, `above the one before it, ${column[k - 1]}`);
  }
}

function build(knots: Float64Array, volts: Float64Array): CompiledCurve {
  const n = knots.length;
  const slopes = pchipSlopes(knots, volts);
  const pieces = new Float64Array(PIECE * (n + 1));
  const inverses = new Float64Array(INVERSE * (n + 1));
  pieces.set([knots[0]!, volts[0]!, slopes[0]!, 0, 0, 0], 0);
  let area = 0;
  for (let k = 0; k < n - 1; k++) {
    const h = knots[k + 1]! - knots[k]!;
    const secant = (volts[k + 1]! - volts[k]!) / h;
    const square = (3 * secant - 2 * slopes[k]! - slopes[k + 1]!) / h;
    const cube = (slopes[k]! + slopes[k + 1]! - 2 * secant) / (h * h);
    pieces.set([knots[k]!, volts[k]!, slopes[k]!, square, cube, area], PIECE * (k + 1));
    inverses.set(inverseOf(h, volts[k + 1]! - volts[k]!, slopes[k]!, slopes[k + 1]!), INVERSE * (k + 1));
    area += h * (volts[k]! + h * (slopes[k]! / 2 + h * (square / 3 + (h * cube) / 4)));
  }
  pieces.set([knots[n - 1]!, volts[n - 1]!, slopes[n - 1]!, 0, 0, area], PIECE * n);
  return { knots, volts, pieces, inverses, ofSoc: new PieceFinder(knots), ofVolts: new PieceFinder(volts) };
}

/** z over ΔU as the cubic with both ends and their slopes, rising; the straight line where an end is level. */
function inverseOf(width: number, rise: number, slope: number, endSlope: number): number[] {
  const secant = width / rise;
  const from = slope > 0 ? Math.min(1 / slope, 3 * secant) : secant;
  const to = endSlope > 0 ? Math.min(1 / endSlope, 3 * secant) : secant;
  return [from, (3 * secant - 2 * from - to) / rise, (from + to - 2 * secant) / (rise * rise)];
}
