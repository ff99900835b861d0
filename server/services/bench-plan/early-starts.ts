/** What it takes to bring a spare close before its pack is read, and what that saves. Runs in the bench plan's thread. */
import { soonestTerminals } from '@/calc/index';
import type { PlanInput } from '@/calc/plan-types';
import type { EarlyStart, EarlyStartFound } from './bench-tasks';

/** The same spare to another rest voltage. */
const toVolts = (input: PlanInput, volts: number): PlanInput => ({ ...input, target: { ...input.target, volts } });

/** The same spare, brought to this voltage and rested. */
const restingAt = (input: PlanInput, volts: number): PlanInput => ({
  ...input,
  spare: { ...input.spare, groupVolts: input.spare.groupVolts.map(() => volts), readingAgeS: 0 },
});

/** Mean wait over the arrivals, s; null: for one of them it cannot be done. */
function meanWaitS(input: PlanInput, arrivals: readonly number[]): number | null {
  let sum = 0;
  for (const volts of arrivals) {
    const { option, alreadyWithin } = soonestTerminals(toVolts(input, volts));
    if (alreadyWithin) continue;
    if (option === null) return null;
    sum += option.totalS.p50;
  }
  return sum / arrivals.length;
}

/** Of each spare that can be brought there, what it takes and what is left to wait for afterwards. */
export function earlyStarts(spares: readonly EarlyStart[]): EarlyStartFound[] {
  const known = new Map<string, Omit<EarlyStartFound, 'spareId'> | null>();
  return spares.flatMap(({ spareId, start, arrivals }) => {
    const key = JSON.stringify([start, arrivals]);
    let found = known.get(key);
    if (found === undefined) {
      found = reckoned(start, arrivals);
      known.set(key, found);
    }
    return found === null ? [] : [{ spareId, ...found }];
  });
}

function reckoned(start: PlanInput, arrivals: readonly number[]): Omit<EarlyStartFound, 'spareId'> | null {
  const { option, alreadyWithin, refusals } = soonestTerminals(start);
  if (refusals.length > 0 || (option === null && !alreadyWithin)) return null;
  const withoutS = meanWaitS(start, arrivals);
  const thenS = meanWaitS(restingAt(start, start.target.volts), arrivals);
  if (withoutS === null || thenS === null) return null;
  return {
    channelId: option?.channelIds[0] ?? null,
    takesS: option?.totalS ?? { p10: 0, p50: 0, p90: 0 },
    withoutS,
    thenS,
  };
}
