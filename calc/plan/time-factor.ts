import { CalcInputError } from '../errors';
import type { PlanInput, TimeFactor } from '../plan-types';
import { quantile } from '../statistics/quantile';
import type { DraftStep } from './draft';

/** Closed charges that weigh as much as the samples do in how wide the band is: a guess. */
const SAMPLES_WORTH = 10;

/** What was learned of the channel that the bulk of a draft runs on; null: nothing, or it was taken off. */
export function timeFactorOf(input: PlanInput, steps: readonly DraftStep[]): TimeFactor | null {
  const bulk = steps.find((step) => step.kind === 'bulk' && step.channel !== null);
  if (!bulk) return null;
  const own = bulk.channel!.timeFactor;
  const factor = own === undefined ? (input.timeFactor ?? null) : own;
  return factor === null || factor.charges === 0 ? null : factor;
}

/**
 * Seconds of current of the samples as the closed charges have them: moved by the learned factor, and as wide, by the
 * logarithm, as charges have scattered, the more so the more of them there are.
 *
 * @param sampled seconds of each step in each sample
 * @throws CalcInputError for a factor that is none
 */
export function withTimeFactor(sampled: readonly number[][], factor: TimeFactor): number[][] {
  if (!(factor.mean > 0) || !Number.isFinite(factor.mean))
    throw new CalcInputError('timeFactor.mean', factor.mean, 'a number above 0');
  if (!(factor.sd >= 0) || !Number.isFinite(factor.sd))
    throw new CalcInputError('timeFactor.sd', factor.sd, 'a number, 0 or above');
  const totals = sampled.map((seconds) => seconds.reduce((sum, one) => sum + one, 0));
  const { middle, stretch } = scatterOf(totals, factor);
  return sampled.map((seconds, at) => {
    const total = totals[at]!;
    if (!(total > 0)) return [...seconds];
    const times = factor.mean * Math.exp((stretch - 1) * (Math.log(total) - middle));
    return seconds.map((one) => one * times);
  });
}

/** Middle of the samples' seconds, by the logarithm, and how many times as wide closed charges have made them. */
export function scatterOf(totals: readonly number[], factor: TimeFactor): { middle: number; stretch: number } {
  const flowing = totals.filter((total) => total > 0).map(Math.log);
  if (flowing.length === 0) return { middle: 0, stretch: 1 };
  const mean = flowing.reduce((sum, log) => sum + log, 0) / flowing.length;
  const variance = flowing.reduce((sum, log) => sum + (log - mean) ** 2, 0) / flowing.length;
  const seen = (factor.sd / factor.mean) ** 2;
  const weight = factor.charges / (factor.charges + SAMPLES_WORTH);
  const stretch = variance > 0 ? Math.sqrt((weight * seen + (1 - weight) * variance) / variance) : 1;
  return { middle: quantile(flowing, 0.5), stretch };
}

/** 'Learned from 14 charges: 6 % longer than reckoned.' */
export function timeFactorText({ mean, charges }: TimeFactor): string {
  const percent = Math.round(Math.abs(mean - 1) * 100);
  const how = percent === 0 ? 'as reckoned' : `${percent}\u00a0% ${mean > 1 ? 'longer' : 'shorter'} than reckoned`;
  return `Learned from ${charges} ${charges === 1 ? 'charge' : 'charges'}: ${how}.`;
}
