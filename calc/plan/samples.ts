import { compileCurve } from '../curve/compiled-curve';
import { voltsAtSoc } from '../curve/ocv';
import type { OcvTable } from '../types';
import type { Doubt, Spreads } from '../plan-types';
import { socOf, socOfCurve } from './soc-of';
import { resistanceTemperatureFactor } from '../resistance/temperature-factor';
import { inverseNormal } from '../statistics/inverse-normal';
import { latinHypercube, latinHypercubeNormal } from '../statistics/latin-hypercube';
import { normalCdf } from '../statistics/normal-cdf';

/** What one axis of the sample set stands for. */
const AXES = [
  'capacity',
  'resistance',
  'current',
  'spare-meter',
  'spare-scatter',
  'spare-hysteresis',
  'self-discharge',
  'target-meter',
  'target-scatter',
  'target-hysteresis',
  'charger-meter',
  'curve',
  'temperature',
  'leads',
] as const;
type Axis = (typeof AXES)[number];

/** The leads, last of the axes, have a draw of their own, so that they came in without moving the others. */
const LEAD_SEED_STEP = 7919;

/** The number a person would measure better to be rid of an axis. */
export const DOUBT_OF_AXIS: Record<Axis, Doubt> = {
  capacity: 'capacity',
  resistance: 'resistance',
  current: 'current',
  'spare-meter': 'spare-reading',
  'spare-scatter': 'spare-reading',
  'spare-hysteresis': 'curve',
  'self-discharge': 'spare-reading',
  'target-meter': 'target-reading',
  'target-scatter': 'target-reading',
  'target-hysteresis': 'curve',
  'charger-meter': 'charger',
  curve: 'curve',
  temperature: 'temperature',
  leads: 'leads',
};

/** The module as one sample sees it. */
export interface Sample {
  /** Of each group at the clip-on. */
  startSoc: number[];
  /** At which a group truly rests at the target. */
  targetSoc: number;
  capacityAh: number[];
  /** R0 + R1 of each group, ohm. */
  longOhm: number[];
  /** Of a source's current over what it is set to. */
  currentFactor: number;
  /** Per group: what a rest voltage of the spare's meter is more on the curve, V. */
  spareShiftVolts: number;
  /** Per group: what a rest voltage of the target's meter is more on the curve, V. */
  targetShiftVolts: number;
  /** Offset of the curve: what any true voltage is more on it, V per group. */
  curveShiftVolts: number;
  /** Standard deviations that a charger's own voltmeter is off. */
  chargerDraw: number;
  /** The draws behind it, one per axis, for the shares of the doubts; a running charge adds its own after them. */
  draws: number[];
}

export interface SampleBasis {
  curve: OcvTable;
  /** Rest volts as read, per group. */
  readVolts: number[];
  /** Charge lost on the shelf since, as a share of the capacity. */
  lostSoc: number;
  targetVolts: number;
  /** Where the target is a state of charge and not the volts. */
  targetSoc?: { soc: number; sd: number } | null;
  capacityAh: number[];
  longOhm: number[];
  celsius: number;
  /** One meter read both spare and target. */
  sameMeter: boolean;
  spreads: Spreads;
}

/**
 * The seeded sample set of a plan: Latin hypercube over the doubts, one offset per meter and one of the curve.
 *
 * A meter that read both spare and pack has one offset, so that it cancels but for the curve's slopes. Capacities and
 * resistances are drawn by their logarithm, hysteresis evenly over its loop, everything else normally. One sample alone is
 * the nominal run.
 */
export function drawSamples(basis: SampleBasis, count: number, seed: number): Sample[] {
  if (count === 1) return [sampleOf(basis, new Array<number>(AXES.length).fill(0))];
  const leads = latinHypercubeNormal(count, 1, seed + LEAD_SEED_STEP);
  return latinHypercube(count, AXES.length - 1, seed).map((point, at) =>
    sampleOf(basis, [...point.map(inverseNormal), ...leads[at]!]),
  );
}

/** The axes in the order of `Sample.draws`. */
export const SAMPLE_AXES: readonly Axis[] = AXES;
const PLACE = Object.fromEntries(AXES.map((axis, at) => [axis, at])) as Record<Axis, number>;

