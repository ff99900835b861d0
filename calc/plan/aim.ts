import type { Direction } from '../types';
import { curveVolts, voltsAtSoc } from '../curve/ocv';
import type { PlanModel } from './plan-model';
import { ampHoursToFirst, stringCharge, stringVolts, type StringCharge } from './string-charge';

/** Where a current through all groups is to end. */
export interface Aim {
  /** 'sum': where the summed rest voltage is `sumVolts`, the middle; 'first': where the first group is at the target. */
  kind: 'sum' | 'first';
  /** Summed rest voltage there, V. */
  sumVolts: number;
  /** Ampere-hours at the terminals, nominal. */
  ampHours: number;
  /** Of each group there. */
  soc: number[];
  /** Rest volts over the target there, per group. */
  deviations: number[];
  /** 0-based groups that are outside the tolerance there, for the trim. */
  outside: number[];
  /** With 'first': the group that is there first, or that bars the way. */
  first: number;
}

/**
 * Chooses where the current through the terminals ends.
 *
 * In the middle, where the highest group is as far over the target as the lowest is under it, if all are inside the tolerance
 * then: no other end has a smaller worst deviation. Else as far as the first group goes, and the others are left for the trim.
 */
export function chooseAim(model: PlanModel, direction: Direction): Aim {
  const string = moduleString(model, direction);
  const middle = aimAt(model, string, 'sum', middleAmpHours(model, string), direction);
  if (middle.outside.length === 0) return middle;
  return aimAt(model, string, 'first', Math.max(0, ampHoursToFirst(string, model.targetSoc)), direction);
}

/** The module's groups as a string in one direction. */
export function moduleString(model: PlanModel, direction: Direction): StringCharge {
  return stringCharge(
    model.curve,
    model.startSoc,
    model.groups.map((_, group) => socPerAmpHour(model, group, direction)),
  );
}

/** State of charge per ampere-hour at the terminals. */
export function socPerAmpHour(model: PlanModel, group: number, direction: Direction): number {
  const { capacityAh } = model.groups[group]!;
  return direction === 'charge' ? model.efficiency / capacityAh : -1 / capacityAh;
}

function aimAt(model: PlanModel, string: StringCharge, kind: Aim['kind'], ampHours: number, direction: Direction): Aim {
  const soc = model.startSoc.map((start, group) => start + socPerAmpHour(model, group, direction) * ampHours);
  const deviations = soc.map((at) => voltsAtSoc(model.curve, at) - model.targetVolts);
  const ahead = direction === 'charge' ? deviations : deviations.map((off) => -off);
  return {
    kind,
    sumVolts: stringVolts(string, ampHours),
    ampHours,
    soc,
    deviations,
    // A hundredth of a millivolt: the rounding of a group that was aimed at the very edge.
    outside: deviations.flatMap((off, group) => (Math.abs(off) > model.toleranceVolts + 1e-5 ? [group] : [])),
    first: ahead.indexOf(Math.max(...ahead)),
  };
}

/** Ampere-hours at which the highest group is as far over the target as the lowest is under it. */
function middleAmpHours(model: PlanModel, string: StringCharge): number {
  const { curve, soc, socPerAmpHour: steps } = string;
  const needs = soc.map((at, group) => (model.targetSoc - at) / steps[group]!);
  let low = Math.max(0, Math.min(...needs));
  let high = Math.max(0, ...needs);
  const sign = Math.sign(steps[0]!);
  for (let pass = 0; pass < 60; pass += 1) {
    const middle = (low + high) / 2;
    const volts = soc.map((at, group) => curveVolts(curve, at + steps[group]! * middle));
    const centre = (Math.max(...volts) + Math.min(...volts)) / 2;
    if ((centre - model.targetVolts) * sign > 0) high = middle;
    else low = middle;
  }
  return (low + high) / 2;
}
