import { compileCurve, type CompiledCurve } from '../curve/compiled-curve';
import { curveVolts } from '../curve/ocv';
import type { ChannelParameters } from '../plan-types';
import type { PlanModel } from '../plan/plan-model';
import {
  capacityFactor,
  currentFactor,
  curveShiftVolts,
  resistanceFactor,
  SAMPLE_AXES,
  startSocs,
} from '../plan/samples';
import { LEADS_AXIS, LIVE_AXES } from './live-draws';
import { LIVE_SPREADS } from './live-spreads';
import type { Observation } from './observations';

/** What readings see of the samples, a column each, in this order; the charge of each place follows after them. */
export const FACTS = {
  /** Capacity and resistance over the nominal ones. */
  capacity: 0,
  resistance: 1,
  /** Of a source's current over what it is set to. */
  current: 2,
  /** What any true voltage is more on the curve, V per group. */
  curveVolts: 3,
  /** Standard deviations that the spare's meter, a charger's own and the temperature are off. */
  spareMeter: 4,
  chargerMeter: 5,
  temperature: 6,
  /** Leads over what was entered, and those that nobody has entered, ohm. */
  leads: 7,
  unknownLeadOhm: 8,
} as const;
const FACT_NAMES = Object.keys(FACTS) as (keyof typeof FACTS)[];
const FACT_COUNT = FACT_NAMES.length;

const SPARE_METER = SAMPLE_AXES.indexOf('spare-meter');
const CHARGER_METER = SAMPLE_AXES.indexOf('charger-meter');
const TEMPERATURE = SAMPLE_AXES.indexOf('temperature');

/** Groups whose mean rest voltage a reading sees, each with its share in it. */
export interface Place {
  groups: readonly number[];
  shares: readonly number[];
}

/** What was read less what a sample has for it: straight in its facts, but for the curve. */
export interface Residual {
  /** What was read, less what is the same in all samples. */
  read: number;
  /** The place whose rest voltage is taken off; −1: none. */
  place: number;
  /** Charge that has gone into it, as a share of the nominal capacity. */
  movedSoc: number;
  /** What one of each fact adds. */
  slopes: readonly number[];
}

/** Of a residual without a rest voltage. */
export const NO_PLACE = { place: -1, movedSoc: 0 } as const;

/** Slopes of a residual, 0 where nothing is said. */
export const slopesOf = (by: Partial<Record<keyof typeof FACTS, number>>): number[] =>
  FACT_NAMES.map((fact) => by[fact] ?? 0);

/** Ohm of a channel's leads by the facts (leadOhmOf). */
export function leadSlopes({ leadResistanceOhm, senses }: ChannelParameters): {
  leads: number;
  unknownLeadOhm: number;
} {
  if (leadResistanceOhm > 0) return { leads: leadResistanceOhm, unknownLeadOhm: 0 };
  return { leads: 0, unknownLeadOhm: senses === 'module' ? 0 : 1 };
}

const sameNumbers = (some: readonly number[], others: readonly number[]): boolean =>
  some === others || (some.length === others.length && some.every((one, at) => one === others[at]));

/** All groups of a module alike. */
export const wholePlace = (model: PlanModel): Place => ({
  groups: model.groups.map((_, group) => group),
  shares: model.groups.map(() => 1 / model.groups.length),
});

/** The places that readings of a charge see. */
export function placesOf(model: PlanModel, observations: readonly Observation[]): Place[] {
  const places: Place[] = [];
  const add = (place: Place): void => {
    if (!places.some((one) => isSame(one, place))) places.push(place);
  };
  for (const { circuit, atRest } of observations) {
    if (circuit) add(circuit);
    if (atRest) add(wholePlace(model));
  }
  return places;
}

const isSame = (one: Place, other: Place): boolean =>
  sameNumbers(one.groups, other.groups) && sameNumbers(one.shares, other.shares);

/** Makes the facts of samples from their draws. */
export class LiveFacts {
  private readonly width: number;
  private readonly curve: CompiledCurve;
  private readonly nominalOhm: number;
  /** Room for the groups of one sample. */
  private readonly startSoc: number[] = [];

  constructor(
    private readonly model: PlanModel,
    private readonly places: readonly Place[],
  ) {
    this.width = FACT_COUNT + places.length;
    this.curve = compileCurve(model.curve);
    this.nominalOhm = model.nominal.longOhm[0]!;
  }

  /** The facts of one sample into their columns. */
  write(draws: Float64Array, columns: Float64Array, at: number): void {
    const { basis } = this.model;
    const from = at * LIVE_AXES;
    const count = columns.length / this.width;
    const leads = draws[from + LEADS_AXIS]!;
    columns[FACTS.capacity * count + at] = capacityFactor(basis, draws, from);
    columns[FACTS.resistance * count + at] =
      (basis.longOhm[0]! * resistanceFactor(basis, draws, from)) / this.nominalOhm;
    columns[FACTS.current * count + at] = currentFactor(basis, draws, from);
    columns[FACTS.curveVolts * count + at] = curveShiftVolts(basis, draws, from);
    columns[FACTS.spareMeter * count + at] = draws[from + SPARE_METER]!;
    columns[FACTS.chargerMeter * count + at] = draws[from + CHARGER_METER]!;
    columns[FACTS.temperature * count + at] = draws[from + TEMPERATURE]!;
    columns[FACTS.leads * count + at] = Math.exp(LIVE_SPREADS.leadRelative * leads);
    columns[FACTS.unknownLeadOhm * count + at] = LIVE_SPREADS.leadUnknownOhm * Math.max(0, leads);
    if (this.places.length === 0) return;
    const soc = startSocs(basis, draws, from, this.startSoc);
    for (let place = 0; place < this.places.length; place += 1) {
      const { groups, shares } = this.places[place]!;
      let mean = 0;
      for (let k = 0; k < groups.length; k += 1) mean += shares[k]! * soc[groups[k]!]!;
      columns[(FACT_COUNT + place) * count + at] = mean;
    }
  }

  /** The facts of all samples of a set of draws. */
  columnsOf(draws: Float64Array): Float64Array {
    const count = draws.length / LIVE_AXES;
    const columns = new Float64Array(count * this.width);
    for (let at = 0; at < count; at += 1) this.write(draws, columns, at);
    return columns;
  }

  /** The place of a residual, and the charge that has gone into it. */
  at(place: Place, movedAh: readonly number[]): Pick<Residual, 'place' | 'movedSoc'> {
    const { efficiency, basis } = this.model;
    const movedSoc = place.groups.reduce((sum, group, k) => {
      const moved = movedAh[group]!;
      return sum + (place.shares[k]! * (moved > 0 ? moved * efficiency : moved)) / basis.capacityAh[group]!;
    }, 0);
    return { place: this.places.findIndex((one) => isSame(one, place)), movedSoc };
  }

  /** A residual in each of so many samples. */
  residuals({ read, place, movedSoc, slopes }: Residual, columns: Float64Array, into: Float64Array): void {
    const { curve } = this;
    const count = into.length;
    into.fill(read);
    for (let fact = 0; fact < FACT_COUNT; fact += 1) {
      const slope = slopes[fact]!;
      if (slope === 0) continue;
      const from = fact * count;
      for (let at = 0; at < count; at += 1) into[at] = into[at]! + slope * columns[from + at]!;
    }
    if (place < 0) return;
    const soc = (FACT_COUNT + place) * count;
    const capacity = FACTS.capacity * count;
    for (let at = 0; at < count; at += 1)
      into[at] = into[at]! - curveVolts(curve, columns[soc + at]! + movedSoc / columns[capacity + at]!);
  }
}
