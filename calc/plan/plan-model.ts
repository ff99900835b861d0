import { voltsAtSoc } from '../curve/ocv';
import { socOf } from './soc-of';
import { isGiven } from '../require';
import { CHEMISTRIES } from '../parameters/chemistries';
import { temperatureVolts } from '../parameters/temperature-coefficient';
import { splitLongResistance, longResistance } from '../resistance/long-resistance';
import { resistanceTemperatureFactor } from '../resistance/temperature-factor';
import type { CellGroup, Direction, OcvTable } from '../types';
import type { PlanInput, Spreads } from '../plan-types';
import { CAPACITY_RELATIVE_SD, DEFAULT_SPREADS, resistanceRelativeSd } from './default-spreads';
import { drawSamples, type Sample, type SampleBasis } from './samples';

/** A month of the self-discharge tables, s. */
const MONTH_S = 30.44 * 86_400;
/** The over-voltage counts as settled below this share of the tolerance, per group. */
const SETTLED_SHARE = 1 / 3;
/** On the mark ends within this share of the tolerance. */
const ON_THE_MARK_SHARE = 1 / 3;

/**
 * Type 7 quantiles of n even points are drawn to the middle: of 64 the 10 and 90 % lines hold 78.7 % of a distribution, of 96
 * 79.2 %.
 */
export const DEFAULT_SAMPLES = 96;

/** What all ways of one plan start from: the nominal module at the clip-on, and its samples. */
export interface PlanModel {
  input: PlanInput;
  curve: OcvTable;
  /** Share of the charge that stays, while charging. */
  efficiency: number;
  groups: CellGroup[];
  startSoc: number[];
  startVolts: number[];
  targetVolts: number;
  targetSoc: number;
  toleranceVolts: number;
  /** Of a charge through the terminals, by the sum of the groups. */
  direction: Direction;
  /** Of the module. */
  celsius: number;
  /** Summed |v1| at which a module of `n` groups counts as rested, V. */
  settledVolts: (groupCount: number) => number;
  /** What on the mark may stay short of the target, V per group. */
  markVolts: number;
  nominal: Sample;
  /** Drawn when they are first asked for: a charge that was read has samples of its own. */
  samples: () => readonly Sample[];
  sampleCount: number;
  /** What the samples were drawn about. */
  basis: SampleBasis;
  spreads: Spreads;
}

/** Makes the model of an input that was not refused. */
export function planModel(input: PlanInput): PlanModel {
  const { module, spare, target } = input;
  const chemistry = CHEMISTRIES[module.chemistry];
  const curve = module.curve ?? chemistry.curve;
  const celsius = spare.celsius ?? input.celsius;
  const capacityAh = spare.groupVolts.map((_, group) =>
    Array.isArray(spare.capacityAh) ? spare.capacityAh[group]! : spare.capacityAh,
  );
  const longOhm = capacityAh.map((ampHours) => groupLongOhm(input, ampHours) * resistanceTemperatureFactor(celsius));
  const lostSoc =
    ((module.selfDischargePerMonth ?? chemistry.selfDischargePerMonth) * Math.max(0, spare.readingAgeS)) / MONTH_S;
  const readVolts = atTargetTemperature(input, curve);
  const startSoc = readVolts.map((volts) => socOf(curve, volts) - lostSoc);
  const startVolts = startSoc.map((soc) => voltsAtSoc(curve, soc));
  const spreads = spreadsOf(input, chemistry.hysteresisVolts);
  const basis: SampleBasis = {
    curve,
    readVolts,
    lostSoc,
    targetVolts: target.volts,
    targetSoc: isGiven(target.soc) ? { soc: target.soc, sd: target.socSd ?? DEFAULT_SPREADS.targetSoc } : null,
    capacityAh,
    longOhm,
    celsius,
    sameMeter: spare.meterId !== null && spare.meterId === target.meterId,
    spreads,
  };
  const sum = startVolts.reduce((total, volts) => total + volts, 0);
  const sampleCount = input.samples ?? DEFAULT_SAMPLES;
  let drawn: Sample[] | null = null;
  return {
    input,
    curve,
    efficiency: chemistry.coulombicEfficiency,
    groups: startVolts.map((restVolts, group) => ({
      capacityAh: capacityAh[group]!,
      ...splitLongResistance(longOhm[group]!),
      polarisationTimeConstantS: module.polarisationTimeConstantS ?? chemistry.polarisationTimeConstantS,
      restVolts,
    })),
    startSoc,
    startVolts,
    targetVolts: target.volts,
    targetSoc: target.soc ?? socOf(curve, target.volts),
    toleranceVolts: target.toleranceVolts,
    direction: sum <= target.volts * startVolts.length ? 'charge' : 'discharge',
    celsius,
    settledVolts: (groupCount) => groupCount * target.toleranceVolts * SETTLED_SHARE,
    markVolts: target.toleranceVolts * ON_THE_MARK_SHARE,
    nominal: drawSamples(basis, 1, input.seed)[0]!,
    samples: () => (drawn ??= drawSamples(basis, sampleCount, input.seed)),
    sampleCount,
    basis,
    spreads,
  };
}

/**
 * The spare's readings as they would be at the temperature the pack was read at: U moves by dU/dT·ΔT, some millivolts for
 * ten kelvin near empty and less than one elsewhere.
 */
function atTargetTemperature({ module, spare, target }: PlanInput, curve: OcvTable): number[] {
  const from = spare.celsius;
  const to = target.celsius;
  const coefficient = CHEMISTRIES[module.chemistry].temperatureCoefficient;
  if (from === null || to === null || coefficient === null) return [...spare.groupVolts];
  return spare.groupVolts.map((volts) => {
    const soc = socOf(curve, volts);
    return volts + temperatureVolts(coefficient, soc, to) - temperatureVolts(coefficient, soc, from);
  });
}

/** R0 + R1 of one group at 25 °C, ohm. */
function groupLongOhm({ module }: PlanInput, capacityAh: number): number {
  if (module.resistanceOhm !== null) return longResistance(module.resistanceKind, module.resistanceOhm);
  return CHEMISTRIES[module.chemistry].resistanceOhmAh / capacityAh;
}

function spreadsOf(input: PlanInput, hysteresisVolts: number): Spreads {
  const { module, spare, target } = input;
  const unread = spare.celsius === null;
  return {
    capacityRelative: spare.capacityRelativeSd ?? CAPACITY_RELATIVE_SD[spare.capacitySource],
    resistanceRelative: resistanceRelativeSd(module),
    currentRelative: DEFAULT_SPREADS.currentRelative,
    meterVolts: DEFAULT_SPREADS.meterVolts,
    readingVolts: DEFAULT_SPREADS.readingVolts,
    targetVolts: target.sdVolts ?? DEFAULT_SPREADS.targetVolts,
    chargerVolts: DEFAULT_SPREADS.chargerVolts,
    curveVolts: DEFAULT_SPREADS.curveVolts,
    hysteresisVolts,
    temperatureCelsius: unread ? DEFAULT_SPREADS.temperatureUnreadCelsius : DEFAULT_SPREADS.temperatureCelsius,
    selfDischargeRelative: DEFAULT_SPREADS.selfDischargeRelative,
    ...input.spreads,
  };
}
