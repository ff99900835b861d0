import type { Sample } from '../plan/samples';
import { socOf } from '../plan/soc-of';
import { AS_SET, type Drive } from './lane';
import { liveSampleRun, type MovedIn } from './live-samples';
import type { LiveModel } from './live-model';
import { livePast, type LivePast, type LiveRound, type ReplayInput } from './live-rounds';
import type { ModuleState } from './module-state';

/** One lane's current still to come, seconds. */
export interface LaneAhead {
  stepIndex: number;
  seconds: number;
  /** When a voltage limit begins to rule, seconds from its start; null: never. */
  taperAfterS: number | null;
  secondsIn: (sample: Sample) => number;
  /** The same with `elapsedS`, which has passed in all samples alike since they began. */
  totalIn: (sample: Sample) => number;
  elapsedS: number;
}

/** A round still to come, or what is left of the one that runs. */
export interface RoundAhead {
  /** Hands between the end of the round before (or now) and its first current, s. */
  handsS: number;
  lanes: LaneAhead[];
}

export interface Ahead {
  rounds: RoundAhead[];
  /** At the nominal end of all currents: charge by the plan where a later round is to come, over-voltage of the one that runs. */
  endState: ModuleState;
  /** Charge still to come, as the option counts it, Ah. */
  ampHours: number;
}

/** What is still to come of a charge: the rest of the running round by the core from its present state, then the planned ones. */
export function liveAhead(model: LiveModel, input: ReplayInput, past: LivePast): Ahead {
  const { option } = input;
  const current = past.begun[past.begun.length - 1];
  const ahead: Ahead = { rounds: [], endState: past.state, ampHours: 0 };
  let moved = movedSoFar(model, past);
  const begun = past.begun.length;
  if (current && current.endedAtS === null) {
    const left = restOfRound(model, input, past, current);
    ahead.rounds.push({ handsS: 0, lanes: left.lanes });
    ahead.endState = left.state;
    ahead.ampHours += left.ampHours;
    moved = left.moved;
  }
  past.rounds.forEach((steps, round) => {
    if (round < begun) return;
    const lanes = steps.map((at): LaneAhead => {
      const step = option.steps[at]!;
      const run = liveSampleRun(model, option, step, moved, AS_SET);
      const nominal = run(model.nominal).seconds;
      const factor = model.input.timeFactor?.mean ?? 1;
      const seconds = (step.stopS - step.startS) * factor;
      const secondsIn = (sample: Sample): number => (nominal > 0 ? (run(sample).seconds * seconds) / nominal : seconds);
      ahead.ampHours += step.kind === 'pre-level' ? 0 : step.ampHours;
      return {
        stepIndex: at,
        seconds,
        taperAfterS: step.voltageLimitAtS === null ? null : (step.voltageLimitAtS - step.startS) * factor,
        secondsIn,
        totalIn: secondsIn,
        elapsedS: 0,
      };
    });
    const before = past.rounds[round - 1];
    const first = option.steps[steps[0]!]!;
    const handsS = before ? first.startS - Math.max(...before.map((at) => option.steps[at]!.stopS)) : 0;
    ahead.rounds.push({ handsS, lanes });
    // Where a later round leaves its groups is the plan's: the rest goes by the last of them.
    const soc = [...ahead.endState.soc];
    for (const at of steps)
      for (const group of option.steps[at]!.groupIndexes)
        soc[group] = socOf(model.curve, option.steps[at]!.restVoltsAfter[group]!);
    ahead.endState = { ...ahead.endState, soc };
  });
  return ahead;
}

/**
 * Charge that has passed: that of the readings, in every sample the same. Where nothing has been read, a round that is over has
 * done in every sample what it was to do there.
 */
function movedSoFar(model: LiveModel, past: LivePast, movedAh: readonly number[] = past.movedAh): MovedIn {
  if (model.weights !== null) return (_, group) => movedAh[group]!;
  const current = past.begun[past.begun.length - 1];
  const done = current === undefined || current.endedAtS !== null ? movedAh : current.movedBeforeAh;
  return (sample, group) =>
    done[group]! * (sample.capacityAh[group]! / model.nominal.capacityAh[group]!) + movedAh[group]! - done[group]!;
}

const none = (): number => 0;

interface RestOfRound {
  lanes: LaneAhead[];
  state: ModuleState;
  ampHours: number;
  moved: MovedIn;
}

function restOfRound(model: LiveModel, input: ReplayInput, past: LivePast, round: LiveRound): RestOfRound {
  const soc = [...past.state.soc];
  const over = [...past.state.over];
  let ampHours = 0;
  let after = movedSoFar(model, past);
  const lanes = round.lanes.map((lane, at): LaneAhead => {
    const one = round.pasts[at]!;
    if (one.endedAtS !== null || one.overrun)
      return { stepIndex: lane.index, seconds: 0, taperAfterS: null, secondsIn: none, totalIn: none, elapsedS: 0 };
    const drive: Drive = one.noCurrent ? AS_SET : one.drive;
    const left = lane.forward(past.state, drive, null);
    for (const group of lane.touched) {
      soc[group] = left.state.soc[group]!;
      over[group] = left.state.over[group]!;
    }
    if (lane.step.kind !== 'pre-level') ampHours += left.ampHours;
    const since = sampledSince(model, input, past, round, at);
    const run = liveSampleRun(model, input.option, lane.step, since.moved, drive, one.amps);
    const nominal = run(model.nominal).seconds;
    // A resistor's run is that of its whole step, whatever has passed of it.
    const resistor = lane.step.channelIds.length === 0;
    const whole = resistor ? lane.step.stopS - lane.step.startS : nominal;
    const before = after;
    // Levelling passes charge from group to group: nothing comes in.
    const counts = lane.step.kind !== 'pre-level';
    after = (sample, group) =>
      counts && lane.step.groupIndexes.includes(group)
        ? since.moved(sample, group) + lane.sign * run(sample).ampHours
        : before(sample, group);
    const elapsedS = whole > 0 ? since.elapsedS : 0;
    const totalIn = (sample: Sample): number =>
      whole > 0 ? (run(sample).seconds * (left.seconds + elapsedS)) / whole : left.seconds;
    return {
      stepIndex: lane.index,
      seconds: left.seconds,
      taperAfterS: left.taperAfterS,
      secondsIn: (sample) => Math.max(0, totalIn(sample) - elapsedS),
      totalIn,
      elapsedS,
    };
  });
  return { lanes, state: { s: past.state.s, soc, over }, ampHours, moved: after };
}

/**
 * From where a lane's samples run: from the present state; where nobody has read the current of this round yet from its start,
 * and in a taper that nobody has read from where it began, as each sample's current has gone its own way since.
 */
function sampledSince(
  model: LiveModel,
  input: ReplayInput,
  past: LivePast,
  round: LiveRound,
  at: number,
): { moved: MovedIn; elapsedS: number } {
  const one = round.pasts[at]!;
  const here = { moved: movedSoFar(model, past), elapsedS: 0 };
  if (one.drive.seenInTaper || round.lanes[at]!.step.channelIds.length === 0) return here;
  const unread = one.drive.maxAmps === null && !one.noCurrent;
  const sinceS = unread ? -Infinity : one.taperAtS;
  if (sinceS === null) return here;
  const elapsedS = round.stretches.reduce((sum, { fromS, toS }) => sum + Math.max(0, toS - Math.max(fromS, sinceS)), 0);
  if (elapsedS <= 0) return here;
  const movedAh = unread ? round.movedBeforeAh : livePast(model, input, sinceS).movedAh;
  return { moved: movedSoFar(model, past, movedAh), elapsedS };
}
