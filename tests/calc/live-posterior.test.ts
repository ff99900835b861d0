import { add, identity, inv, matrix, multiply, ones, transpose, type Matrix } from 'mathjs';
import { describe, expect, it } from 'vitest';
import { posteriorOf } from '@/calc/live/posterior';
import { LIVE_AXES, liveDraws } from '@/calc/live/live-draws';
import { LiveFacts, slopesOf } from '@/calc/live/live-facts';
import type { Look } from '@/calc/live/particle-set';
import { planModel } from '@/calc/plan/plan-model';
import { SAMPLE_AXES } from '@/calc/plan/samples';
import { channel, planInput } from './plan-fixtures';

const model = planModel(planInput({ channels: [channel('A1')] }));
const draws = liveDraws(256, 11);
const AXES = (['spare-meter', 'charger-meter', 'temperature'] as const).map((axis) => SAMPLE_AXES.indexOf(axis));
/** Looks whose readings are straight in three of the draws, with an error that they share and one of their own. */
const SLOPES = [
  [0.9, 0.1, -0.4],
  [0.7, -0.5, -0.4],
  [1.3, 0.4, -0.2],
  [0.2, 0.8, -0.6],
];
const READ = [1.4, 0.9, 1.1, -0.6];
const OWN = 0.3;
const SHARED = 0.5;
const looks = READ.map((read, row): Look => ({
  memory: 'volts',
  residual: {
    read,
    place: -1,
    movedSoc: 0,
    slopes: slopesOf({
      spareMeter: -SLOPES[row]![0]!,
      chargerMeter: -SLOPES[row]![1]!,
      temperature: -SLOPES[row]![2]!,
    }),
  },
  sharedSd: SHARED,
  kept: 1,
  ownVariance: OWN ** 2,
}));

describe('samples by all readings at once', () => {
  // The textbook's posterior of a straight model, by matrices: (I + AᵀS⁻¹A)⁻¹ and its mean.
  const a = matrix(SLOPES);
  const noise = add(
    multiply(identity(4) as Matrix, OWN ** 2),
    multiply(matrix(ones([4, 4]) as number[][]), SHARED ** 2),
  ) as Matrix;
  const weighed = multiply(transpose(a), inv(noise));
  const spread = inv(add(identity(3) as Matrix, multiply(weighed, a)) as Matrix);
  const centre = multiply(spread, multiply(weighed, matrix(READ)));
  const { draws: found, weights } = posteriorOf(new LiveFacts(model, []), looks, draws, AXES);
  const drawsOf = (of: Float64Array, at: number): Float64Array => of.subarray(at * LIVE_AXES, (at + 1) * LIVE_AXES);
  const meanOf = (of: (own: Float64Array) => number): number =>
    weights.reduce((sum, weight, at) => sum + weight * of(drawsOf(found, at)), 0);

  it('have the mean of the closed form to 0.1 of its spread and its variance to 20 %', () => {
    AXES.forEach((axis, k) => {
      const mean = Number(centre.get([k]));
      const variance = Number(spread.get([k, k]));
      const own = meanOf((one) => one[axis]!);
      expect(Math.abs(own - mean)).toBeLessThan(0.1 * Math.sqrt(variance));
      expect(Math.abs(meanOf((one) => (one[axis]! - own) ** 2) / variance - 1)).toBeLessThan(0.2);
    });
  });

  it('leave the axes that nothing was read of as they were drawn', () => {
    weights.forEach((_, at) => expect(drawsOf(found, at)[7]).toBe(drawsOf(draws, at)[7]));
  });
});
