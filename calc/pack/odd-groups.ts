import { ODD_FLOOR_VOLTS, ODD_LIMIT } from '../parameters/pack';
import { requirePositive } from '../require';
import { requireGroupVolts } from './group-volts';
import { robust } from './robust';

export interface OddGroupsOptions {
  /** Least sigma, V; default 3 mV: a tight pack accuses nobody for a few millivolts. */
  floorVolts?: number;
  /** Robust z-score beyond which a group is odd; default 3.5. */
  limit?: number;
}

/** A group and what it reads. */
export interface GroupVolts {
  /** 0-based. */
  group: number;
  volts: number;
}

export interface OddGroups {
  medianVolts: number;
  madVolts: number;
  /** 1.4826 · MAD, or the floor where that is more. */
  sigmaVolts: number;
  /** Highest minus lowest. */
  spreadVolts: number;
  /** The first of them where several are equal. */
  lowest: GroupVolts;
  highest: GroupVolts;
  /** (volts − median) / sigma of each group; below 0: low. */
  scores: number[];
  /** Indexes of the groups beyond the limit, rising. */
  odd: number[];
}

/**
 * The groups of a pack that do not belong to the rest: robust z-score (U − median) / max(1.4826·MAD, floor) beyond the limit.
 * Of one or two groups nobody can say which is odd, and none is.
 *
 * Source: B. Iglewicz, D. Hoaglin, How to Detect and Handle Outliers, ASQC (1993), limit 3.5.
 *
 * @param volts of each group at rest, V; 1 to 400
 * @throws CalcInputError for volts that cannot be, or a floor or limit that is not above 0
 * @example oddGroups([3.9, 3.9, 3.901, 3.78]).odd[0] === 3
 */
export function oddGroups(volts: readonly number[], options: OddGroupsOptions = {}): OddGroups {
  requireGroupVolts('volts', volts);
  const floor = requirePositive('floorVolts', options.floorVolts ?? ODD_FLOOR_VOLTS);
  const limit = requirePositive('limit', options.limit ?? ODD_LIMIT);
  const { median, mad, sigma } = robust(volts, floor);
  const scores = volts.map((value) => (value - median) / sigma);
  const at = (value: number): GroupVolts => ({ group: volts.indexOf(value), volts: value });
  const lowest = at(Math.min(...volts));
  const highest = at(Math.max(...volts));
  return {
    medianVolts: median,
    madVolts: mad,
    sigmaVolts: sigma,
    spreadVolts: highest.volts - lowest.volts,
    lowest,
    highest,
    scores,
    odd: volts.length < 3 ? [] : volts.map((_, group) => group).filter((group) => Math.abs(scores[group]!) > limit),
  };
}
