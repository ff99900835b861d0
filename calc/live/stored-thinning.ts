import { CalcInputError } from '../errors';
import { requireNotNegative, requirePositive } from '../require';

/** What a stored reading may hold. Left out by its source: null. */
export interface StoredPoint {
  /** Instant, s, from any zero. */
  s: number;
  terminalVolts: number | null;
  amps: number | null;
  celsius: number | null;
  groupVolts: readonly number[] | null;
}

/** How far a reading that is not stored may lie from the straight line between the stored ones. */
export interface ThinningRule {
  /** Volts between the clips, V. */
  terminalVolts: number;
  amps: number;
  celsius: number;
  /** Volts of each group, V. */
  groupVolts: number;
  /** No two stored readings are further apart than this, s, where there are any between them. */
  mostS: number;
}

/**
 * The rule that is used: 4 mV between the clips, 20 mA, 0.3 °C, 1 mV in a group, ten minutes. Below what a bench meter tells
 * apart (common practice), so that nothing is lost that a person or the estimate could see.
 */
export const STORED_THINNING: ThinningRule = {
  terminalVolts: 0.004,
  amps: 0.02,
  celsius: 0.3,
  groupVolts: 0.001,
  mostS: 600,
};

/** Thins readings as they come, holding two of them whatever the number. */
export interface Thinning<Point extends StoredPoint> {
  /**
   * Takes the next reading in the order of time; gives the one that is now sure to be stored, or null.
   * @throws CalcInputError for one that is earlier than the one before it, or holds what is no number
   */
  push: (point: Point) => Point | null;
  /** Gives the last one, where it is not stored yet, and begins anew. */
  finish: () => Point | null;
}

/** Slopes from the last stored reading that pass every one since within the deadband: one quantity's. */
interface Cone {
  low: number;
  high: number;
}

/**
 * Begins a thinning by deadband. A reading is stored when the line from the last stored one to the one after it would
 * pass it, or any reading since, by more than the rule's deadband in any quantity; when it is the last within `mostS` of
 * the last stored one; when the next one has other quantities than it, or its very instant. First and last are always stored. So every
 * reading that is left out lies within the deadband of the straight line between its stored neighbours, and one that
 * stands out from its neighbours' line by more is never left out.
 *
 * The lines through a reading at Δs after the last stored value y₀ within ± d have slopes (y − y₀ ± d) / Δs; what these
 * ranges share, reading by reading, is all that has to be remembered (the cone of a swinging door, common practice in
 * process recording).
 * @throws CalcInputError for a deadband below 0 or a longest gap that is not above 0
 */
export function startThinning<Point extends StoredPoint>(rule: ThinningRule = STORED_THINNING): Thinning<Point> {
  for (const name of ['terminalVolts', 'amps', 'celsius', 'groupVolts'] as const)
    requireNotNegative(`rule.${name}`, rule[name]);
  requirePositive('rule.mostS', rule.mostS);
  let stored: Point | null = null;
  let waiting: Point | null = null;
  let cones: Cone[] = [];
  return {
    push: (point) => {
      checkPoint(point, waiting ?? stored);
      if (stored === null) {
        stored = point;
        return point;
      }
      if (waiting !== null && !follows(stored, waiting, point, cones, rule)) {
        stored = waiting;
        waiting = point;
        cones = conesFrom(stored, point, rule);
        return stored;
      }
      cones = waiting === null ? conesFrom(stored, point, rule) : narrowed(cones, conesFrom(stored, point, rule));
      waiting = point;
      return null;
    },
    finish: () => {
      const last = waiting;
      [stored, waiting, cones] = [null, null, []];
      return last;
    },
  };
}

/**
 * The readings that are stored of these, by `startThinning`.
 * @throws CalcInputError for readings out of the order of time
 */
export function thinForStoring<Point extends StoredPoint>(
  points: Iterable<Point>,
  rule: ThinningRule = STORED_THINNING,
): Point[] {
  const thinning = startThinning<Point>(rule);
  const kept: Point[] = [];
  for (const point of points) {
    const sure = thinning.push(point);
    if (sure !== null) kept.push(sure);
  }
  const last = thinning.finish();
  return last === null ? kept : [...kept, last];
}

/** Deadbands so many times as wide; the longest gap stays. */
export function widerThinning(rule: ThinningRule, times: number): ThinningRule {
  requirePositive('times', times);
  const { terminalVolts, amps, celsius, groupVolts, mostS } = rule;
  return {
    terminalVolts: terminalVolts * times,
    amps: amps * times,
    celsius: celsius * times,
    groupVolts: groupVolts * times,
    mostS,
  };
}

/** Whether the line from the last stored reading to this one passes all between them, the waiting one among them. */
function follows(
  stored: StoredPoint,
  waiting: StoredPoint,
  point: StoredPoint,
  cones: readonly Cone[],
  rule: ThinningRule,
): boolean {
  const seconds = point.s - stored.s;
  if (seconds > rule.mostS || waiting.s === stored.s || point.s === waiting.s) return false;
  if (!sameQuantities(stored, waiting) || !sameQuantities(waiting, point)) return false;
  const from = valuesOf(stored);
  return valuesOf(point).every((value, at) => {
    const slope = (value - from[at]!) / seconds;
    return slope >= cones[at]!.low && slope <= cones[at]!.high;
  });
}

function conesFrom(stored: StoredPoint, point: StoredPoint, rule: ThinningRule): Cone[] {
  const seconds = point.s - stored.s;
  // Other quantities, or the same instant: `follows` refuses before a cone is looked at.
  if (seconds === 0 || !sameQuantities(stored, point)) return [];
  const from = valuesOf(stored);
  const bands = bandsOf(point, rule);
  return valuesOf(point).map((value, at) => ({
    low: (value - from[at]! - bands[at]!) / seconds,
    high: (value - from[at]! + bands[at]!) / seconds,
  }));
}

const narrowed = (cones: readonly Cone[], others: readonly Cone[]): Cone[] =>
  cones.map(({ low, high }, at) => ({ low: Math.max(low, others[at]!.low), high: Math.min(high, others[at]!.high) }));

const valuesOf = ({ terminalVolts, amps, celsius, groupVolts }: StoredPoint): number[] =>
  [terminalVolts, amps, celsius, ...(groupVolts ?? [])].filter((value) => value !== null);

const bandsOf = (point: StoredPoint, rule: ThinningRule): number[] => [
  ...(point.terminalVolts === null ? [] : [rule.terminalVolts]),
  ...(point.amps === null ? [] : [rule.amps]),
  ...(point.celsius === null ? [] : [rule.celsius]),
  ...(point.groupVolts ?? []).map(() => rule.groupVolts),
];

const sameQuantities = (one: StoredPoint, other: StoredPoint): boolean =>
  (one.terminalVolts === null) === (other.terminalVolts === null) &&
  (one.amps === null) === (other.amps === null) &&
  (one.celsius === null) === (other.celsius === null) &&
  one.groupVolts?.length === other.groupVolts?.length;

function checkPoint(point: StoredPoint, before: StoredPoint | null): void {
  if (!Number.isFinite(point.s)) throw new CalcInputError('point.s', point.s, 'a number');
  const wrong = valuesOf(point).find((value) => !Number.isFinite(value));
  if (wrong !== undefined) throw new CalcInputError('point', wrong, 'numbers, or null where nothing was read');
  if (before !== null && point.s < before.s)
    throw new CalcInputError('point.s', point.s, `at or after ${before.s}, the reading before it`);
}
