/** What is to be expected of a pack after the fit: its spread, and the balance charges that are still to come. */
import { balanceForecast } from '@/calc/index';
import { groupsAt } from '@/shared/contract/pack';
import type { BalanceForecastDto, RepairDto } from '@/shared/contract/repair';
import type { PackReading } from '../entities/pack-reading';
import { curveOf, inMillivolts, orNull, packCapacityAh } from './pack-numbers';
import { logEntry } from './pack-reading-dto';
import { standing, type RepairFacts } from './repair-facts';
import type { RepairFile } from './repair-file';
import { PROVEN_SPREAD_MILLIVOLTS } from './repair-steps';

/** Current of a pack's own balancing, A. Common practice; no pack of the workshop tells its own. */
const BLEED_AMPS = { low: 0.1, likely: 0.15, high: 0.2 } as const;
/** Time on the charger that a balance charge has for it: overnight, h. Common practice. */
const HOURS_PER_CHARGE = 10;
/** A pack that needs more than this is not a matter of balancing. A guess. */
const MOST_CHARGES = 20;
/** Scatter of two meters' readings against each other, V: what a checked group may show differently in the pack. A guess. */
const TWO_METERS_VOLTS = 0.002;

const spreadOf = (volts: readonly number[]): number => Math.max(...volts) - Math.min(...volts);

/**
 * Spread right after the fit: the healthy groups as they were read at arrival, with the spare's groups as its check has
 * them, or within the tolerance of the target where none was made yet.
 * @returns null before the target is taken
 */
export function expectedAfterFit(file: RepairFile, facts: RepairFacts): RepairDto['expectedAfterFit'] {
  const { arrival, target, failing, verdict } = facts;
  if (arrival === null || target === null || verdict === null) return null;
  const out = new Set([...verdict.odd, ...(failing === null ? [] : groupsAt(file.repair, failing))]);
  const healthy = arrival.groupVolts.filter((_, group) => !out.has(group));
  if (healthy.length === 0) return null;
  const check = facts.ready?.restChecks.at(-1);
  const groups = check ? check.verdict.groups.map(({ volts }) => volts) : [target.volts];
  const doubt = check ? TWO_METERS_VOLTS : target.toleranceMillivolts / 1000;
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

/** Null before the first reading after the fit, or where no curve is known. */
export function forecastOf(file: RepairFile, facts: RepairFacts): BalanceForecastDto | null {
  const { type } = file;
  if (facts.proof === null || type === null) return null;
  const log = logOf(file.readings);
  const found = orNull(() =>
    balanceForecast(log.map(logEntry), {
      aimVolts: PROVEN_SPREAD_MILLIVOLTS / 1000,
      capacityAh: packCapacityAh(type),
      curve: curveOf(type),
      bleedAmps: BLEED_AMPS,
      hoursPerCharge: HOURS_PER_CHARGE,
      maxCharges: MOST_CHARGES,
    }),
  );
  if (found === null) return null;
  return {
    aimMillivolts: PROVEN_SPREAD_MILLIVOLTS,
    charges: found.charges,
    from: found.charges === null ? null : found.bySource,
    doesNotConverge: found.doesNotConverge,
  };
}
