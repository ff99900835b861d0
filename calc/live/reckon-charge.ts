import type { LiveReading, ReckonInput, Reckoning } from '../live-types';
import { dominantDoubt } from '../plan/doubt-shares';
import { minimumRestS } from '../plan/minimum-rest';
import type { PlanModel } from '../plan/plan-model';
import { socOf } from '../plan/soc-of';
import type { Band, PlanOption } from '../plan-types';
import { quantile } from '../statistics/quantile';
import { weightedQuantiles } from '../statistics/weighted-quantile';
import { settleSeconds } from '../step/settle';
import { expectedAt } from './expected-at';
import { toGroups } from './live-groups';
import { liveAhead, type Ahead } from './live-ahead';
import { liveModel, type LiveModel } from './live-model';
import { livePast, type LivePast, type LiveRound, type ReplayInput } from './live-rounds';
import { endOf, liveSegments, type AheadClock } from './live-segments';
import { rested } from './module-state';
import { followReadings } from './follow-readings';
import { learnedModel } from './learned-model';
import { liveDoubt } from './live-doubt';
import { thinReadings } from './thin-readings';
import { restSeen } from './rest-readings';

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
  const seconds = model.samples.map((sample) => finishOf(fixed, ahead, (lane) => lane.secondsIn(sample)));
  const byS = bandOf(seconds, model.weights);
  const clock = likelyClock(fixed, ahead, byS.p50);
  const readyS = shifted(byS, clock.readyS - byS.p50);
  if (fixed.settledAtS !== null) shorten(clock, fixed);

  const currentEndS = clock.currentEndS;
  const running = clock.rounds[0];
  const isResting = ahead.rounds.length === 0;
  const taperAtS = taperOf(current, running, isResting);
  const stepEndS = isResting || current.endedAtS !== null ? (endOf(current) ?? nowS) : (running?.toS ?? nowS);
  const waits = !isResting && current.endedAtS !== null;
  const flowing = current.open && !current.pasts.every((one) => one.noCurrent) && !over;
  const seen = isResting
    ? restSeen(model, input.readings, currentEndS, nowS, (s) => stateBack(model, replay, past, currentEndS, s))
    : null;
  const groups = toGroups(model, kept, past, current, flowing, seen?.restVolts ?? null);
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
      model.weights === null
        ? dominantDoubt(model.samples, seconds).dominant
        : liveDoubt(model.samples, model.weights, seconds),
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

interface FixedClock {
  nowS: number;
  /** Last current where it is over; else null. */
  currentEndS: number | null;
  /** The first round still to come begins here: now, or with the hands after it. */
  restS: number;
  checkS: number;
  waitS: number;
  settledAtS: number | null;
}

function fixedClock(
  model: PlanModel,
  input: ReckonInput,
  replay: ReplayInput,
  past: LivePast,
  ahead: Ahead,
  over: boolean,
): FixedClock {
  const { nowS, option } = input;
  const { workshop } = model.input;
  const current = past.begun[past.begun.length - 1]!;
  const isOver = over || ahead.rounds.length === 0;
  const currentEndS = isOver
    ? over
      ? Math.min(input.currentOffAtS!, endOf(current) ?? Infinity)
      : (endOf(current) ?? nowS)
    : null;
  const endState = isOver ? stateBack(model, replay, past, currentEndS!, currentEndS!) : ahead.endState;
  const tau = model.groups.map((group) => group.polarisationTimeConstantS);
  const lastSteps = past.rounds[past.rounds.length - 1]!.length;
  const offS = lastSteps * workshop.clipOffS + (option.busbarsOff ? workshop.busbarsS : 0);
  const celsius = lastCelsius(input.readings, nowS) ?? model.celsius;
  const restS = Math.max(
    minimumRestS({ input: model.input, celsius }, endState.soc),
    settleSeconds(endState.over, tau, model.settledVolts(model.groups.length)),
    offS,
  );
  const settledAtS =
    currentEndS === null
      ? null
      : restSeen(model, input.readings, currentEndS, nowS, (s) => stateBack(model, replay, past, currentEndS, s))
          .settledAtS;
  return { nowS, currentEndS, restS, checkS: workshop.checkS, waitS: 0, settledAtS };
}

