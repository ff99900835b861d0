import type { ReckonInput } from '../live-types';
import type { PlanModel } from '../plan/plan-model';
import { livePast } from './live-rounds';
import { readingChance } from './reading-chance';

/** How likely the last reading between the clips is; null where none has volts and amps, or the current was off then. */
export function lastReadingChance(model: PlanModel, input: ReckonInput): number | null {
  const last = input.readings.findLast((one) => one.s <= input.nowS && one.terminalVolts !== null && one.amps !== null);
  if (!last) return null;
  const then = livePast(model, input, last.s);
  const round = then.begun[then.begun.length - 1]!;
  if (!round.open) return null;
  return readingChance(model, round, last, then.state, then.movedAh);
}
