/** What it takes to bring a spare close before its pack is read, and what that saves. Runs in the bench plan's thread. */
import { soonestTerminals } from '@/calc/index';
import type { Band, PlanInput } from '@/calc/plan-types';
import type { EarlyStart, EarlyStartFound } from './bench-tasks';

/** The same spare to another rest voltage. */
const toVolts = (input: PlanInput, volts: number): PlanInput => ({ ...input, target: { ...input.target, volts } });

/** The same spare, brought to this voltage and rested. */
const restingAt = (input: PlanInput, volts: number): PlanInput => ({
  ...input,
  spare: { ...input.spare, groupVolts: input.spare.groupVolts.map(() => volts), readingAgeS: 0 },
});

/** Every channel free: how long the bench is taken now says nothing of the day on which the pack is read. */
const onFreeBench = (input: PlanInput): PlanInput => ({
  ...input,
  channels: input.channels.map((channel) => ({ ...channel, freeInS: 0 })),
});

/** Mean wait over the arrivals, s; null: for one of them it cannot be done. */
function meanWaitS(input: PlanInput, arrivals: readonly number[]): number | null {
  const free = onFreeBench(input);
  let sum = 0;
  for (const volts of arrivals) {
    const { option, alreadyWithin } = soonestTerminals(toVolts(free, volts));
    if (alreadyWithin) continue;
    if (option === null) return null;
    sum += option.totalS.p50;
  }
  return sum / arrivals.length;
}

/** Spares looked at closely: those that are close to the usual voltage are close to the next arrival as well. */
const CLOSEST = 8;

/** Of the spares that can be brought there soonest, what it takes and what is left to wait for afterwards. */
export function earlyStarts(spares: readonly EarlyStart[]): EarlyStartFound[] {
  const known = new Map<string, Omit<EarlyStartFound, 'spareId'> | null>();
  const reach = spares
    .map((one) => ({ one, takesS: takesOf(one.start)?.totalS.p50 ?? Infinity }))
    .filter(({ takesS }) => takesS < Infinity)
    .sort((a, b) => a.takesS - b.takesS);
  return reach.slice(0, CLOSEST).flatMap(({ one: { spareId, start, arrivals } }) => {
    const key = JSON.stringify([start, arrivals]);
    let found = known.get(key);
    if (found === undefined) {
      found = reckoned(start, arrivals);
      known.set(key, found);
    }
    return found === null ? [] : [{ spareId, ...found }];
  });
}

/** Null: it cannot be brought there. */
function takesOf(start: PlanInput): { channelId: string | null; totalS: Band } | null {
  const { option, alreadyWithin, refusals } = soonestTerminals(start);
  if (refusals.length > 0) return null;
  if (option !== null) return { channelId: option.channelIds[0] ?? null, totalS: option.totalS };
  return alreadyWithin ? { channelId: null, totalS: { p10: 0, p50: 0, p90: 0 } } : null;
}

/**
 * Brought to the usual voltage, half of the packs arrive below it. Where nothing here takes a module down, a spare that was
 * brought too high is lost for them: then the lowest likely arrival is the aim, and the rest is a trim upwards.
 */
function reckoned(start: PlanInput, arrivals: readonly number[]): Omit<EarlyStartFound, 'spareId'> | null {
  const withoutS = meanWaitS(start, arrivals);
  if (withoutS === null) return null;
  for (const aimVolts of [start.target.volts, Math.min(...arrivals)]) {
    const aimed = toVolts(start, aimVolts);
    const takes = takesOf(aimed);
    const thenS = takes === null ? null : meanWaitS(restingAt(aimed, aimVolts), arrivals);
    if (takes !== null && thenS !== null)
      return { aimVolts, channelId: takes.channelId, takesS: takes.totalS, withoutS, thenS };
  }
  return null;
}
