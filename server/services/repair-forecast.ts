/** What is to be expected of a pack after the fit: its spread, and the balance charges that are still to come. */
import { balanceForecast } from '@/calc/index';
import { aimOf, groupsAt } from '@/shared/contract/pack';
import type { BalanceForecastDto, RepairDto } from '@/shared/contract/repair';
import type { PackReading } from '../entities/pack-reading';
import { curveOf, inMillivolts, orNull, packCapacityAh } from './pack-numbers';
import { logEntry } from './pack-reading-dto';
import { standing, type RepairFacts } from './repair-facts';
import type { RepairFile } from './repair-file';

/** Current of a pack's own balancing where its own is not known, A. Common practice. */
const USUAL_BLEED_AMPS = { low: 0.1, likely: 0.15, high: 0.2 } as const;
/** 10th and 90th percentile of a current that was typed, as a share of it: volts, warmth and resistors differ. A guess. */
const TYPED_BLEED = { low: 0.8, high: 1.2 } as const;
/** Time on the charger that a balance charge has for it: overnight, h. Common practice. */
const HOURS_PER_CHARGE = 10;
/** A pack that needs more than this is not a matter of balancing. A guess. */
const MOST_CHARGES = 20;
/** Scatter of two meters' readings against each other, V: what a checked group may show differently in the pack. A guess. */
const TWO_METERS_VOLTS = 0.002;

const spreadOf = (volts: readonly number[]): number => Math.max(...volts) - Math.min(...volts);

/**
 * Spread right after the fit: the healthy groups as they were read at arrival, with the spare's groups as its check, or
 * where it needed no charge its reading, has them, or within the tolerance of the target where none was made yet.
 * @returns null before the target is taken
 */
export function expectedAfterFit(file: RepairFile, facts: RepairFacts): RepairDto['expectedAfterFit'] {
  const { arrival, target, failing, verdict } = facts;
  if (arrival === null || target === null || verdict === null) return null;
  const out = new Set([...verdict.odd, ...(failing === null ? [] : groupsAt(file.repair, failing))]);
  const healthy = arrival.groupVolts.filter((_, group) => !out.has(group));
  if (healthy.length === 0) return null;
  const check = facts.ready?.restChecks.at(-1);
  const known = check ? check.verdict.groups.map(({ volts }) => volts) : (facts.asItIs?.groupVolts ?? null);
  const groups = known ?? [target.volts];
  const doubt = known ? TWO_METERS_VOLTS : target.toleranceMillivolts / 1000;
  const likely = spreadOf([...healthy, ...groups]);
  const wide = spreadOf([...healthy, ...groups.flatMap((volts) => [volts - doubt, volts + doubt])]);
  const low = Math.max(spreadOf(healthy), likely - doubt);
  return { low: inMillivolts(low), likely: inMillivolts(likely), high: inMillivolts(wide) };
}

/** The readings since the latest arrival, the oldest first. */
function logOf(readings: readonly PackReading[]): PackReading[] {
  const oldestFirst = [...standing(readings)].reverse();
  const arrival = oldestFirst.map(({ stage }) => stage).lastIndexOf('arrival');
  return oldestFirst.slice(Math.max(0, arrival));
}

const bleedOf = (typed: number | null) =>
  typed === null ? USUAL_BLEED_AMPS : { low: typed * TYPED_BLEED.low, likely: typed, high: typed * TYPED_BLEED.high };

/** Spread that a reading shows, mV: of level groups too the meter's scatter is left. */
const asRead = (volts: number): number => inMillivolts(Math.max(volts, TWO_METERS_VOLTS));

/** Null before the first reading after the fit, or where no curve is known. */
export function forecastOf(file: RepairFile, facts: RepairFacts): BalanceForecastDto | null {
  const { type, repair } = file;
  if (facts.proof === null || type === null) return null;
  const log = logOf(file.readings);
  const found = orNull(() =>
    balanceForecast(log.map(logEntry), {
      aimVolts: aimOf(repair) / 1000,
      capacityAh: packCapacityAh(type),
      curve: curveOf(type),
      bleedAmps: bleedOf(repair.bleedAmps),
      hoursPerCharge: HOURS_PER_CHARGE,
      maxCharges: MOST_CHARGES,
    }),
  );
  if (found === null) return null;
  return {
    aimMillivolts: aimOf(repair),
    charges: found.charges,
    hoursPerCharge: HOURS_PER_CHARGE,
    expectedMillivolts: found.expectedVolts.map(({ p10, p50, p90 }) => ({
      p10: asRead(p10),
      p50: asRead(p50),
      p90: asRead(p90),
    })),
    from: found.charges === null ? null : found.bySource,
    doesNotConverge: found.doesNotConverge,
  };
}
