import { requireFinite, requirePositive } from '../require';

/** A number with its doubt: one standard deviation in the same unit. */
export interface Figure {
  mean: number;
  sd: number;
}

export interface CombinedFigure extends Figure {
  /** How far the two were apart, in standard deviations of their difference. */
  apart: number;
  /** Not farther than three: one of them is not simply wrong. Where they disagree a person should look, not an average. */
  agree: boolean;
}

const APART_MOST = 3;

/**
 * Two independent figures of one thing, each weighed by the inverse of its variance.
 *
 * @throws CalcInputError for a standard deviation of 0 or less
 * @example combineFigures({ mean: 66, sd: 4 }, { mean: 60, sd: 3 }).sd === 2.4
 */
export function combineFigures(earlier: Figure, found: Figure): CombinedFigure {
  requireFinite('earlier.mean', earlier.mean);
  requireFinite('found.mean', found.mean);
  const one = requirePositive('earlier.sd', earlier.sd) ** 2;
  const other = requirePositive('found.sd', found.sd) ** 2;
  const apart = Math.abs(found.mean - earlier.mean) / Math.sqrt(one + other);
  return {
    mean: (earlier.mean * other + found.mean * one) / (one + other),
    sd: Math.sqrt((one * other) / (one + other)),
    apart,
    agree: apart <= APART_MOST,
  };
}
