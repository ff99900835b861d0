import { isBeyondCurve, socAtVolts } from '../curve/ocv';
import { CalcInputError } from '../errors';
import { socOf } from '../plan/soc-of';
import { requireFinite, requireNotNegative, requirePositive } from '../require';
import type { OcvTable } from '../types';
import type { Figure } from './figure';

/** A module read at rest before and after a counted charge. */
export interface TwoReadings {
  curve: OcvTable;
  /** Rest voltage of each group, V. */
  beforeVolts: number[];
  afterVolts: number[];
  /** Counted at the terminals through each group, Ah; out of it: negative. One for all where it went through all. */
  countedAh: number | number[];
  /** Share of it that stays; applies to charging only. */
  coulombicEfficiency: number;
  /** One meter read both: its offset cancels but for the slopes. */
  sameMeter: boolean;
  spreads: {
    /** Offset of a meter, V. */
    meterVolts: number;
    /** Scatter of a single reading, and what a rest that was too short leaves, V. */
    readingVolts: number;
    /** Of the curve, at each of the two points on its own: a table errs in its shape, V. */
    curveVolts: number;
    /** Half width of the hysteresis loop; anywhere inside, at each of the two points, V. */
    hysteresisVolts: number;
    /** Of the ampere-hours counted, as a share. */
    countRelative: number;
  };
}

export interface GroupCapacity {
  group: number;
  /** Ah; null: nothing can be claimed, `reason` says why. */
  capacityAh: Figure | null;
  /** State of charge moved by the voltages, signed. */
  socMoved: number;
  reason: string | null;
}

export interface TwoReadingsCapacity {
  groups: GroupCapacity[];
  /** Of one group, from all that claim; the doubts they share do not average out. Null: none claims. */
  capacityAh: Figure | null;
}

/** Less than this moved says little of the whole. */
const LEAST_MOVED = 0.05;
/** A doubt beyond this share of what was moved is no measurement (and no longer normal). */
const MOST_DOUBT = 0.15;

/**
 * Capacity of each group from what was counted and what the rest voltages say was moved: Q = η·Ah / (z₂ − z₁), with its
 * standard deviation from the readings, the meter, the curve, the hysteresis and the count. On a flat part of the curve the
 * voltages say nothing of the charge, and nothing is claimed.
 *
 * @throws CalcInputError where counts differ or numbers cannot be
 */
export function capacityFromTwoReadings(input: TwoReadings): TwoReadingsCapacity {
  const { beforeVolts, afterVolts, spreads, coulombicEfficiency } = input;
  if (beforeVolts.length === 0 || afterVolts.length !== beforeVolts.length)
    throw new CalcInputError('afterVolts', afterVolts, `a list of ${beforeVolts.length}, one for each group`);
  const counted = beforeVolts.map((_, group) => {
    const ampHours = Array.isArray(input.countedAh) ? input.countedAh[group] : input.countedAh;
    return requireFinite(`countedAh[${group}]`, ampHours ?? Number.NaN);
  });
  requirePositive('coulombicEfficiency', coulombicEfficiency);
  for (const [name, value] of Object.entries(spreads)) requireNotNegative(`spreads.${name}`, value);

  const found = beforeVolts.map((before, group) => oneGroup(input, group, before, afterVolts[group]!, counted[group]!));
  const claims = found.filter((one): one is Claim => one.capacityAh !== null);
  return {
    groups: found.map(({ group, capacityAh, socMoved, reason }) => ({ group, capacityAh, socMoved, reason })),
    capacityAh: claims.length === 0 ? null : mean(claims),
  };
}

interface Claim extends GroupCapacity {
  capacityAh: Figure;
  /** Parts of the relative doubt: of this group's readings alone, and shared by all groups. */
  own: number;
  shared: number;
}

function oneGroup(
  input: TwoReadings,
  group: number,
  before: number,
  after: number,
  counted: number,
): Claim | (GroupCapacity & { capacityAh: null }) {
  const { curve, spreads } = input;
  requireFinite(`beforeVolts[${group}]`, before);
  requireFinite(`afterVolts[${group}]`, after);
  const none = (socMoved: number, reason: string) => ({ group, capacityAh: null, socMoved, reason });
  if (isBeyondCurve(curve, before) || isBeyondCurve(curve, after))
    return none(0, 'A reading lies beyond the ends of the curve.');
  const moved = socAtVolts(curve, after) - socAtVolts(curve, before);
  if (Math.abs(moved) < LEAST_MOVED)
    return none(
      moved,
      `The voltages moved by ${percent(moved)} of charge only. From ${percent(LEAST_MOVED)} on they say something.`,
    );
  if (counted * moved <= 0) return none(moved, 'Charge and voltages moved in opposite directions. Check the readings.');

  // Differences over one standard deviation to either side, not slopes: a curve bends within some millivolts.
  const shift = (volts: number, by: number): number => (socOf(curve, volts + by) - socOf(curve, volts - by)) / 2;
  const alone = Math.hypot(spreads.readingVolts, spreads.hysteresisVolts / Math.sqrt(3));
  const own = Math.hypot(shift(before, alone), shift(after, alone));
  const meterBefore = shift(before, spreads.meterVolts);
  const meterAfter = shift(after, spreads.meterVolts);
  const meter = input.sameMeter ? Math.abs(meterAfter - meterBefore) : Math.hypot(meterBefore, meterAfter);
  const curveDoubt = Math.hypot(shift(before, spreads.curveVolts), shift(after, spreads.curveVolts));
  const ownShare = own / Math.abs(moved);
  const sharedShare = Math.hypot(Math.hypot(meter, curveDoubt) / Math.abs(moved), spreads.countRelative);
  const doubt = Math.hypot(ownShare, sharedShare);
  if (doubt > MOST_DOUBT)
    return none(moved, `The curve is too flat here: the capacity would be known to ±${percent(doubt)} only.`);
  const stays = counted > 0 ? counted * input.coulombicEfficiency : counted;
  const capacity = stays / moved;
  return {
    group,
    capacityAh: { mean: capacity, sd: capacity * doubt },
    socMoved: moved,
    reason: null,
    own: ownShare * capacity,
    shared: sharedShare * capacity,
  };
}

/** Mean over the groups by what is their own, the shared doubt on top. */
function mean(claims: readonly Claim[]): Figure {
  const weights = claims.map(({ own, shared }) => 1 / (own * own + 1e-12 * shared * shared + 1e-18));
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  const over = (value: (claim: Claim) => number): number =>
    claims.reduce((sum, claim, at) => sum + weights[at]! * value(claim), 0) / total;
  return {
    mean: over(({ capacityAh }) => capacityAh.mean),
    sd: Math.hypot(
      Math.sqrt(1 / total),
      over(({ shared }) => shared),
    ),
  };
}

const percent = (share: number): string =>
  `${(Math.abs(share) * 100).toFixed(share < 0.1 && share > -0.1 ? 1 : 0)}\u00a0%`;
