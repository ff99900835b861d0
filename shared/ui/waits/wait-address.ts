import type { WaitDimension, WaitsQuery } from '@/shared/contract/waits';
import { addDays, daysBetween } from '../format/zone';
import { dimensionNames, stageNames, wayNames, weekdayNames } from './wait-words';

/** What the address of the waits can hold. Everything on the page follows from it: a reload or a sent link shows the same. */
export const addressKeys = [
  ...(['weeks', 'from', 'to', 'type', 'charger', 'channel', 'technician', 'way', 'weekday', 'stage'] as const),
  ...(['by', 'show', 'compare', 'cfrom', 'cto', 'week'] as const),
  ...(['levers', 'shelftype', 'shelfvolts', 'ampslike', 'amps', 'morelike', 'lookin'] as const),
] as const;
export type AddressKey = (typeof addressKeys)[number];
export type WaitParams = Partial<Record<AddressKey, string>>;

export const periods = {
  '4': '4 weeks',
  '8': '8 weeks',
  '13': '13 weeks',
  '26': '26 weeks',
  '52': '52 weeks',
  all: 'All time',
  days: 'From day to day',
} as const;
export type Period = keyof typeof periods;
const DEFAULT_PERIOD: Period = '8';
/** Before any workshop of ours: 'all time' has to have a first day. */
const FIRST_DAY = '2000-01-01';

export const comparisons = {
  none: 'Nothing',
  before: 'As many weeks before',
  year: 'The same weeks a year before',
  days: 'Other days',
} as const;
export type Comparison = keyof typeof comparisons;

export interface WaitAddress {
  period: Period;
  /** What the server is asked for. */
  query: WaitsQuery & { from: string; to: string };
  by: WaitDimension;
  show: 'wait' | 'plan';
  compare: Comparison;
  /** The days compared with; null: none, or they are not typed yet. */
  compareDays: { from: string; to: string } | null;
  /** Monday of a week: the charges behind one bar. */
  week: string | null;
  /** How many filters narrow the page, the period aside. */
  narrowed: number;
}

const oneOf = <K extends string>(value: string | undefined, names: Record<K, unknown>): K | undefined =>
  value !== undefined && Object.hasOwn(names, value) ? (value as K) : undefined;
const day = (value: string | undefined): string | null =>
  value !== undefined && /^\d{4}-\d\d-\d\d$/.test(value) && Number.isFinite(Date.parse(value)) ? value : null;
const id = (value: string | undefined): string | undefined =>
  value !== undefined && /^[A-Za-z0-9_-]{1,64}$/.test(value) ? value : undefined;

/** Monday of the week of a day. */
export const mondayOf = (of: string): string => addDays(of, -((new Date(`${of}T00:00:00Z`).getUTCDay() + 6) % 7));

/** Reads the address. What is not understood in it counts as not there: an old link still shows a page. */
export function readAddress(params: WaitParams, today: string): WaitAddress {
  const [from, to] = [day(params.from), day(params.to)];
  const own = from !== null && to !== null && from <= to;
  const asked = oneOf(params.weeks, periods);
  const period: Period = own || asked === 'days' ? 'days' : (asked ?? DEFAULT_PERIOD);
  const weeks = Number.isFinite(Number(period)) ? Number(period) : Number(DEFAULT_PERIOD);
  const days = own
    ? { from, to }
    : { from: period === 'all' ? FIRST_DAY : addDays(mondayOf(today), -7 * (weeks - 1)), to: today };
  const filters: WaitsQuery = {
    moduleTypeId: id(params.type),
    chargerId: id(params.charger),
    channelId: id(params.channel),
    technicianId: id(params.technician),
    way: oneOf(params.way, wayNames),
    weekday: oneOf(params.weekday, weekdayNames),
    stage: oneOf(params.stage, stageNames),
  };
  const set = Object.entries(filters).filter(([, value]) => value !== undefined);
  const compare = oneOf(params.compare, comparisons) ?? 'none';
  return {
    period,
    query: { ...days, ...(Object.fromEntries(set) as WaitsQuery) },
    by: oneOf(params.by, dimensionNames) ?? 'module-type',
    show: params.show === 'plan' ? 'plan' : 'wait',
    compare,
    compareDays: comparedDays(compare, days, { from: day(params.cfrom), to: day(params.cto) }),
    week: day(params.week),
    narrowed: set.length,
  };
}

function comparedDays(
  compare: Comparison,
  { from, to }: { from: string; to: string },
  typed: { from: string | null; to: string | null },
): { from: string; to: string } | null {
  if (compare === 'none') return null;
  if (compare === 'days')
    return typed.from !== null && typed.to !== null && typed.from <= typed.to
      ? { from: typed.from, to: typed.to }
      : null;
  if (from === FIRST_DAY) return null;
  // Whole weeks back, so that both begin and end on the same weekday.
  const back = compare === 'year' ? 364 : 7 * Math.ceil((daysBetween(from, to) + 1) / 7);
  return { from: addDays(from, -back), to: addDays(to, -back) };
}

/** '/waits/charges?weeks=4&type=t1': an address with what is set in it. */
export function addressOf(path: string, params: WaitParams): string {
  const set = addressKeys.flatMap((key): [string, string][] => {
    const value = params[key];
    return value === undefined || value === '' ? [] : [[key, value]];
  });
  return set.length === 0 ? path : `${path}?${new URLSearchParams(set).toString()}`;
}

/** The key of the address that narrows to a group of a dimension. */
export const keyOfDimension: Record<WaitDimension, AddressKey> = {
  'module-type': 'type',
  charger: 'charger',
  channel: 'channel',
  technician: 'technician',
  way: 'way',
  weekday: 'weekday',
};
