import type { Reckoning } from '../live-types';
import type { PlanModel } from '../plan/plan-model';
import { livePast, type ReplayInput } from './live-rounds';
import { restVolts } from './module-state';

/** What the plan expects at the instant of the last reading: the same stretches, no readings. Null without a reading. */
export function expectedAt(model: PlanModel, replay: ReplayInput, nowS: number): Reckoning['expected'] {
  const last = replay.readings.findLast((reading) => reading.s <= nowS);
  if (!last) return null;
  const plan = livePast(model, { ...replay, readings: [] }, last.s);
  const round = plan.begun[plan.begun.length - 1]!;
  const flowing = round.open;
  const lane = round.lanes[0]!;
  const amps = flowing ? round.pasts.reduce((sum, one) => sum + (one.endedAtS === null ? one.amps : 0), 0) : 0;
  const terminalVolts = flowing
    ? lane.clipVolts(plan.state, round.pasts[0]!.endedAtS === null ? round.pasts[0]!.amps : 0)
    : restVolts(model, plan.state.soc).reduce((sum, volts, group) => sum + volts + plan.state.over[group]!, 0);
  return { s: last.s, terminalVolts, amps: lane.sign * amps, celsius: model.celsius };
}
