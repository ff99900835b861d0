import { isBeyondCurve } from '../curve/ocv';
import { BEYOND_SOC } from '../parameters/pack';
import { socOf } from '../plan/soc-of';
import type { OcvTable } from '../types';

/** State of charge of a group that rests at `volts`; beyond empty and full no farther than 5 %. */
export function restSoc(curve: OcvTable, volts: number): number {
  return Math.min(1 + BEYOND_SOC, Math.max(-BEYOND_SOC, socOf(curve, volts)));
}

/** Charge of one group for a small step of its voltage, as a share of its capacity: dz of ±step, halved. */
export function socOfStep(curve: OcvTable, volts: number, step: number): number {
  return (socOf(curve, volts + step) - socOf(curve, volts - step)) / 2;
}

/** Groups whose volts lie beyond the curve's ends, so that their charge is only an extension. */
export function groupsBeyond(curve: OcvTable, volts: readonly number[]): number[] {
  return volts.map((_, group) => group).filter((group) => isBeyondCurve(curve, volts[group]!));
}
