import type { Figure } from '../learn/figure';
import { SLOPE_ALIKE_SOC, SLOPE_RELATIVE } from '../parameters/pack';
import type { OcvTable } from '../types';
import { capacities } from './group-volts';
import { readingAmpHours } from './reading-amp-hours';
import { socOfStep } from './rest-soc';

/** The spread of one reading in ampere-hours, with what is needed to compare it with another. */
export interface SpreadFigure {
  ampHours: number;
  /** Doubt by the noise of the two readings that make it, Ah, one standard deviation. */
  noiseAh: number;
  /** Mean state of charge of the pack. */
  soc: number;
  spreadVolts: number;
}

/** Where a curve is level beyond its end a step of volts is no charge at all; no reading is that good. */
const LEAST_NOISE_AH = 1e-4;

export function spreadFigure(
  volts: readonly number[],
  curve: OcvTable,
  capacityAh: number | number[],
  noiseVolts: number,
): SpreadFigure {
  const list = [...volts];
  const { ampHours, spreadAh, meanSoc } = readingAmpHours({ volts: list, curve, capacityAh });
  const of = capacities(capacityAh, list.length);
  // Capacities of its own may make a group the fullest in ampere-hours that is not the highest in volts.
  const ends = [Math.max(...ampHours), Math.min(...ampHours)].map((value) => ampHours.indexOf(value));
  const noises = ends.map((group) => of[group]! * socOfStep(curve, list[group]!, noiseVolts));
  return {
    ampHours: spreadAh,
    noiseAh: Math.max(LEAST_NOISE_AH, Math.hypot(...noises)),
    soc: meanSoc,
    spreadVolts: Math.max(...list) - Math.min(...list),
  };
}

/**
 * What the error of the curve's slope leaves between two spreads, Ah: 10 % of each, the same for both where they were read at
 * the same charge and its own for each where they were not: r·√(2·(1 − ρ)·A₁·A₂), ρ = e^(−|Δz|/0.1).
 */
export function slopeApart(one: SpreadFigure, other: SpreadFigure): number {
  const alike = Math.exp(-Math.abs(one.soc - other.soc) / SLOPE_ALIKE_SOC);
  return SLOPE_RELATIVE * Math.sqrt(2 * (1 - alike) * one.ampHours * other.ampHours);
}

/**
 * What the spread has lost from one reading to the next, Ah, with its standard deviation: the noise of both, what the slopes
 * differ by, and 10 % of the drop itself, since its ampere-hours come from a slope.
 */
export function spreadDrop(before: SpreadFigure, after: SpreadFigure): Figure {
  const mean = before.ampHours - after.ampHours;
  return {
    mean,
    sd: Math.hypot(before.noiseAh, after.noiseAh, slopeApart(before, after), SLOPE_RELATIVE * mean),
  };
}
