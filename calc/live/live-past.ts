import type { PlanModel } from '../plan/plan-model';
import { AS_SET, type Drive, type Lane } from './lane';
import { rested, type ModuleState } from './module-state';

/** A stretch in which current may flow, both ends known. */
export interface Stretch {
  fromS: number;
  toS: number;
}

/** A reading as one lane sees it, positive amps; null: the current was not read. */
export interface LaneReading {
  /** Among the readings of the charge. */
  index: number;
  s: number;
  amps: number | null;
  terminalVolts: number | null;
  /** Ampere-seconds since the reading before, where more were read between the two than are kept. */
  ampSeconds?: number;
}

type AmpsReading = LaneReading & { amps: number };

/** One lane at the instant of a reading, after it was taken in. */
export interface Knot {
  index: number;
  state: ModuleState;
  deliveredAh: number;
  /** As read, else by the model; positive. */
  amps: number;
  /** What the source would give as set, at that state; positive. */
  dueAmps: number;
  /** A voltage limit rules. */
  tapering: boolean;
  /** No current was read while some was due. */
  noCurrent: boolean;
  /** The current is over. */
  over: boolean;
}

export interface LanePast {
  state: ModuleState;
  /** End of current, s; null: not yet. */
  endedAtS: number | null;
  /** From when a voltage limit ruled, s; null: not so far. */
  taperAtS: number | null;
  /** At the terminals, positive, Ah. */
  deliveredAh: number;
  /** Positive, at the end of the last stretch. */
  amps: number;
  drive: Drive;
  /** The last reading showed no current while some was due. */
  noCurrent: boolean;
  /** The last reading showed current after the reckoned end. */
  overrun: boolean;
  /** One for each reading of its stretches. */
  knots: Knot[];
  /** When the last current ended, or now. */
  endState: ModuleState;
}

/** Below this share of the set current, or of the planned end current, a reading says that none flows. */
const ZERO_OF_SET = 0.01;
const ZERO_OF_END = 0.5;
/** A model current this near to the set one is constant current. */
const CONSTANT_SHARE = 0.97;

/**
 * What one lane's current has done to the module until `nowS`.
 *
 * Between two readings of the current the charge is the trapezium, or in a taper the logarithmic mean from where the model has
 * it begin; the first reading of a stretch counts back to its start; after the last one the model runs on with what that
 * reading has shown. Without readings it is the model as set.
 *
 * @param saidOff the last stretch ends when a person has switched off: it flowed until then, whatever was reckoned, since no
 * charger stops by itself
 */
export function lanePast(
  model: PlanModel,
  lane: Lane,
  start: ModuleState,
  stretches: Stretch[],
  readings: LaneReading[],
  nowS: number,
  saidOff = false,
): LanePast {
  const past: LanePast = {
    state: start,
    endedAtS: null,
    taperAtS: null,
    deliveredAh: 0,
    amps: 0,
    drive: AS_SET,
    noCurrent: false,
    overrun: false,
    knots: [],
    endState: start,
  };
  for (const { fromS, toS } of stretches) {
    const endS = Math.min(toS, nowS);
    if (fromS > endS) continue;
    past.state = restTouched(model, lane, past.state, fromS);
    past.noCurrent = false;
    let before: number | null = null;
    for (const reading of readings.filter(({ s }) => s >= fromS && s <= endS)) {
      if (isAmpsReading(reading)) {
        if (!glide(lane, past, before, reading)) takeReading(model, lane, past, before, reading);
        before = reading.amps;
        past.knots.push(knotOf(lane, past, reading, past.state));
      } else {
        const seen = peek(model, lane, past, reading.s);
        past.knots.push(knotOf(lane, past, reading, seen.state, seen));
      }
    }
    runOn(model, lane, past, endS, saidOff && toS === stretches[stretches.length - 1]!.toS);
  }
  if (past.endedAtS === null) past.endState = past.state;
  past.state = restTouched(model, lane, past.state, nowS);
  return past;
}

const restTouched = (model: PlanModel, lane: Lane, state: ModuleState, toS: number): ModuleState =>
  rested(model, state, toS, lane.touched);

const isAmpsReading = (reading: LaneReading): reading is AmpsReading => reading.amps !== null;

/** The state at a reading without amps, which changes nothing, and the charge since the last one with. */
function peek(
  model: PlanModel,
  lane: Lane,
  past: LanePast,
  s: number,
): { state: ModuleState; ampHours: number; over: boolean } {
  const rests = past.noCurrent || past.endedAtS !== null;
  if (rests) return { state: restTouched(model, lane, past.state, s), ampHours: 0, over: past.endedAtS !== null };
  const ahead = lane.forward(past.state, past.drive, Math.max(0, s - past.state.s), past.overrun);
  return { state: restTouched(model, lane, ahead.state, s), ampHours: ahead.ampHours, over: ahead.ended };
}

