/** How a proven module drifts off its mark on the shelf, by the self-discharge of its type. */
import { slopeAtSoc, socAtVolts } from '@/calc/curve/ocv';
import { CHEMISTRIES } from '@/calc/parameters/chemistries';
import type { CheckVerdict, ChemistryId } from '@/calc/plan-types';

const daysPerMonth = 365.25 / 12;
/** Self-discharge is known to a factor of about 1.6 (calc/plan/default-spreads.ts: one standard deviation, 0.5). */
const fast = Math.exp(0.5);

export interface Drift {
  /** Days in which a group falls by 1 mV, at the likely self-discharge. */
  daysPerMillivolt: number;
  /** Days after the check until the lowest group may be out of tolerance, at a fast self-discharge. */
  daysInTolerance: number;
}

/**
 * Rate = slope of the curve at the target × share of the capacity lost a month (calc/SOURCES.md: self-discharge).
 *
 * @param lossPerMonth share of the capacity; null: the chemistry's
 */
export function driftOf(
  chemistry: ChemistryId,
  lossPerMonth: number | null,
  targetVolts: number,
  toleranceVolts: number,
  verdict: CheckVerdict,
): Drift {
  const { curve, selfDischargePerMonth } = CHEMISTRIES[chemistry];
  const slope = slopeAtSoc(curve, socAtVolts(curve, targetVolts));
  const voltsPerDay = (slope * (lossPerMonth ?? selfDischargePerMonth)) / daysPerMonth;
  const lowest = Math.min(...verdict.groups.map((group) => group.deviationVolts));
  return {
    daysPerMillivolt: 0.001 / voltsPerDay,
    daysInTolerance: Math.max(0, (toleranceVolts + lowest) / (voltsPerDay * fast)),
  };
}

/** 'in 4 days', 'a day', 'in 2 months'. */
export function daysWords(days: number): string {
  if (days < 0.75) return 'in half a day';
  if (days < 1.5) return 'a day';
  if (days < 60) return `in ${Math.round(days)} days`;
  return `in ${Math.round(days / daysPerMonth)} months`;
}
