import { quantile } from '../statistics/quantile';
import type { Doubt } from '../plan-types';
import { DOUBT_OF_AXIS, SAMPLE_AXES, type Sample } from './samples';
import { mean } from '../statistics/mean';

/** Least samples for a regression on the axes; below it the doubts cannot be told apart. */
const LEAST_SAMPLES = 16;

/**
 * Which number's doubt makes most of a band, and how much narrower the band would be without it.
 *
 * The samples' times are regressed on the draws of each axis (the axes of a Latin hypercube are as good as uncorrelated, so
 * each slope stands for itself); what the slopes of one doubt explain is taken off the times, and the 10 to 90 % width of what
 * remains is compared.
 */
export function dominantDoubt(
  samples: readonly Sample[],
  seconds: readonly number[],
): { dominant: Doubt; narrowsByS: number } {
  const count = samples.length;
  if (count < LEAST_SAMPLES) return { dominant: 'capacity', narrowsByS: 0 };
  const meanS = mean(seconds);
  const slopes = SAMPLE_AXES.map((_, axis) => {
    const meanDraw = mean(samples.map((sample) => sample.draws[axis]!));
    let cross = 0;
    let square = 0;
    samples.forEach((sample, at) => {
      const off = sample.draws[axis]! - meanDraw;
      cross += off * (seconds[at]! - meanS);
      square += off * off;
    });
    return cross / square;
  });
  const whole = width(seconds);
  let best: { dominant: Doubt; narrowsByS: number; square: number } | null = null;
  for (const doubt of new Set(SAMPLE_AXES.map((axis) => DOUBT_OF_AXIS[axis]))) {
    const axes = SAMPLE_AXES.flatMap((axis, at) => (DOUBT_OF_AXIS[axis] === doubt ? [at] : []));
    const square = axes.reduce((sum, axis) => sum + slopes[axis]! ** 2, 0);
    if (best !== null && square <= best.square) continue;
    const without = seconds.map((value, at) =>
      axes.reduce((left, axis) => left - slopes[axis]! * samples[at]!.draws[axis]!, value),
    );
    best = { dominant: doubt, narrowsByS: Math.max(0, whole - width(without)), square };
  }
  return { dominant: best!.dominant, narrowsByS: best!.narrowsByS };
}

const width = (values: readonly number[]): number => quantile(values, 0.9) - quantile(values, 0.1);
