import { voltsAtSoc } from '../curve/ocv';
import type { OcvTable } from '../types';
import type { Doubt, Spreads } from '../plan-types';
import { socOf } from './soc-of';
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

/** The module of one set of standard normal draws, in the order of `SAMPLE_AXES`. */
export function sampleOf(basis: SampleBasis, draws: number[]): Sample {
  const { spreads, curve } = basis;
  const count = basis.readVolts.length;
  const capacityFactor = Math.exp(spreads.capacityRelative * draws[PLACE.capacity]!);
  const celsius = Math.min(119, Math.max(-59, basis.celsius + spreads.temperatureCelsius * draws[PLACE.temperature]!));
  const resistanceFactor =
    Math.exp(spreads.resistanceRelative * draws[PLACE.resistance]!) *
    (resistanceTemperatureFactor(celsius) / resistanceTemperatureFactor(basis.celsius));
  const curveShift = -spreads.curveVolts * draws[PLACE.curve]!;
  const spareMeter = spreads.meterVolts * draws[PLACE['spare-meter']]!;
  const targetMeter = basis.sameMeter ? spareMeter : spreads.meterVolts * draws[PLACE['target-meter']]!;
  const spareShift =
    curveShift +
    spareMeter +
    (spreads.readingVolts * draws[PLACE['spare-scatter']]!) / Math.sqrt(count) +
    hysteresisOf(spreads, draws[PLACE['spare-hysteresis']]!);
  const targetScatter = draws[PLACE['target-scatter']]!;
  const bySoc = basis.targetSoc ?? null;
  const ownTargetSoc = bySoc === null ? null : bySoc.soc + bySoc.sd * targetScatter;
  const targetShiftVolts =
    ownTargetSoc !== null
      ? voltsAtSoc(curve, ownTargetSoc) - basis.targetVolts
      : curveShift +
        targetMeter +
        spreads.targetVolts * targetScatter +
        hysteresisOf(spreads, draws[PLACE['target-hysteresis']]!);
  const lost = basis.lostSoc * Math.exp(spreads.selfDischargeRelative * draws[PLACE['self-discharge']]!);
  const startSoc = new Array<number>(count);
  const capacityAh = new Array<number>(count);
  const longOhm = new Array<number>(count);
  for (let group = 0; group < count; group += 1) {
    const volts = basis.readVolts[group]!;
    // Groups read alike stand alike.
    startSoc[group] =
      group > 0 && volts === basis.readVolts[group - 1]!
        ? startSoc[group - 1]!
        : socOf(curve, volts + spareShift) - lost;
    capacityAh[group] = basis.capacityAh[group]! * capacityFactor;
    longOhm[group] = basis.longOhm[group]! * resistanceFactor;
  }
  return {
    startSoc,
    targetSoc: ownTargetSoc ?? socOf(curve, basis.targetVolts + targetShiftVolts),
    capacityAh,
    longOhm,
    currentFactor: Math.exp(spreads.currentRelative * draws[PLACE.current]!),
    spareShiftVolts: spareShift,
    targetShiftVolts,
    curveShiftVolts: curveShift,
    chargerDraw: draws[PLACE['charger-meter']]!,
    draws,
  };
}

const hysteresisOf = ({ hysteresisVolts }: Spreads, draw: number): number =>
  hysteresisVolts === 0 ? 0 : hysteresisVolts * (2 * normalCdf(draw) - 1);
