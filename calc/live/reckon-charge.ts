import type { ReckonInput, Reckoning } from '../live-types';
import { dominantDoubt } from '../plan/doubt-shares';
import type { PlanModel } from '../plan/plan-model';
import { socOf } from '../plan/soc-of';
import type { Band, PlanOption } from '../plan-types';
import { quantile } from '../statistics/quantile';
import { weightedQuantiles } from '../statistics/weighted-quantile';
import { expectedAt } from './expected-at';
import { toGroups } from './live-groups';
import { liveAhead, type Ahead } from './live-ahead';
import { liveModel, type LiveModel } from './live-model';
import { livePast, type ReplayInput } from './live-rounds';
import { endOf, liveSegments } from './live-segments';
import { finishOf, fixedClock, likelyClock } from './live-clock';
import { isOverrun, stageOf, taperOf } from './live-stage';
import { followReadings } from './follow-readings';
import { learnedTimes } from './learned-times';
import { learnedModel } from './learned-model';
import { liveDoubt } from './live-doubt';
import { thinReadings } from './thin-readings';

/**
 * The state of a running charge from its plan and its readings: where each group stands, the stage, and when it will be ready.
 *
 * Replays from the clip-on every time, so that a corrected reading corrects everything after it. The charge delivered is that
 * of the readings and certain; what is still to come runs through the core from the present state, and its band through the
 * plan's samples from theirs, so that it narrows as the charge goes on. With no readings it is the plan, counted from the first
 * current.
 *
 * A held charge, one that waits for a swap of its clips, and one whose last reading shows no current, are reckoned to go on at
 * `nowS`. A current that a reading shows after its reckoned end is believed: it flows until a reading or a person says
 * otherwise. Voltages are never switched, only reckoned.
 *
 * @throws CalcInputError for numbers that cannot be
 */
export function reckonCharge(input: ReckonInput): Reckoning {
  const planned = liveModel(input);
  const { nowS, option } = input;
  const kept = thinReadings(input.readings, nowS);
  const replay: ReplayInput = { option, runs: input.runs, currentOffAtS: input.currentOffAtS, readings: kept };
  const asPlanned = livePast(planned, replay, nowS);
  const followed = followReadings(planned, asPlanned, kept, input.seed);
  const model = learnedModel(planned, followed, endSoc(planned, option));
  const past = isNominal(planned, model) ? asPlanned : livePast(model, replay, nowS);
  const over = input.currentOffAtS !== null && input.currentOffAtS <= nowS;
  const ahead: Ahead = over ? { rounds: [], endState: past.state, ampHours: 0 } : liveAhead(model, replay, past);
  const current = past.begun[past.begun.length - 1]!;
  const flowsOn = !over && ahead.rounds.length === 1 && isOverrun(current);

  const fixed = fixedClock(model, input, replay, past, ahead, over);
  const secondsIn = learnedTimes(planned, model, replay, ahead);
  const samples = model.samples();
  const seconds = samples.map((sample, at) => finishOf(fixed, ahead, (lane) => secondsIn(lane, sample, at)));
  const byS = bandOf(seconds, model.weights);
  const clock = likelyClock(fixed, ahead, byS.p50);
  const readyS = shifted(byS, clock.readyS - byS.p50);

  const currentEndS = clock.currentEndS;
  const running = clock.rounds[0];
  const isResting = ahead.rounds.length === 0;
  const taperAtS = taperOf(current, running, isResting);
  const stepEndS = isResting || current.endedAtS !== null ? (endOf(current) ?? nowS) : (running?.toS ?? nowS);
  const waits = !isResting && current.endedAtS !== null;
  const flowing = current.open && !current.pasts.every((one) => one.noCurrent) && !over;
  const groups = toGroups(model, kept, past, current, flowing, fixed.seen?.restVolts ?? null);
  const lane = current.lanes[0]!;
  const amps = flowing ? current.pasts.reduce((sum, one) => sum + (one.endedAtS === null ? one.amps : 0), 0) : 0;

  return {
    stage: stageOf({
      isResting,
      waits,
      tapering: taperAtS !== null && taperAtS <= nowS && !waits,
      nowS,
      restEndS: clock.restEndS,
    }),
    groups: groups.groups,
    amps: lane.sign * amps,
    terminalVolts: flowing
      ? lane.clipVolts(past.state, current.pasts[0]!.endedAtS === null ? current.pasts[0]!.amps : 0)
      : groups.groups.reduce((sum, group) => sum + group.clipVolts, 0),
    deliveredAh: past.deliveredAh,
    plannedAh: option.ampHours,
    stepIndex: current.steps[0]!,
    stepEndS: flowsOn ? nowS : stepEndS,
    taperAtS,
    currentEndS,
    restEndS: clock.restEndS,
    readyS,
    segments: liveSegments(past, clock),
    laggingGroup: groups.laggingGroup,
    lagVolts: groups.lagVolts,
    expected: expectedAt(planned, replay, nowS),
    dominant:
      model.weights === null ? dominantDoubt(samples, seconds).dominant : liveDoubt(samples, model.weights, seconds),
    readingChance: followed.chance,
    odd: followed.odd,
    learned: followed.learned,
  };
}

/** Charge that the plan moves, as a share of the capacity, mean of the groups. */
function endSoc(model: PlanModel, option: PlanOption): number {
  const after = option.endGroupVolts.map((volts, group) =>
    Math.abs(socOf(model.curve, volts) - model.startSoc[group]!),
  );
  return after.reduce((sum, one) => sum + one, 0) / after.length;
}

const isNominal = (planned: PlanModel, model: LiveModel): boolean =>
  planned.groups.every(
    (group, at) =>
      group.capacityAh === model.groups[at]!.capacityAh &&
      group.polarisationResistanceOhm === model.groups[at]!.polarisationResistanceOhm,
  );

function bandOf(seconds: readonly number[], weights: Float64Array | null): Band {
  const [p10, p50, p90] =
    weights === null
      ? [0.1, 0.5, 0.9].map((share) => quantile(seconds, share))
      : weightedQuantiles(seconds, weights, [0.1, 0.5, 0.9]);
  return { p10: p10!, p50: p50!, p90: p90! };
}

const shifted = ({ p10, p50, p90 }: Band, byS: number): Band => ({ p10: p10 + byS, p50: p50 + byS, p90: p90 + byS });