/** What one set of draws makes of the spare, all its groups alike. */
export interface SpareDrawn {
  capacityFactor: number;
  resistanceFactor: number;
  currentFactor: number;
  /** As in a sample, V per group. */
  curveShiftVolts: number;
  spareMeterVolts: number;
  spareShiftVolts: number;
  /** Charge lost on the shelf, as a share of the capacity. */
  lostSoc: number;
}

/** @param from where the draws begin, in the order of `SAMPLE_AXES` */
export function spareDrawn(basis: SampleBasis, draws: ArrayLike<number>, from = 0): SpareDrawn {
  const { spreads } = basis;
  const drawn = (axis: Axis): number => draws[from + PLACE[axis]]!;
  const celsius = Math.min(119, Math.max(-59, basis.celsius + spreads.temperatureCelsius * drawn('temperature')));
  const curveShiftVolts = -spreads.curveVolts * drawn('curve');
  const spareMeterVolts = spreads.meterVolts * drawn('spare-meter');
  return {
    capacityFactor: Math.exp(spreads.capacityRelative * drawn('capacity')),
    resistanceFactor:
      Math.exp(spreads.resistanceRelative * drawn('resistance')) *
      (resistanceTemperatureFactor(celsius) / resistanceTemperatureFactor(basis.celsius)),
    currentFactor: Math.exp(spreads.currentRelative * drawn('current')),
    curveShiftVolts,
    spareMeterVolts,
    spareShiftVolts:
      curveShiftVolts +
      spareMeterVolts +
      (spreads.readingVolts * drawn('spare-scatter')) / Math.sqrt(basis.readVolts.length) +
      hysteresisOf(spreads, drawn('spare-hysteresis')),
    lostSoc: basis.lostSoc * Math.exp(spreads.selfDischargeRelative * drawn('self-discharge')),
  };
}

/** Where each group of the spare stands at the clip-on in one sample. */
export function startSocs({ curve, readVolts }: SampleBasis, { spareShiftVolts, lostSoc }: SpareDrawn): number[] {
  const ready = compileCurve(curve);
  const soc: number[] = [];
  for (let group = 0; group < readVolts.length; group += 1) {
    const volts = readVolts[group]!;
    // Groups read alike stand alike.
    const alike = group > 0 && volts === readVolts[group - 1]!;
    soc.push(alike ? soc[group - 1]! : socOfCurve(ready, volts + spareShiftVolts) - lostSoc);
  }
  return soc;
}

/** The module of one set of standard normal draws, in the order of `SAMPLE_AXES`. */
export function sampleOf(basis: SampleBasis, draws: number[]): Sample {
  const { spreads, curve } = basis;
  const drawn = spareDrawn(basis, draws);
  const { curveShiftVolts, spareMeterVolts } = drawn;
  const targetMeter = basis.sameMeter ? spareMeterVolts : spreads.meterVolts * draws[PLACE['target-meter']]!;
  const targetScatter = draws[PLACE['target-scatter']]!;
  const bySoc = basis.targetSoc ?? null;
  const ownTargetSoc = bySoc === null ? null : bySoc.soc + bySoc.sd * targetScatter;
  const targetShiftVolts =
    ownTargetSoc !== null
      ? voltsAtSoc(curve, ownTargetSoc) - basis.targetVolts
      : curveShiftVolts +
        targetMeter +
        spreads.targetVolts * targetScatter +
        hysteresisOf(spreads, draws[PLACE['target-hysteresis']]!);
  return {
    startSoc: startSocs(basis, drawn),
    targetSoc: ownTargetSoc ?? socOf(curve, basis.targetVolts + targetShiftVolts),
    capacityAh: times(basis.capacityAh, drawn.capacityFactor),
    longOhm: times(basis.longOhm, drawn.resistanceFactor),
    currentFactor: drawn.currentFactor,
    spareShiftVolts: drawn.spareShiftVolts,
    targetShiftVolts,
    curveShiftVolts,
    chargerDraw: draws[PLACE['charger-meter']]!,
    draws,
  };
}

function times(values: readonly number[], factor: number): number[] {
  const result: number[] = [];
  for (let at = 0; at < values.length; at += 1) result.push(values[at]! * factor);
  return result;
}

const hysteresisOf = ({ hysteresisVolts }: Spreads, draw: number): number =>
  hysteresisVolts === 0 ? 0 : hysteresisVolts * (2 * normalCdf(draw) - 1);