function knotOf(
  lane: Lane,
  past: LanePast,
  reading: LaneReading,
  state: ModuleState,
  ahead = { ampHours: 0, over: past.endedAtS !== null },
): Knot {
  const { over } = ahead;
  return {
    index: reading.index,
    state,
    deliveredAh: past.deliveredAh + ahead.ampHours,
    amps: past.noCurrent || over ? 0 : (reading.amps ?? lane.ampsAt(state, past.drive)),
    dueAmps: lane.ampsAt(state, AS_SET),
    tapering: past.taperAtS !== null,
    noCurrent: past.noCurrent && !over,
    over,
  };
}

/**
 * The usual reading, far from the end: more of the same since the one before. Gives what `takeReading` gives there, without a
 * run of the model.
 */
function glide(lane: Lane, past: LanePast, before: number | null, reading: AmpsReading): boolean {
  const { setAmps } = lane.step;
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

function takeReading(model: PlanModel, lane: Lane, past: LanePast, before: number | null, reading: AmpsReading): void {
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

/** The model from the last reading (or the start) of a stretch to its end. */
function runOn(model: PlanModel, lane: Lane, past: LanePast, endS: number, onwards: boolean): void {
  const seconds = endS - past.state.s;
  if (past.noCurrent || past.endedAtS !== null) {
    past.state = restTouched(model, lane, past.state, endS);
    past.amps = 0;
    return;
  }
  const believed = past.overrun || onwards;
  const ahead = lane.forward(past.state, past.drive, Math.max(0, seconds), believed);
  if (ahead.ended && !believed) {
    end(model, lane, past, ahead.seconds, ahead.state, ahead.ampHours, ahead.taperAfterS);
    past.state = restTouched(model, lane, past.state, endS);
    return;
  }
  note(past, ahead.taperAfterS, ahead.ampHours);
  past.state = ahead.state;
  past.amps = Math.abs(ahead.amps);
}

function end(
  model: PlanModel,
  lane: Lane,
  past: LanePast,
  seconds: number,
  state: ModuleState,
  ampHours: number,
  taperAfterS: number | null,
): void {
  past.endedAtS = past.state.s + seconds;
  past.endState = state;
  note(past, taperAfterS, ampHours);
  past.state = state;
  past.amps = 0;
}

function note(past: LanePast, taperAfterS: number | null, ampHours: number): void {
  if (taperAfterS !== null) past.taperAtS ??= past.state.s + taperAfterS;
  past.deliveredAh += ampHours;
}

function advance(lane: Lane, past: LanePast, fromAmps: number, toAmps: number, seconds: number): void {
  if (seconds <= 0) return;
  past.deliveredAh += ((fromAmps + toAmps) / 2) * (seconds / 3600);
  past.state = lane.moved(past.state, fromAmps, toAmps, seconds);
}

function driveFrom(lane: Lane, past: LanePast, reading: AmpsReading): Drive {
  const set = lane.step.setAmps;
  if (set === null) return lane.driveInTaper(past.state, reading.amps);
  const byModel = lane.ampsAt(past.state, AS_SET) < set * CONSTANT_SHARE;
  const byVolts = reading.terminalVolts !== null && lane.atSetVolts(reading.terminalVolts, reading.amps);
  if (reading.amps < set * CONSTANT_SHARE && (byModel || byVolts)) {
    past.taperAtS ??= reading.s;
    return lane.driveInTaper(past.state, reading.amps);
  }
  return { maxAmps: reading.amps, setShiftVolts: 0, seenInTaper: false };
}

function zeroBelow({ step }: Lane): number {
  const set = (step.setAmps ?? Math.abs(step.endAmps)) * ZERO_OF_SET;
  return Math.max(0.005, Math.min(set, Math.abs(step.endAmps) * ZERO_OF_END));
}

const logMean = (first: number, second: number): number =>
  Math.abs(first - second) < 1e-9 * first ? first : (first - second) / Math.log(first / second);

/** Readings as one lane of `shareOf` the current sees them. */
export const laneReadings = (readings: readonly LaneReading[], shareOf: number, alone: boolean): LaneReading[] =>
  readings.map((reading) => ({
    ...reading,
    amps: reading.amps === null ? null : Math.abs(reading.amps) * shareOf,
    terminalVolts: alone ? reading.terminalVolts : null,
    ...(reading.ampSeconds === undefined ? {} : { ampSeconds: reading.ampSeconds * shareOf }),
  }));
