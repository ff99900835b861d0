import { SIGMA_PER_MAD } from '../parameters/pack';
import { quantile } from '../statistics/quantile';

export interface Robust {
  median: number;
  /** Median of the distances from the median. */
  mad: number;
  /** 1.4826 · MAD, which is the standard deviation of a normal sample, but never below the floor. */
  sigma: number;
}

/** Middle and scatter of a sample that up to half of the values cannot spoil. */
export function robust(values: readonly number[], sigmaFloor: number): Robust {
  const median = quantile(values, 0.5);
  const mad = quantile(
    values.map((value) => Math.abs(value - median)),
    0.5,
  );
  return { median, mad, sigma: Math.max(sigmaFloor, SIGMA_PER_MAD * mad) };
}
