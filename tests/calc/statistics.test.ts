import {
  CalcInputError,
  inverseNormal,
  latinHypercube,
  latinHypercubeNormal,
  quantile,
  seededRandom,
} from '@/calc/index';
import { describe, expect, it } from 'vitest';

describe('quantiles of type 7', () => {
  // Hyndman & Fan, The American Statistician 50 (1996) 361–365, worked out apart; NumPy's and R's default.
  it.each([
    [0.05, 16],
    [0.25, 20],
    [0.4, 29],
    [0.5, 35],
    [0.75, 40],
    [0.9, 46],
    [0.95, 48],
  ])('of 15 20 35 40 50 at %d is %d', (p, expected) => {
    expect(quantile([40, 15, 50, 20, 35], p)).toBeCloseTo(expected, 10);
  });

  it.each([
    [0.5, 3.5],
    [0.8, 4.08],
    [0.9, 4.89],
    [0.95, 5.695],
  ])('of eight readings from 2.5 to 6.5 at %d is %d', (p, expected) => {
    expect(quantile([2.5, 3.0, 3.1, 3.4, 3.6, 3.9, 4.2, 6.5], p)).toBeCloseTo(expected, 10);
  });

  it('leaves the sample as it was, takes one value, and refuses none and a p above 1', () => {
    const values = [3, 1, 2];
    expect(quantile(values, 1)).toBe(3);
    expect(values).toEqual([3, 1, 2]);
    expect(quantile([7], 0.9)).toBe(7);
    expect(() => quantile([], 0.5)).toThrow(CalcInputError);
    expect(() => quantile([1], 1.01)).toThrow(CalcInputError);
  });
});

describe('normal deviates', () => {
  // Tables of the standard normal distribution.
  it.each([
    [0.5, 0],
    [0.9, 1.2815515655446004],
    [0.975, 1.959963984540054],
    [0.999, 3.090232306167813],
    [0.01, -2.326347874040841],
    [1e-6, -4.753424308822899],
  ])('below which a share of %d lies is %d, to 1e-8', (p, deviate) => {
    expect(Math.abs(inverseNormal(p) - deviate)).toBeLessThan(1e-8);
  });

  it('refuses 0 and 1, where there is none', () => {
    expect(() => inverseNormal(0)).toThrow(CalcInputError);
    expect(() => inverseNormal(1)).toThrow(CalcInputError);
  });
});

describe('seeded numbers', () => {
  it('are the same for the same seed and others for another', () => {
    const take = (seed: number) => {
      const random = seededRandom(seed);
      return Array.from({ length: 20 }, random);
    };
    expect(take(42)).toEqual(take(42));
    expect(take(42)).not.toEqual(take(43));
    expect(take(2 ** 40 + 1)).not.toEqual(take(1));
  });

  it('100 000 of them have a mean of ½ and a variance of 1/12 to 0.5 %, and no neighbour tells the next', () => {
    const random = seededRandom(5);
    const values = Array.from({ length: 100_000 }, random);
    const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
    const variance = values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / values.length;
    const lagged =
      values.slice(1).reduce((sum, value, i) => sum + (value - mean) * (values[i]! - mean), 0) / values.length;
    expect(Math.abs(mean / 0.5 - 1)).toBeLessThan(0.005);
    expect(Math.abs(variance * 12 - 1)).toBeLessThan(0.01);
    expect(Math.abs(lagged / variance)).toBeLessThan(0.01);
    expect(values.every((value) => value >= 0 && value < 1)).toBe(true);
  });

  it('a seed that is no whole number is refused', () => {
    expect(() => seededRandom(0.5)).toThrow(CalcInputError);
  });
});

describe('a Latin hypercube', () => {
  it('of 64 points in 7 dimensions puts exactly one in each 64th of every axis', () => {
    const points = latinHypercube(64, 7, 11);
    for (let d = 0; d < 7; d++) {
      const slices = points.map((point) => Math.floor(point[d]! * 64)).sort((a, b) => a - b);
      expect(slices).toEqual(Array.from({ length: 64 }, (_, i) => i));
    }
  });

  it('of 64 normal deviates has mean 0 and standard deviation 1 to 0.02, where chance alone would leave 0.12 and 0.09', () => {
    for (let seed = 0; seed < 20; seed++) {
      const points = latinHypercubeNormal(64, 3, seed);
      for (let d = 0; d < 3; d++) {
        const axis = points.map((point) => point[d]!);
        const mean = axis.reduce((sum, value) => sum + value, 0) / 64;
        const deviation = Math.sqrt(axis.reduce((sum, value) => sum + (value - mean) ** 2, 0) / 64);
        expect(Math.abs(mean)).toBeLessThan(0.02);
        expect(Math.abs(deviation - 1)).toBeLessThan(0.02);
      }
    }
  });

  it('does not pair its axes: over 50 seeds two axes are correlated by less than 0.05 on the mean', () => {
    let sum = 0;
    for (let seed = 0; seed < 50; seed++) {
      const points = latinHypercubeNormal(64, 2, seed);
      sum += points.reduce((total, [a, b]) => total + a! * b!, 0) / 64;
    }
    expect(Math.abs(sum / 50)).toBeLessThan(0.05);
  });
});
