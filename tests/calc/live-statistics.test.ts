import { describe, expect, it } from 'vitest';
import { inverseNormal, quantile } from '@/calc/index';
import { normalCdf, twoSidedTail } from '@/calc/statistics/normal-cdf';
import { choleskyLower, effectiveSampleSize, systematicResample } from '@/calc/statistics/particle-weights';
import { weightedQuantile, weightedQuantiles } from '@/calc/statistics/weighted-quantile';

describe('the weighted quantile', () => {
  it('is type 7 where the weights are equal: the published values of 15 20 35 40 50', () => {
    // R. J. Hyndman, Y. Fan (1996), the design's check values.
    const values = [40, 15, 50, 20, 35];
    const alike = [2, 2, 2, 2, 2];
    for (const [p, expected] of [
      [0.05, 16],
      [0.25, 20],
      [0.4, 29],
      [0.5, 35],
      [0.75, 40],
      [0.9, 46],
      [0.95, 48],
    ] as const)
      expect(weightedQuantile(values, alike, p)).toBeCloseTo(expected, 9);
  });

  it('takes a point of no weight for not there, and does not mind the scale of the weights', () => {
    const values = [3, 9, 1, 7, 100, 5];
    const weights = [1, 1, 1, 1, 0, 1];
    for (const p of [0, 0.1, 0.5, 0.77, 1]) {
      expect(weightedQuantile(values, weights, p)).toBeCloseTo(quantile([3, 9, 1, 7, 5], p), 9);
      expect(
        weightedQuantile(
          values,
          weights.map((one) => one * 37),
          p,
        ),
      ).toBeCloseTo(weightedQuantile(values, weights, p), 9);
    }
  });

  it('of even points weighted by a normal density gives the normal quantiles to a hundredth', () => {
    const values = Array.from({ length: 2001 }, (_, k) => -5 + k / 200);
    const weights = values.map((z) => Math.exp(-0.5 * z * z));
    const found = weightedQuantiles(values, weights, [0.1, 0.5, 0.9]);
    // Tables of the normal distribution.
    [-1.2816, 0, 1.2816].forEach((z, at) => expect(Math.abs(found[at]! - z)).toBeLessThan(0.01));
  });

  it('refuses weights that cannot be', () => {
    expect(() => weightedQuantile([1, 2], [1], 0.5)).toThrow('as many as values');
    expect(() => weightedQuantile([1, 2], [1, -1], 0.5)).toThrow('0 or more');
    expect(() => weightedQuantile([1, 2], [0, 0], 0.5)).toThrow('not all 0');
  });
});

describe('the normal distribution', () => {
  it('has the shares of the tables, and is turned round by the inverse to a billionth', () => {
    // Abramowitz and Stegun, table 26.1.
    for (const [z, share] of [
      [0, 0.5],
      [1, 0.841344746],
      [2, 0.977249868],
      [3, 0.998650102],
    ] as const)
      expect(Math.abs(normalCdf(z) - share)).toBeLessThan(1e-9);
    for (const p of [1e-6, 0.01, 0.3, 0.5, 0.9, 0.9999])
      expect(Math.abs(normalCdf(inverseNormal(p)) - p)).toBeLessThan(1e-9);
    expect(twoSidedTail(1.959964)).toBeCloseTo(0.05, 6);
    expect(twoSidedTail(-40)).toBe(0);
  });
});

describe('weights of samples', () => {
  it('are worth all of them when equal, one when one has it all', () => {
    expect(effectiveSampleSize([2, 2, 2, 2])).toBeCloseTo(4, 12);
    expect(effectiveSampleSize([0, 5, 0])).toBe(1);
    expect(effectiveSampleSize([3, 1])).toBeCloseTo(1.6, 12);
  });

  it('pick each sample as often as its share says, to within one, wherever the comb begins', () => {
    const weights = [0.1, 0.4, 0.05, 0.25, 0.2, 0, 0, 0, 0, 0];
    for (const offset of [0.01, 0.37, 0.5, 0.99]) {
      const picked = [...systematicResample(weights, offset)];
      expect(picked).toHaveLength(10);
      weights.forEach((weight, at) => {
        const times = picked.filter((one) => one === at).length;
        expect(Math.abs(times - 10 * weight)).toBeLessThan(1);
      });
    }
  });
});

describe('the triangle of a covariance', () => {
  it('times its transpose is the matrix, and a direction without variance stays still', () => {
    const matrix = Float64Array.from([4, 2, 0, 0.6, 2, 5, 0, 1.2, 0, 0, 0, 0, 0.6, 1.2, 0, 3]);
    const lower = choleskyLower(matrix, 4);
    for (let row = 0; row < 4; row += 1)
      for (let column = 0; column < 4; column += 1) {
        let sum = 0;
        for (let k = 0; k < 4; k += 1) sum += lower[row * 4 + k]! * lower[column * 4 + k]!;
        expect(sum).toBeCloseTo(matrix[row * 4 + column]!, 12);
      }
    expect([...lower.slice(8, 12)]).toEqual([0, 0, 0, 0]);
  });
});
