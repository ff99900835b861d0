import { compileCurve, type CompiledCurve } from '../curve/compiled-curve';
import { curveSoc } from '../curve/ocv';
import { requireFinite } from '../require';
import type { OcvTable } from '../types';

/**
 * State of charge of a rest voltage, also where a curve is level beyond its end: there the end stands for all that lies past it. A
 * meter's offset may carry a sample out there, and that is no reason to refuse a plan.
 */
export const socOf = (table: OcvTable, volts: number): number =>
  socOfCurve(compileCurve(table), requireFinite('volts', volts));

/** The same of a table that was made ready, a number taken as given. */
export function socOfCurve(curve: CompiledCurve, volts: number): number {
  const soc = curveSoc(curve, volts);
  if (!Number.isNaN(soc)) return soc;
  return volts < curve.volts[0]! ? curve.knots[0]! : curve.knots[curve.knots.length - 1]!;
}
