import type { LiveReading, ReckonInput } from '../live-types';
import { minimumRestS } from '../plan/minimum-rest';
import type { PlanModel } from '../plan/plan-model';
import { settleSeconds } from '../step/settle';
import type { Ahead } from './live-ahead';
import { livePast, type LivePast, type ReplayInput } from './live-rounds';
import { endOf, type AheadClock } from './live-segments';
import { rested } from './module-state';
import { restSeen, type RestSeen } from './rest-readings';

/** What of the clock is the same in all samples. */
export interface FixedClock {
  nowS: number;
  /** Last current where it is over; else null. */
  currentEndS: number | null;
  /** The first round still to come begins here: now, or with the hands after it. */
  restS: number;
  checkS: number;
  /** What readings of the rest say; null: current is still to come. */
  seen: RestSeen | null;
}

/** The parts of the clock that the samples share: now or the last current, the rest, the check. */
export function fixedClock(
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
  const seen =
    currentEndS === null
      ? null
      : restSeen(model, input.readings, currentEndS, nowS, (s) => stateBack(model, replay, past, currentEndS, s));
  return { nowS, currentEndS, restS, checkS: workshop.checkS, seen };
}

/** The module at an instant of the rest: replayed to the end of current, then at rest. */
function stateBack(model: PlanModel, replay: ReplayInput, past: LivePast, currentEndS: number, s: number) {
  if (s >= past.state.s) return past.state;
  const atEnd = livePast(model, replay, currentEndS);
  return rested(model, atEnd.state, Math.max(s, currentEndS));
}

type SecondsOf = (lane: Ahead['rounds'][number]['lanes'][number]) => number;

/** When the module is ready if each lane takes so long, s from the clip-on. */
export function finishOf(fixed: FixedClock, ahead: Ahead, secondsOf: SecondsOf): number {
  if (fixed.currentEndS !== null) return restEnd(fixed, fixed.currentEndS) + fixed.checkS;
  let at = fixed.nowS;
  for (const round of ahead.rounds) at += round.handsS + Math.max(...round.lanes.map(secondsOf));
  return at + fixed.restS + fixed.checkS;
}

/** The rest ends as reckoned, or where readings show before that it has settled. */
const restEnd = (fixed: FixedClock, currentEndS: number): number =>
  Math.min(currentEndS + fixed.restS, fixed.seen?.settledAtS ?? Infinity);

/**
 * The middle of the samples and the nominal run may end minutes apart, and the nominal one says when the current is over. What
 * is left of it is therefore not stretched or pressed further than this: the likely end slides over to the nominal one as that
 * comes near, in place of standing at 'now' until it is there.
 */
const LEAST_STRETCH = 0.5;

const clamp = (value: number, least: number, most: number): number => Math.min(most, Math.max(least, value));

/** The likely course: what is to come by the nominal run, stretched so that it is ready at the middle of the band. */
export function likelyClock(fixed: FixedClock, ahead: Ahead, p50: number): AheadClock {
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

function lastCelsius(readings: readonly LiveReading[], nowS: number): number | null {
  return readings.findLast((reading) => reading.celsius !== null && reading.s <= nowS)?.celsius ?? null;
}
