import type { RestReading } from './predict-rest';

/** Bins for each doubling of the time rested. */
const BINS_PER_DOUBLING = 3;
/** Readings earlier than this still carry the end of current, s. */
const EARLIEST_S = 2;

export interface RestPoint {
  s: number;
  volts: number;
  sd: number;
}

/**
 * Readings of a rest thinned by the logarithm of the time: those of one bin become their mean. A logger's hundred readings of
 * the same minutes then weigh little more than a few, because what is off between the model and the cell is off for all of
 * them alike: no mean is trusted closer than `floorVolts`.
 *
 * @param noiseVolts scatter of a single reading
 * @param floorVolts what readings of one bin have in common, the rounding to the last digit for instance
 */
export function binned(readings: readonly RestReading[], noiseVolts: number, floorVolts: number): RestPoint[] {
  const bins = new Map<number, RestReading[]>();
  for (const reading of readings) {
    if (!(reading.s >= EARLIEST_S)) continue;
    const bin = Math.floor(Math.log2(reading.s) * BINS_PER_DOUBLING);
    const known = bins.get(bin);
    if (known) known.push(reading);
    else bins.set(bin, [reading]);
  }
  return [...bins.values()]
    .map((own) => ({
      s: own.reduce((sum, one) => sum + one.s, 0) / own.length,
      volts: own.reduce((sum, one) => sum + one.volts, 0) / own.length,
      sd: Math.hypot(noiseVolts / Math.sqrt(own.length), floorVolts),
    }))
    .sort((a, b) => a.s - b.s);
}
