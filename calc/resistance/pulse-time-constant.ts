import { CalcInputError } from '../errors';
import { requirePositive } from '../require';

/** A resistance read so long after a step of current. */
export interface PulseResistance {
  afterS: number;
  ohm: number;
}

/**
 * Time constant of the one RC pair that passes through a short pulse, a longer one and the whole resistance, s: R(t) =
 * R0 + R1·(1 − e^(−t/τ)) with R0 what the short pulse sees and R0 + R1 the long resistance.
 *
 * One pair cannot hold both the first minute and the last hour of a real cell: this one is right for the minutes in which a
 * taper falls, and too quick for a rest (see calc/rest/ for that).
 *
 * @param short for instance 0.5 s
 * @param longer for instance 30 s; of several the longest is the one to give
 * @param longOhm the whole resistance, R0 + R1
 * @throws CalcInputError unless short < longer < long in ohm and the times rise
 */
export function pulseTimeConstant(short: PulseResistance, longer: PulseResistance, longOhm: number): number {
  requirePositive('short.ohm', short.ohm);
  if (!(longer.afterS > short.afterS))
    throw new CalcInputError('longer.afterS', longer.afterS, `later than ${short.afterS} s`);
  if (!(longer.ohm > short.ohm && longer.ohm < longOhm))
    throw new CalcInputError('longer.ohm', longer.ohm, `between ${short.ohm} and ${longOhm}`);
  return -(longer.afterS - short.afterS) / Math.log1p(-(longer.ohm - short.ohm) / (longOhm - short.ohm));
}
