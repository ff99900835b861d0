import { isBeyondCurve, slopeAtSoc, socAtVolts } from '../curve/ocv';
import type { OcvTable } from '../types';
import type { SeriesLoop } from './series-loop';

/**
 * Charge at which the loop's summed rest voltage has moved to `volts` in the current's direction, C; 0 where it is
 * already there, Infinity where a curve that is flat beyond its end keeps it from ever getting there.
 */
export function coulombsToEmf(loop: SeriesLoop, volts: number): number {
  const miss = (q: number) => {
    loop.at(q);
    return loop.sense * (loop.emf - volts);
  };
  let low = 0;
  let atLow = miss(0);
  if (atLow >= -1e-10) return 0;
  const fullest = 1 / Math.max(...loop.socPerCoulomb.map(Math.abs));
  let high = fullest / 8;
  let atHigh = miss(high);
  while (atHigh < 0) {
    if (high > 1e6 * fullest) return Infinity;
    low = high;
    atLow = atHigh;
    high *= 2;
    atHigh = miss(high);
  }
  let q = low + ((high - low) * -atLow) / (atHigh - atLow);
  for (let i = 0; i < 80; i++) {
    const off = miss(q);
    if (off === 0) return q;
    if (off > 0) high = q;
    else low = q;
    const slope = loop.sense * loop.emfSlope;
    let next = slope > 0 ? q - off / slope : low;
    if (!(next > low && next < high)) next = (low + high) / 2;
    if (Math.abs(next - q) <= 1e-13 * fullest) return next;
    q = next;
  }
  return q;
}

/**
 * Charge at which the first group rests at `volts`, C, with its branch; below 0 where one is already past it, Infinity
 * where its curve never gets there.
 */
export function coulombsToGroupVolts(loop: SeriesLoop, volts: number): { coulombs: number; branch: number } {
  let coulombs = Infinity;
  let branch = -1;
  for (let b = 0; b < loop.branchCount; b++) {
    const { curve, sense } = loop.parts[b]!;
    const soc = isFlatAt(curve, volts) ? sense * Infinity : socAtVolts(curve, volts);
    const q = (soc - loop.startSoc[b]!) / loop.socPerCoulomb[b]!;
    if (q < coulombs) {
      coulombs = q;
      branch = b;
    }
  }
  return { coulombs, branch };
}

/** The voltage lies beyond an end at which the curve is flat. */
function isFlatAt(curve: OcvTable, volts: number): boolean {
  if (!isBeyondCurve(curve, volts)) return false;
  const end = volts > curve.volts[0]! ? curve.soc.length - 1 : 0;
  return slopeAtSoc(curve, curve.soc[end]! + (end === 0 ? -1 : 1)) <= 0;
}
