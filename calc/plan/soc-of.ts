import { isBeyondCurve, slopeAtSoc, socAtVolts } from '../curve/ocv';
import type { OcvTable } from '../types';

/**
 * State of charge of a rest voltage, also where a curve is level beyond its end: there the end stands for all that lies past it. A
 * meter's offset may carry a sample out there, and that is no reason to refuse a plan.
 */
export function socOf(curve: OcvTable, volts: number): number {
  if (!isBeyondCurve(curve, volts)) return socAtVolts(curve, volts);
  const end = volts < curve.volts[0]! ? curve.soc[0]! : curve.soc[curve.soc.length - 1]!;
  return slopeAtSoc(curve, end) > 0 ? socAtVolts(curve, volts) : end;
}