/** The module at an instant of the rest: replayed to the end of current, then at rest. */
function stateBack(model: PlanModel, replay: ReplayInput, past: LivePast, currentEndS: number, s: number) {
  if (s >= past.state.s) return past.state;
  const atEnd = livePast(model, replay, currentEndS);
  return rested(model, atEnd.state, Math.max(s, currentEndS));
}

type SecondsOf = (lane: Ahead['rounds'][number]['lanes'][number]) => number;

function finishOf(fixed: FixedClock, ahead: Ahead, secondsOf: SecondsOf): number {
  if (fixed.currentEndS !== null) return restEnd(fixed, fixed.currentEndS) + fixed.checkS;
  let at = fixed.nowS;
  for (const round of ahead.rounds) at += round.handsS + Math.max(...round.lanes.map(secondsOf));
  return at + fixed.restS + fixed.checkS;
}

const restEnd = (fixed: FixedClock, currentEndS: number): number =>
  fixed.settledAtS === null ? currentEndS + fixed.restS : Math.min(currentEndS + fixed.restS, fixed.settledAtS);

/**
 * The middle of the samples and the nominal run may end minutes apart, and the nominal one says when the current is over. What
 * is left of it is therefore not stretched or pressed further than this: the likely end slides over to the nominal one as that
 * comes near, in place of standing at 'now' until it is there.
 */
const LEAST_STRETCH = 0.5;

const clamp = (value: number, least: number, most: number): number => Math.min(most, Math.max(least, value));

/** The likely course: what is to come by the nominal run, stretched so that it is ready at the middle of the band. */
function likelyClock(fixed: FixedClock, ahead: Ahead, p50: number): AheadClock {
  if (fixed.currentEndS !== null) {
    const restEndS = restEnd(fixed, fixed.currentEndS);
    return { rounds: [], currentEndS: fixed.currentEndS, restEndS, readyS: restEndS + fixed.checkS };
  }
  const nominal = finishOf(fixed, ahead, (lane) => lane.seconds);
  const flowing = ahead.rounds.reduce((sum, round) => sum + Math.max(...round.lanes.map((lane) => lane.seconds)), 0);
  const stretch = flowing > 0 ? clamp(1 + (p50 - nominal) / flowing, LEAST_STRETCH, 1 / LEAST_STRETCH) : 1;
  let at = fixed.nowS;
  const rounds = ahead.rounds.map((round) => {
    const last = round.lanes.reduce((longest, lane) => (lane.seconds > longest.seconds ? lane : longest));
    const fromS = at + round.handsS;
    const toS = fromS + last.seconds * stretch;
    const one = {
      handsFromS: at,
      fromS,
      taperS: last.taperAfterS === null ? null : fromS + last.taperAfterS * stretch,
      toS,
    };
    at = toS;
    return one;
  });
  return { rounds, currentEndS: at, restEndS: at + fixed.restS, readyS: at + fixed.restS + fixed.checkS };
}

function shorten(clock: AheadClock, fixed: FixedClock): void {
  clock.restEndS = restEnd(fixed, clock.currentEndS);
  clock.readyS = clock.restEndS + fixed.checkS;
}

const isOverrun = (round: LiveRound): boolean => round.open && round.pasts.some((one) => one.overrun);

function taperOf(
  current: LiveRound,
  running: AheadClock['rounds'][number] | undefined,
  isResting: boolean,
): number | null {
  const past = current.pasts.map((one) => one.taperAtS);
  if (past.every((one) => one !== null)) return Math.max(...past.map((one) => one!));
  if (isResting || current.endedAtS !== null) return null;
  return running?.taperS ?? null;
}

function stageOf(at: {
  isResting: boolean;
  waits: boolean;
  tapering: boolean;
  nowS: number;
  restEndS: number;
}): Reckoning['stage'] {
  if (at.isResting) return at.nowS >= at.restEndS ? 'check-due' : 'resting';
  return at.tapering ? 'tapering' : 'charging';
}

function lastCelsius(readings: readonly LiveReading[], nowS: number): number | null {
  return readings.findLast((reading) => reading.celsius !== null && reading.s <= nowS)?.celsius ?? null;
}
