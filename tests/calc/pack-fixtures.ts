import { seededRandom, socAtVolts, voltsAtSoc, type OcvTable, type PackReading } from '@/calc/index';
import { LMO_BLEND } from './reference/curves';

/** Standard normal numbers of a seed, by Box and Muller. */
export function normals(seed: number): () => number {
  const random = seededRandom(seed);
  return () => Math.sqrt(-2 * Math.log(random() + 1e-12)) * Math.cos(2 * Math.PI * random());
}

/** Groups about a mean voltage with this spread: one low, one high, the rest between. */
export function spreadOver(meanVolts: number, spreadVolts: number, groups = 12): number[] {
  return Array.from({ length: groups }, (_, at) => meanVolts + spreadVolts * (at / (groups - 1) - 0.5));
}

/** Common practice: 120 mV at the arrival, 40 after the fit, 39 and 28 after two balance charges. */
export function commonLog(meanVolts: number): PackReading[] {
  return [
    { volts: spreadOver(meanVolts, 0.12), stage: 'arrival' },
    { volts: spreadOver(meanVolts, 0.04), stage: 'after-fit' },
    { volts: spreadOver(meanVolts, 0.039), stage: 'after-balance', balanceCount: 1 },
    { volts: spreadOver(meanVolts, 0.028), stage: 'after-balance', balanceCount: 2 },
  ];
}

/** Groups of these capacities that all rest alike at one charge, after the same ampere-hours went through all. */
export function advanced(
  capacitiesAh: readonly number[],
  matchSoc: number,
  movedAh: number,
  curve: OcvTable = LMO_BLEND,
) {
  return capacitiesAh.map((capacityAh) => voltsAtSoc(curve, matchSoc + movedAh / capacityAh));
}

/** Ampere-hours of a group between two rest voltages. */
export const ampHoursBetween = (low: number, high: number, capacityAh: number, curve: OcvTable = LMO_BLEND): number =>
  capacityAh * (socAtVolts(curve, high) - socAtVolts(curve, low));
