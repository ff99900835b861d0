/** Causes of alerts that the rows of a charge say by themselves, each with the instant since when it is so. */
import type { ChargeFile } from './charge-file';
import { validReadings } from './charge-reckoning';
import { isRunning, isWaitingToStart, swapWait } from './charge-stages';
import { correctedVolts } from './meter-trust';

/** A group's reading is over its limit from here on, V; a hand meter's third decimal is good to some millivolts (common practice). */
const OVER_VOLTS = 0.01;
/** What was too warm is so until it has cooled this far under its limit, °C: no ringing on and off at the limit. */
const COOLED_CELSIUS = 2;
/** So many look-in intervals may pass without a reading, and as long again as a visit may come late, ms. */
const INTERVALS_WITHOUT_READING = 2;
const LATE_VISIT_MS = 10 * 60_000;

/** The last instant of clipping on with which a charge would have kept its wished time; null: nobody wished, or it was past when it was planned. */
export function latestStartAt({
  charge,
}: {
  charge: Pick<ChargeFile['charge'], 'readyBy' | 'clipOnAt' | 'plannedLateAt' | 'createdAt' | 'option'>;
}): number | null {
  if (charge.readyBy === null) return null;
  // The clips go on when the channel is free, and the plan counts from before that.
  const planned = charge.clipOnAt + charge.option.queueS * 1000;
  const at = Math.round(planned + (charge.readyBy - charge.plannedLateAt));
  return at > charge.createdAt ? at : null;
}

/** Since when it waits past its latest start; null: it does not. */
export function startMissedSince(file: ChargeFile, now: number): number | null {
  const latest = isWaitingToStart(file.charge.stage) ? latestStartAt(file) : null;
  return latest !== null && latest <= now ? latest : null;
}

export interface Silence {
  /** The last reading, or the begin of the current where that came later, epoch ms. */
  lastAt: number;
  /** From when on it is missed. */
  dueAt: number;
}

/** Until when a running charge can do without a reading; null: nothing flows that could be read. */
export function silenceOf(file: ChargeFile): Silence | null {
  const { charge } = file;
  if (!isRunning(charge.stage) || swapWait(file) !== null) return null;
  const run = file.runs.findLast((one) => one.toAt === null);
  if (!run) return null;
  const lastAt = Math.max(run.fromAt, ...validReadings(file.readings).map(({ at }) => at));
  const interval = charge.frozen.workshop.lookInIntervalS * 1000;
  return { lastAt, dueAt: lastAt + INTERVALS_WITHOUT_READING * interval + LATE_VISIT_MS };
}

export interface OverLimit {
  /** What was read last. */
  seen: number;
  limit: number;
  /** First reading of this time over the limit, epoch ms. */
  since: number;
}

/** Values in the order of time; over from the first that passes `on`, until one is at `off` or under. */
function overSince(
  values: readonly { at: number; value: number }[],
  limits: { on: number; off: number },
): Pick<OverLimit, 'seen' | 'since'> | null {
  let over: Pick<OverLimit, 'seen' | 'since'> | null = null as Pick<OverLimit, 'seen' | 'since'> | null;
  for (const { at, value } of values)
    over = value > (over === null ? limits.on : limits.off) ? { seen: value, since: over?.since ?? at } : null;
  return over;
}

/** Warmer than its type may be; null: it is not, or nobody has measured. */
export function overTemperature(file: ChargeFile): OverLimit | null {
  const limit = file.charge.frozen.module.maxChargeCelsius;
  const values = validReadings(file.readings).flatMap(({ at, celsius }) =>
    celsius === null ? [] : [{ at, value: celsius }],
  );
  const over = overSince(values, { on: limit, off: limit - COOLED_CELSIUS });
  return over && { ...over, limit };
}

export interface OverVoltage extends OverLimit {
  /** 0-based; null: the clips of the whole module. */
  group: number | null;
}

/** A group, or the module at its clips, over the limit of its type; null: none is. The known offset of a meter is taken off. */
export function overVoltage(file: ChargeFile): OverVoltage | null {
  const { module } = file.charge.frozen;
  const limit = module.chargeLimitVolts;
  const readings = validReadings(file.readings);
  const groups = readings.flatMap(({ at, groupVolts, meterId }) =>
    groupVolts === null ? [] : [{ at, volts: correctedVolts(groupVolts, file.meters.get(meterId ?? '') ?? null) }],
  );
  const highest = groups.map(({ at, volts }) => ({ at, value: Math.max(...volts) }));
  const over = overSince(highest, { on: limit + OVER_VOLTS, off: limit });
  if (over) return { ...over, limit, group: groups.at(-1)!.volts.indexOf(over.seen) };
  if (file.charge.way !== 'terminals') return null;
  const whole = limit * module.groupsInSeries;
  // At the supply the leads drop some of it: only at the module the clips say what the groups have.
  const clips = readings.flatMap(({ at, terminalVolts, takenAt }) =>
    terminalVolts === null || takenAt === 'supply' ? [] : [{ at, value: terminalVolts }],
  );
  const atClips = overSince(clips, { on: whole + OVER_VOLTS * module.groupsInSeries, off: whole });
  return atClips && { ...atClips, limit: whole, group: null };
}
