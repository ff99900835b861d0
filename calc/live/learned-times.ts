import type { PlanModel } from '../plan/plan-model';
import { scatterOf } from '../plan/time-factor';
import type { Sample } from '../plan/samples';
import { weightedQuantiles } from '../statistics/weighted-quantile';
import { quantile } from '../statistics/quantile';
import { liveAhead, type Ahead, type LaneAhead } from './live-ahead';
import type { LiveModel } from './live-model';
import { livePast, type ReplayInput } from './live-rounds';

/** Seconds of a lane still to come in one sample. */
export type SecondsIn = (lane: LaneAhead, sample: Sample, at: number) => number;

/**
 * Seconds of current still to come in each sample, scattered as closed charges have been (withTimeFactor): the plan's own factor
 * on how wide its samples are, about the middle of what is to come. How much longer charges take is in the lanes.
 */
export function learnedTimes(planned: PlanModel, model: LiveModel, replay: ReplayInput, ahead: Ahead): SecondsIn {
  const stretch = plannedStretch(planned, replay);
  if (stretch === 1) return (lane, sample) => lane.secondsIn(sample);
  const logs = totalsOf(ahead, model.samples()).map((total) => Math.log(Math.max(total, 1e-6)));
  const middle = model.weights === null ? quantile(logs, 0.5) : weightedQuantiles(logs, model.weights, [0.5])[0]!;
  const times = logs.map((log) => Math.exp((stretch - 1) * (log - middle)));
  return (lane, sample, at) => Math.max(0, lane.totalIn(sample) * times[at]! - lane.elapsedS);
}

/** How much wider than the samples of the plan closed charges have made its band; 1: nothing was learned. */
function plannedStretch(planned: PlanModel, replay: ReplayInput): number {
  const factor = planned.input.timeFactor ?? null;
  if (factor === null || planned.sampleCount === 1) return 1;
  const unread: ReplayInput = { ...replay, runs: [{ fromS: 0, toS: null }], readings: [], currentOffAtS: null };
  const model: LiveModel = { ...planned, weights: null, planned: planned.nominal };
  return scatterOf(totalsOf(liveAhead(model, unread, livePast(planned, unread, 0)), planned.samples()), factor).stretch;
}

const totalsOf = (ahead: Ahead, samples: readonly Sample[]): number[] =>
  samples.map((sample) =>
    ahead.rounds.reduce((sum, { lanes }) => lanes.reduce((total, lane) => total + lane.totalIn(sample), sum), 0),
  );
