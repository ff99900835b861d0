import { slopeAtSoc, voltsAtSoc } from '../curve/ocv';
import type { OcvTable } from '../types';

/** Groups that behave alike, as one: so many of them, where they stand, and how far one ampere-hour moves them. */
export interface AlikeGroups {
  count: number;
  soc: number;
  /** State of charge per ampere-hour at the terminals, signed by the direction. */
  socPerAmpHour: number;
}

/** Charge in series groups seen over the ampere-hours at the terminals. */
export interface StringCharge {
  curve: OcvTable;
  alike: AlikeGroups[];
}

/** Merges groups with equal state and step, so that a module of twelve like groups costs one. */
export function stringCharge(curve: OcvTable, soc: readonly number[], socPerAmpHour: readonly number[]): StringCharge {
  const alike: AlikeGroups[] = [];
  soc.forEach((at, group) => {
    const step = socPerAmpHour[group]!;
    const known = alike.find((one) => one.soc === at && one.socPerAmpHour === step);
    if (known) known.count += 1;
    else alike.push({ count: 1, soc: at, socPerAmpHour: step });
  });
  return { curve, alike };
}

/** Summed rest voltage after so many ampere-hours, V. */
export function stringVolts({ curve, alike }: StringCharge, ampHours: number): number {
  let sum = 0;
  for (const { count, soc, socPerAmpHour } of alike) sum += count * voltsAtSoc(curve, soc + socPerAmpHour * ampHours);
  return sum;
}

/**
 * Ampere-hours at the terminals until the summed rest voltage is `volts`; 0 where it is there already, or past it in the
 * string's own direction.
 *
 * Newton inside a bracket: the sum is monotone in the ampere-hours.
 */
export function ampHoursToVolts(string: StringCharge, volts: number): number {
  const { curve, alike } = string;
  const step = alike[0]!.socPerAmpHour;
  const sign = Math.sign(step);
  let low = 0;
  if ((stringVolts(string, 0) - volts) * sign >= 0) return 0;
  const whole = 1 / Math.max(...alike.map((one) => Math.abs(one.socPerAmpHour)));
  let high = whole / 4;
  while ((stringVolts(string, high) - volts) * sign < 0) {
    low = high;
    high *= 2;
    if (high > 1e4 * whole) return ampHoursToCurveEnd(string);
  }
  let at = (low + high) / 2;
  for (let pass = 0; pass < 60; pass += 1) {
    let sum = -volts;
    let slope = 0;
    for (const one of alike) {
      const soc = one.soc + one.socPerAmpHour * at;
      sum += one.count * voltsAtSoc(curve, soc);
      slope += one.count * one.socPerAmpHour * slopeAtSoc(curve, soc);
    }
    if (sum * sign > 0) high = at;
    else low = at;
    let next = at - sum / slope;
    if (!(next > low && next < high)) next = (low + high) / 2;
    if (Math.abs(next - at) < 1e-12 * whole) return next;
    at = next;
  }
  return at;
}

/** Ampere-hours until the last group is at the end of its curve: as far as a curve that is level there can tell. */
function ampHoursToCurveEnd({ curve, alike }: StringCharge): number {
  const end = alike[0]!.socPerAmpHour > 0 ? curve.soc[curve.soc.length - 1]! : curve.soc[0]!;
  return Math.max(0, ...alike.map(({ soc, socPerAmpHour }) => (end - soc) / socPerAmpHour));
}

/** Ampere-hours until the first group is at `targetSoc`; below 0 where one is past it. */
export function ampHoursToFirst({ alike }: StringCharge, targetSoc: number): number {
  return Math.min(...alike.map(({ soc, socPerAmpHour }) => (targetSoc - soc) / socPerAmpHour));
}
