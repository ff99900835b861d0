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

/** Capacity of one set of draws over the nominal one. The draws begin at `from`, in the order of `SAMPLE_AXES`. */
export const capacityFactor = ({ spreads }: SampleBasis, draws: ArrayLike<number>, from = 0): number =>
  Math.exp(spreads.capacityRelative * draws[from + PLACE.capacity]!);

/** Resistance over the nominal one. */
export function resistanceFactor({ spreads, celsius }: SampleBasis, draws: ArrayLike<number>, from = 0): number {
  const own = Math.min(119, Math.max(-59, celsius + spreads.temperatureCelsius * draws[from + PLACE.temperature]!));
  return (
    Math.exp(spreads.resistanceRelative * draws[from + PLACE.resistance]!) *
    (resistanceTemperatureFactor(own) / resistanceTemperatureFactor(celsius))
  );
}

/** Current of a source over what it is set to. */
export const currentFactor = ({ spreads }: SampleBasis, draws: ArrayLike<number>, from = 0): number =>
  Math.exp(spreads.currentRelative * draws[from + PLACE.current]!);

/** What any true voltage is more on the curve, V per group. */
export const curveShiftVolts = ({ spreads }: SampleBasis, draws: ArrayLike<number>, from = 0): number =>
  -spreads.curveVolts * draws[from + PLACE.curve]!;

/** What a rest voltage of the spare's meter is more on the curve, V per group. */
export const spareShiftVolts = (basis: SampleBasis, draws: ArrayLike<number>, from = 0): number =>
  curveShiftVolts(basis, draws, from) +
  basis.spreads.meterVolts * draws[from + PLACE['spare-meter']]! +
  (basis.spreads.readingVolts * draws[from + PLACE['spare-scatter']]!) / Math.sqrt(basis.readVolts.length) +
  hysteresisOf(basis.spreads, draws[from + PLACE['spare-hysteresis']]!);

/** Where each group of the spare stands at the clip-on, into a list. */
export function startSocs(basis: SampleBasis, draws: ArrayLike<number>, from: number, into: number[]): number[] {
  const { curve, readVolts, spreads } = basis;
  const ready = compileCurve(curve);
  const shift = spareShiftVolts(basis, draws, from);
  const lost = basis.lostSoc * Math.exp(spreads.selfDischargeRelative * draws[from + PLACE['self-discharge']]!);
  for (let group = 0; group < readVolts.length; group += 1) {
    const volts = readVolts[group]!;
    // Groups read alike stand alike.
    const alike = group > 0 && volts === readVolts[group - 1]!;
    into[group] = alike ? into[group - 1]! : socOfCurve(ready, volts + shift) - lost;
  }
  return into;
}

/** The module of one set of standard normal draws, in the order of `SAMPLE_AXES`. */
export function sampleOf(basis: SampleBasis, draws: number[]): Sample {
  const { spreads, curve } = basis;
  const curveShift = curveShiftVolts(basis, draws);
  const targetMeter = spreads.meterVolts * draws[PLACE[basis.sameMeter ? 'spare-meter' : 'target-meter']]!;
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
  return {
    startSoc: startSocs(basis, draws, 0, []),
    targetSoc: ownTargetSoc ?? socOf(curve, basis.targetVolts + targetShiftVolts),
    capacityAh: times(basis.capacityAh, capacityFactor(basis, draws)),
    longOhm: times(basis.longOhm, resistanceFactor(basis, draws)),
    currentFactor: currentFactor(basis, draws),
    spareShiftVolts: spareShiftVolts(basis, draws),
    targetShiftVolts,
    curveShiftVolts: curveShift,
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
