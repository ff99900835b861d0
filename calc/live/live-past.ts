import type { PlanModel } from '../plan/plan-model';
import { AS_SET, type Lane } from './lane';
import { end, note, restTouched } from './lane-moves';
import { isAmpsReading, type Knot, type LanePast, type LaneReading, type Stretch } from './lane-past';
import type { ModuleState } from './module-state';
import { glide, takeReading } from './take-reading';

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
    amps: past.noCurrent || over ? 0 : (reading.readAmps ?? reading.amps ?? lane.ampsAt(state, past.drive)),
    dueAmps: lane.ampsAt(state, AS_SET),
    paused: reading.paused ?? false,
    tapering: past.taperAtS !== null,
    noCurrent: past.noCurrent && !over,
    over,
  };
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
