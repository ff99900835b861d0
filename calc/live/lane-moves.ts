import type { PlanModel } from '../plan/plan-model';
import type { Lane } from './lane';
import type { LanePast } from './lane-past';
import { rested, type ModuleState } from './module-state';

/** The groups of a lane without current until `toS`. */
export const restTouched = (model: PlanModel, lane: Lane, state: ModuleState, toS: number): ModuleState =>
  rested(model, state, toS, lane.touched);

/** The lane has come to its end after so many seconds. */
export function end(
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

/** Charge that passed, and the taper if it began in it. */
export function note(past: LanePast, taperAfterS: number | null, ampHours: number): void {
  if (taperAfterS !== null) past.taperAtS ??= past.state.s + taperAfterS;
  past.deliveredAh += ampHours;
}

/** Moves the lane by a current that went straight from one value to another. */
export function advance(lane: Lane, past: LanePast, fromAmps: number, toAmps: number, seconds: number): void {
  if (seconds <= 0) return;
  past.deliveredAh += ((fromAmps + toAmps) / 2) * (seconds / 3600);
  past.state = lane.moved(past.state, fromAmps, toAmps, seconds);
}
