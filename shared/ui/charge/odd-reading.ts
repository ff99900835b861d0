/** A reading that the plan does not explain: what was seen, and what to check before it is believed. Pure. */
import type { ChargeDto } from '@/shared/contract/charge';
import { readQuantity } from '@/shared/contract/read-quantity';
import { moment } from '../format/clock';
import type { LocaleMarks } from '../format/marks';
import {
  amps as ampsWords,
  celsius as celsiusWords,
  clipVolts,
  millivolts,
  volts as voltsWords,
} from '../format/quantities';
import { channelsOf, isFlowing } from './card-model';
import type { LogValues } from './log-form';

export interface OddReading {
  /** Field to read again. */
  field: 'terminalVolts' | 'amps' | 'celsius' | `groupVolts.${number}`;
  /** 'Read group 3 again' */
  again: string;
  seen: string;
  /** What speaks for or against it; empty where nothing does. */
  beside: string;
  /** 'warmth at group 3, then …' */
  checkFirst: string;
  group: number | null;
}

/*
 * How far off is odd. Guesses: a hand meter and its clips on a warm module differ by a few millivolts, a charger's
 * display by its leads, so that these stand well clear of both.
 */
const leastGroupVolts = 0.01;
const clipVoltsPerGroup = 0.05;
const oddAmps = 0.5;
const oddAmpsShare = 0.1;
const oddKelvin = 8;

export interface OddContext {
  lagLimitVolts: number;
  maxChargeCelsius: number | null;
  zone: string;
  now: number;
  marks: LocaleMarks;
}

export interface ExpectedNow {
  /** At the clips; null while nothing flows. */
  volts: number | null;
  amps: number | null;
  celsius: number | null;
}

/** What the charger and the module should show at this moment, by the reckoning. */
export function expectedNow(charge: ChargeDto): ExpectedNow {
  const moved = charge.option.steps[charge.stepIndex]?.groupIndexes ?? [];
  const clips = moved.map((group) => charge.groups[group]?.clipVolts ?? null).filter((volts) => volts !== null);
  const way = charge.option.steps[charge.stepIndex]?.way ?? charge.way;
  const sum = clips.reduce((total, volts) => total + volts, 0);
  const flows = isFlowing(charge) && clips.length === moved.length && clips.length > 0;
  return {
    volts: flows ? (way === 'paralleled' ? sum / clips.length : sum) : null,
    amps: flows && charge.amps !== null ? Math.abs(charge.amps) : null,
    celsius: charge.expected?.celsius ?? null,
  };
}

/** Beyond these nobody asks what is odd: the sentence at the field says what is wrong with the number. */
const underCurrentVolts = 0.5;
const mostTimesPlanned = 2;

/** As the form reads it: '3968 mV' is 3.968 V, and what is in another unit is no reading yet. */
const value = (text: string, unit: 'V' | 'A' | '°C'): number | null => {
  const read = readQuantity(text, { name: '', unit, min: -99_999, max: 99_999 });
  return read.ok ? read.value : null;
};

/** The oddest thing about what is typed for now; null: nothing is odd, or nothing is expected. */
export function oddReading(typed: LogValues, charge: ChargeDto, context: OddContext): OddReading | null {
  return (
    oddTemperature(typed, charge, context) ??
    (typed.at.trim() === ''
      ? (oddGroupVolts(typed, charge, context) ??
        oddCurrent(typed, charge, context) ??
        oddClips(typed, charge, context))
      : null)
  );
}

function oddTemperature(typed: LogValues, charge: ChargeDto, { maxChargeCelsius }: OddContext): OddReading | null {
  const celsius = value(typed.celsius, '°C');
  if (celsius === null) return null;
  const odd = { field: 'celsius' as const, again: 'Read the temperature again', group: null };
  if (maxChargeCelsius !== null && celsius > maxChargeCelsius)
    return {
      ...odd,
      seen: `${celsiusWords(celsius)} is over this type’s ${celsiusWords(maxChargeCelsius)}.`,
      beside: 'It is too warm to be charged on.',
      checkFirst: 'whether it rises further. Hold the charge and let it cool.',
    };
  const expected = expectedNow(charge).celsius;
  if (expected === null || typed.at.trim() !== '' || celsius - expected <= oddKelvin) return null;
  return {
    ...odd,
    seen: `${celsiusWords(celsius)} is ${celsiusWords(celsius - expected)} warmer than expected.`,
    beside: '',
    checkFirst: 'where it is warmest, then the clips there, then the fan.',
  };
}

