import { CalcInputError } from '../errors';
import { requireFinite } from '../require';
import type { OcvTable } from '../types';
import { compileCurve, INVERSE, PIECE, type CompiledCurve } from './compiled-curve';

/**
 * Open-circuit voltage of one cell, V: PCHIP through the table, straight beyond its ends.
 *
 * @param soc state of charge, 0…1
 * @throws CalcInputError for a table that cannot be, or a soc that is no number
 * @example voltsAtSoc({ soc: [0, 1], volts: [3, 4] }, 0.25) === 3.25
 */
export function voltsAtSoc(table: OcvTable, soc: number): number {
  return curveVolts(compileCurve(table), requireFinite('soc', soc));
}

/** The same of a table that was made ready, a number taken as given. */
export function curveVolts({ ofSoc, pieces }: CompiledCurve, soc: number): number {
  const p = PIECE * ofSoc.at(soc);
  const x = soc - pieces[p]!;
  return pieces[p + 1]! + x * (pieces[p + 2]! + x * (pieces[p + 3]! + x * pieces[p + 4]!));
}

/**
 * Slope dU/dz of the open-circuit voltage, V per unit of charge.
 *
 * @param soc state of charge, 0…1
 * @example slopeAtSoc({ soc: [0, 1], volts: [3, 4] }, 0.25) === 1
 */
export function slopeAtSoc(table: OcvTable, soc: number): number {
  const { ofSoc, pieces } = compileCurve(table);
  const p = PIECE * ofSoc.at(requireFinite('soc', soc));
  const x = soc - pieces[p]!;
  return pieces[p + 2]! + x * (2 * pieces[p + 3]! + x * 3 * pieces[p + 4]!);
}

/**
 * State of charge at which a cell rests at `volts`: the inverse of `voltsAtSoc`, to about 1e-15.
 *
 * @throws CalcInputError where the curve is flat beyond its end and never gets there
 * @example socAtVolts({ soc: [0, 1], volts: [3, 4] }, 3.25) === 0.25
 */
export function socAtVolts(table: OcvTable, volts: number): number {
  const curve = compileCurve(table);
  const soc = curveSoc(curve, requireFinite('volts', volts));
  if (Number.isNaN(soc))
    throw new CalcInputError(
      'volts',
      volts,
      `between ${curve.volts[0]} and ${curve.volts.at(-1)}, the ends of the curve`,
    );
  return soc;
}

/** The same of a table that was made ready, a number taken as given; NaN where the curve never gets there. */
export function curveSoc(curve: CompiledCurve, volts: number): number {
  const { pieces } = curve;
  const k = curve.ofVolts.at(volts);
  const p = PIECE * k;
  const rise = volts - pieces[p + 1]!;
  if (rise === 0) return pieces[p]!;
  if (k > 0 && k < curve.knots.length) return pieces[p]! + solvePiece(curve, k, rise);
  return pieces[p + 2]! > 0 ? pieces[p]! + rise / pieces[p + 2]! : NaN;
}

/** An error this far below the last digit of a state of charge. */
const NO_MORE = 1e-17;

/** Halley's method kept inside a shrinking bracket; the piece rises, so there is one root in (0, width). */
function solvePiece({ knots, pieces, inverses }: CompiledCurve, k: number, rise: number): number {
  const p = PIECE * k;
  const i = INVERSE * k;
  const c1 = pieces[p + 2]!;
  const c2 = pieces[p + 3]!;
  const c3 = pieces[p + 4]!;
  let low = 0;
  let high = knots[k]! - pieces[p]!;
  let x = rise * (inverses[i]! + rise * (inverses[i + 1]! + rise * inverses[i + 2]!));
  for (let pass = 0; pass < 60; pass++) {
    const miss = x * (c1 + x * (c2 + x * c3)) - rise;
    if (miss === 0) return x;
    if (miss > 0) high = x;
    else low = x;
    const slope = c1 + x * (2 * c2 + x * 3 * c3);
    const bend = c2 + 3 * c3 * x;
    let next = x - (miss * slope) / (slope * slope - miss * bend);
    const inside = next > low && next < high;
    if (!inside) next = (low + high) / 2;
    const step = Math.abs(next - x);
    if (step <= 1e-16) return next;
    // The next error is the cube of the step times (U''/2U')² − U'''/6U'.
    if (inside && (bend * bend + Math.abs(c3) * slope) * step * step * step <= NO_MORE * slope * slope) return next;
    x = next;
  }
  return x;
}

/** Whether a rest voltage lies outside the table, so that its state of charge comes from the straight extension. */
export function isBeyondCurve(table: OcvTable, volts: number): boolean {
  const curve = compileCurve(table);
  return volts < curve.volts[0]! || volts > curve.volts[curve.volts.length - 1]!;
}

/** The same table with every voltage moved by `byVolts` (a table offset, or a temperature term). */
export function shiftCurve(table: OcvTable, byVolts: number): OcvTable {
  return { soc: table.soc, volts: table.volts.map((volts) => volts + byVolts) };
}
