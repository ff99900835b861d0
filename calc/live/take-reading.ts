import type { PlanModel } from '../plan/plan-model';
import { AS_SET, type Drive, type Lane } from './lane';
import { advance, end, note, restTouched } from './lane-moves';
import type { AmpsReading, LanePast } from './lane-past';

/** Below this share of the set current, or of the planned end current, a reading says that none flows. */
const ZERO_OF_SET = 0.01;
const ZERO_OF_END = 0.5;
/** A model current this near to the set one is constant current. */
const CONSTANT_SHARE = 0.97;

/**
 * The usual reading, far from the end: more of the same since the one before. Gives what `takeReading` gives there, without a
 * run of the model.
 */
export function glide(lane: Lane, past: LanePast, before: number | null, reading: AmpsReading): boolean {
  const { setAmps } = lane;
  const { amps } = reading;
  if (before === null || setAmps === null || past.endedAtS !== null || past.overrun || past.noCurrent) return false;
  if (amps <= zeroBelow(lane) || amps <= lane.trickleAmps) return false;
  const seconds = reading.s - past.state.s;
  if (!(seconds > 0)) return false;
  const from = fromAmps(reading, before, seconds);
  const state = lane.moved(past.state, from, amps, seconds);
  if (lane.isNearEnd(state, amps)) return false;
  const limited = lane.ampsAt(state, past.drive) < Math.min(past.drive.maxAmps ?? setAmps, setAmps) * (1 - 1e-9);
  if (past.taperAtS === null && (limited || lane.ampsAt(state, AS_SET) < setAmps * CONSTANT_SHARE)) return false;
  past.deliveredAh += ((from + amps) / 2) * (seconds / 3600);
  past.state = state;
  past.amps = amps;
  past.drive = driveFrom(lane, past, reading);
  return true;
}

/** Amps from which a straight line to the reading's own has the charge that has passed. */
const fromAmps = ({ amps, ampSeconds }: AmpsReading, before: number, seconds: number): number =>
  ampSeconds === undefined ? before : (2 * ampSeconds) / seconds - amps;

/** A reading of the current: what has passed since the one before, and what it says of the source from here on. */
export function takeReading(
  model: PlanModel,
  lane: Lane,
  past: LanePast,
  before: number | null,
  reading: AmpsReading,
): void {
  const { s, amps } = reading;
  const zero = amps <= zeroBelow(lane);
  const trickle = amps <= lane.trickleAmps;
  const seconds = s - past.state.s;
  if (past.endedAtS !== null && (zero || trickle)) {
    past.state = restTouched(model, lane, past.state, s);
    past.overrun = false;
    return;
  }
  const ahead = lane.forward(past.state, past.drive, Math.max(seconds, 0));
  if (zero && ahead.ended && past.endedAtS === null && before !== 0) {
    // It came to its end between two looks, and somebody has switched it off.
    end(model, lane, past, ahead.seconds, ahead.state, ahead.ampHours, ahead.taperAfterS);
    past.state = restTouched(model, lane, past.state, s);
    return;
  }
  const tapering = ahead.taperAfterS !== null && ahead.taperAfterS < seconds;
  if (before === null && tapering && !ahead.ended) {
    // Nobody has looked before the taper: the model's course up to here stands.
    note(past, ahead.taperAfterS, ahead.ampHours);
    past.state = ahead.state;
  } else {
    const from = before === null || seconds <= 0 ? amps : fromAmps(reading, before, seconds);
    const constantS = tapering && amps < from ? ahead.taperAfterS! : 0;
    if (tapering) past.taperAtS ??= past.state.s + ahead.taperAfterS!;
    advance(lane, past, from, from, constantS);
    const falling = constantS > 0 && amps > 0 && amps < from;
    advance(lane, past, falling ? 2 * logMean(from, amps) - amps : from, amps, seconds - constantS);
  }
  past.amps = amps;
  past.noCurrent = zero;
  if (zero) {
    past.drive = AS_SET;
    return;
  }
  past.drive = driveFrom(lane, past, reading);
  const there = lane.forward(past.state, past.drive, 0).ended;
  past.overrun = there && !trickle;
  past.endedAtS = there && trickle ? (past.endedAtS ?? s) : null;
  if (past.endedAtS === s) past.endState = past.state;
}

function driveFrom(lane: Lane, past: LanePast, reading: AmpsReading): Drive {
  const set = lane.setAmps;
  if (set === null) return lane.driveInTaper(past.state, reading.amps);
  const byModel = lane.ampsAt(past.state, AS_SET) < set * CONSTANT_SHARE;
  const byVolts = reading.terminalVolts !== null && lane.atSetVolts(reading.terminalVolts, reading.amps);
  if (reading.amps < set * CONSTANT_SHARE && (byModel || byVolts)) {
    past.taperAtS ??= reading.s;
    return lane.driveInTaper(past.state, reading.amps);
  }
  return { maxAmps: reading.amps, setShiftVolts: 0, seenInTaper: false };
}

function zeroBelow({ step, setAmps }: Lane): number {
  const set = (setAmps ?? Math.abs(step.endAmps)) * ZERO_OF_SET;
  return Math.max(0.005, Math.min(set, Math.abs(step.endAmps) * ZERO_OF_END));
}

const logMean = (first: number, second: number): number =>
  Math.abs(first - second) < 1e-9 * first ? first : (first - second) / Math.log(first / second);