const median = (values: readonly number[]): number => {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = Math.floor(sorted.length / 2);
  return sorted.length % 2 ? sorted[middle]! : (sorted[middle - 1]! + sorted[middle]!) / 2;
};

/** One group off from what was expected, beside the others: a module that is off as a whole shifts them all. */
function oddGroupVolts(typed: LogValues, charge: ChargeDto, context: OddContext): OddReading | null {
  const { lagLimitVolts, zone, now, marks } = context;
  const seen = typed.groupVolts.map((text) => value(text, 'V'));
  const most = charge.chargeLimitVolts + underCurrentVolts;
  if (
    seen.some((one) => one === null || one > most || one < 0) ||
    seen.length !== charge.groups.length ||
    seen.length === 0
  )
    return null;
  const off = charge.groups.map((group, index) => seen[index]! - (group.clipVolts ?? group.volts));
  const common = off.length > 2 ? median(off) : 0;
  const group = off.reduce(
    (most, one, index) => (Math.abs(one - common) > Math.abs(off[most]! - common) ? index : most),
    0,
  );
  if (Math.abs(off[group]! - common) <= Math.max(leastGroupVolts, lagLimitVolts)) return null;
  const under = off[group]! < 0;
  const before = [...charge.readings]
    .filter((reading) => reading.replacedBy === null && reading.groupVolts !== null)
    .sort((a, b) => a.at.localeCompare(b.at))
    .at(-1);
  const last = before?.groupVolts?.[group];
  const clips = value(typed.terminalVolts, 'V');
  const expected = expectedNow(charge).volts;
  const silent =
    charge.way === 'terminals' &&
    clips !== null &&
    expected !== null &&
    Math.abs(clips - expected) < Math.abs(off[group]!) / 2;
  return {
    field: `groupVolts.${group}`,
    again: `Read group ${group + 1} again`,
    seen: `G${group + 1} is ${millivolts(Math.abs(off[group]!))} ${under ? 'under' : 'over'} what was expected.`,
    beside: [
      before && last !== undefined
        ? `It read ${voltsWords(last, marks)} at ${moment(Date.parse(before.at), zone, now, marks)}.`
        : '',
      silent ? `The clips show no such ${under ? 'fall' : 'rise'}.` : '',
    ]
      .filter(Boolean)
      .join(' '),
    checkFirst: `warmth at group ${group + 1}, then the meter tip on its tab, then its busbar.`,
    group,
  };
}

function oddCurrent(typed: LogValues, charge: ChargeDto, { marks }: OddContext): OddReading | null {
  const seen = value(typed.amps, 'A');
  const expected = expectedNow(charge).amps;
  if (seen === null || expected === null) return null;
  const size = Math.abs(seen);
  if (size > charge.option.amps * mostTimesPlanned) return null;
  if (Math.abs(size - expected) <= Math.max(oddAmps, oddAmpsShare * charge.option.amps)) return null;
  const channel = channelsOf(charge) || 'the charger';
  const none = size < 0.05;
  return {
    field: 'amps',
    again: 'Read the current again',
    seen: `${none ? 'No current flows.' : `The current stands at ${ampsWords(size, marks)}.`} ${ampsWords(expected, marks)} was expected.`,
    beside: '',
    checkFirst: none
      ? `whether ${channel} is on, then the clips, then its set voltage.`
      : `the clips, then what ${channel} is set to.`,
    group: null,
  };
}

function oddClips(typed: LogValues, charge: ChargeDto, { marks }: OddContext): OddReading | null {
  const seen = value(typed.terminalVolts, 'V');
  const expected = expectedNow(charge).volts;
  if (seen === null || expected === null) return null;
  const way = charge.option.steps[charge.stepIndex]?.way ?? charge.way;
  const groups = way === 'terminals' ? charge.groups.length : 1;
  if (seen < 0 || seen > groups * (charge.chargeLimitVolts + underCurrentVolts)) return null;
  const off = seen - expected;
  if (Math.abs(off) <= clipVoltsPerGroup * groups) return null;
  return {
    field: 'terminalVolts',
    again: 'Read the clips again',
    seen: `${clipVolts(seen, marks)} at the clips is ${clipVolts(Math.abs(off), marks)} ${off < 0 ? 'under' : 'over'} what was expected.`,
    beside: '',
    checkFirst: 'the clips and their leads, then the current, then the set voltage.',
    group: null,
  };
}
