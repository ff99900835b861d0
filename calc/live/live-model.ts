import type { ReckonInput } from '../live-types';
import type { PlanInput, PlannedStep } from '../plan-types';
import { planModel, type PlanModel } from '../plan/plan-model';
import { withGuessedLeads } from '../plan/leads';
import type { Sample } from '../plan/samples';
import type { Lane } from './lane';
import { resistorLane } from './resistor-lane';
import { seriesLane } from './series-lane';
import { slowedLane } from './slowed-lane';

/** Steps that begin within this of each other are begun by the same hand, s. */
const TOGETHER_S = 1;

/** The module as the readings have it. */
export interface LiveModel extends PlanModel {
  /** Of the samples; null: all alike. */
  weights: Float64Array | null;
  /** The nominal module of the plan. */
  planned: Sample;
}

/** The module and its samples as the charge was planned with. */
export function liveModel(input: ReckonInput): PlanModel {
  const plan: PlanInput = {
    module: input.module,
    spare: input.spare,
    target: input.target,
    channels: input.channels.map(withGuessedLeads),
    resistors: input.resistors,
    neighbour: null,
    workshop: input.workshop,
    readyByS: null,
    clipOnAtS: 0,
    celsius: input.celsius,
    seed: input.seed,
    // What the plan was made with, whichever of type and channel it was learned for.
    timeFactor: input.option.timeFactor ?? null,
    ...(input.samples === undefined ? {} : { samples: input.samples }),
    ...(input.spreads === undefined ? {} : { spreads: input.spreads }),
  };
  return planModel(plan);
}

/** Indexes of the steps that begin together, in order. */
export function liveRounds(steps: readonly PlannedStep[]): number[][] {
  const rounds: number[][] = [];
  steps.forEach((step, at) => {
    const round = rounds[rounds.length - 1];
    if (round && step.startS - steps[round[0]!]!.startS <= TOGETHER_S) round.push(at);
    else rounds.push([at]);
  });
  return rounds;
}

/** @param socBefore of all groups when the step begins */
export function laneOf(model: PlanModel, step: PlannedStep, index: number, socBefore: readonly number[]): Lane {
  const channel = model.input.channels.find((one) => one.channelId === step.channelIds[0]);
  const lane = channel ? seriesLane(model, step, index, channel) : resistorLane(model, step, index, socBefore);
  return slowedLane(lane, model.input.timeFactor?.mean ?? 1);
}
