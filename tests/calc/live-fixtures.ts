import type { ReckonInput, RunStretch } from '@/calc/live-types';
import type { PlanInput, PlanOption } from '@/calc/plan-types';

/** The input of a running charge as the server stores it with its option. */
export const reckonInput = (plan: PlanInput, option: PlanOption, over: Partial<ReckonInput> = {}): ReckonInput => ({
  module: plan.module,
  spare: plan.spare,
  target: plan.target,
  channels: plan.channels,
  resistors: plan.resistors,
  workshop: plan.workshop,
  option,
  celsius: plan.celsius,
  runs: [{ fromS: 0, toS: null }],
  readings: [],
  currentOffAtS: null,
  nowS: 0,
  seed: plan.seed,
  ...(plan.samples === undefined ? {} : { samples: plan.samples }),
  ...(plan.spreads === undefined ? {} : { spreads: plan.spreads }),
  ...over,
});

/** The stretches of a charge whose clips were swapped just as planned, up to the step that runs at `nowS`. */
export function plannedRuns(option: PlanOption, nowS: number): RunStretch[] {
  const from = option.currentStartS;
  const starts = option.steps.flatMap((step, at) => {
    const before = option.steps[at - 1];
    return before && step.startS - before.startS <= 1 ? [] : [at];
  });
  return starts.flatMap((at, place) => {
    const fromS = option.steps[at]!.startS - from;
    if (fromS > nowS) return [];
    const next = starts[place + 1];
    const toS = next === undefined ? null : option.steps[next]!.startS - from;
    return [{ fromS, toS: toS !== null && toS <= nowS ? toS : null, stepIndex: at }];
  });
}
