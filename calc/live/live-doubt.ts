import type { Doubt } from '../plan-types';
import { DOUBT_OF_AXIS, SAMPLE_AXES, type Sample } from '../plan/samples';
import { choleskyLower } from '../statistics/particle-weights';
import { LIVE_AXES } from './live-draws';

/**
 * Which number's doubt makes most of what is left of a band, by weighted samples.
 *
 * Readings tie the axes together, so that they are regressed on all at once; the share of a doubt is the variance that its axes
 * make with those slopes.
 */
export function liveDoubt(samples: readonly Sample[], weights: Float64Array, seconds: readonly number[]): Doubt {
  const size = LIVE_AXES;
  const means = new Float64Array(size);
  let meanS = 0;
  samples.forEach(({ draws }, at) => {
    meanS += weights[at]! * seconds[at]!;
    for (let axis = 0; axis < size; axis += 1) means[axis]! += weights[at]! * draws[axis]!;
  });
  const cov = new Float64Array(size * size);
  const cross = new Float64Array(size);
  samples.forEach(({ draws }, at) => {
    for (let row = 0; row < size; row += 1) {
      const off = weights[at]! * (draws[row]! - means[row]!);
      cross[row]! += off * (seconds[at]! - meanS);
      for (let column = 0; column <= row; column += 1)
        cov[row * size + column]! += off * (draws[column]! - means[column]!);
    }
  });
  for (let row = 0; row < size; row += 1)
    for (let column = row + 1; column < size; column += 1) cov[row * size + column] = cov[column * size + row]!;
  const slopes = solve(cov, cross, size);
  const shares = new Map<Doubt, number>();
  for (const doubt of new Set(Object.values(DOUBT_OF_AXIS))) {
    const axes = Array.from({ length: size }, (_, axis) => axis).filter((axis) => doubtOf(axis) === doubt);
    let variance = 0;
    for (const one of axes)
      for (const other of axes) variance += slopes[one]! * slopes[other]! * cov[one * size + other]!;
    shares.set(doubt, variance);
  }
  return [...shares].reduce((most, one) => (one[1] > most[1] ? one : most))[0];
}

function doubtOf(axis: number): Doubt {
  return axis < SAMPLE_AXES.length ? DOUBT_OF_AXIS[SAMPLE_AXES[axis]!] : 'curve';
}

/** Least squares with a small ridge: axes that say the same share it. */
function solve(matrix: Float64Array, right: Float64Array, size: number): Float64Array {
  const ridged = Float64Array.from(matrix);
  for (let k = 0; k < size; k += 1) ridged[k * size + k]! += 1e-3;
  const lower = choleskyLower(ridged, size);
  const y = new Float64Array(size);
  for (let row = 0; row < size; row += 1) {
    let sum = right[row]!;
    for (let k = 0; k < row; k += 1) sum -= lower[row * size + k]! * y[k]!;
    y[row] = sum / lower[row * size + row]!;
  }
  const x = new Float64Array(size);
  for (let row = size - 1; row >= 0; row -= 1) {
    let sum = y[row]!;
    for (let k = row + 1; k < size; k += 1) sum -= lower[k * size + row]! * x[k]!;
    x[row] = sum / lower[row * size + row]!;
  }
  return x;
}
