import { voltsAtSoc } from '../curve/ocv';
import { CalcInputError } from '../errors';
import { requirePositive } from '../require';
import { findRoot } from '../step/find-root';
import type { OcvTable } from '../types';

export interface SpareAgreementInput {
  /** Capacity of a group of the spare, and of a group of its neighbours, Ah. */
  spareAh: number;
  neighboursAh: number;
  /** State of charge at which both rest alike. */
  matchSoc: number;
  curve: OcvTable;
  /** Low charge: where the first of them is at this; default 0.1. */
  lowSoc?: number;
}

/** Rest voltage of the spare minus that of its neighbours, V. */
export interface Agreement {
  atFullVolts: number;
  atLowVolts: number;
}

export interface SpareAgreement extends Agreement {
  /** Where to match so that the larger of the two differences is least. */
  bestMatchSoc: number;
  /** The differences when matched there. */
  best: Agreement;
}

/**
 * How far a spare of other capacity drifts from its neighbours over the pack's use, after both were matched at one state of
 * charge. Both are in series, so the same ampere-hours ΔQ go through both: z = z_match + ΔQ/Q each. Full is where the first
 * of them is full, low where the first of them is at `lowSoc`: there the pack stops.
 *
 * Matched higher the difference at full gets less and that at low charge more, each steadily; the best match is where they
 * are as large as each other, found by `findRoot`. With equal capacities every match is as good, and yours stands.
 *
 * @throws CalcInputError for capacities not above 0, a match outside 0…1, a low charge outside 0…1
 */
export function spareAgreement(input: SpareAgreementInput): SpareAgreement {
  const spareAh = requirePositive('spareAh', input.spareAh);
  const neighboursAh = requirePositive('neighboursAh', input.neighboursAh);
  const matchSoc = requireShare('matchSoc', input.matchSoc);
  const lowSoc = requireShare('lowSoc', input.lowSoc ?? 0.1);
  const least = Math.min(spareAh, neighboursAh);

  const apart = (match: number, movedAh: number): number =>
    voltsAtSoc(input.curve, match + movedAh / spareAh) - voltsAtSoc(input.curve, match + movedAh / neighboursAh);
  // The smaller one moves faster: it is the first at either end. Matched below the low charge, that end is the match itself.
  const matchedAt = (match: number): Agreement => ({
    atFullVolts: apart(match, (1 - match) * least),
    atLowVolts: apart(match, Math.min(0, (lowSoc - match) * least)),
  });
  const excess = (match: number): number => {
    const { atFullVolts, atLowVolts } = matchedAt(match);
    return Math.abs(atFullVolts) - Math.abs(atLowVolts);
  };
  const bestMatchSoc =
    spareAh === neighboursAh ? matchSoc : findRoot(excess, lowSoc, excess(lowSoc), 1, excess(1), 1e-9);
  return { ...matchedAt(matchSoc), bestMatchSoc, best: matchedAt(bestMatchSoc) };
}

function requireShare(field: string, value: number): number {
  if (typeof value !== 'number' || !(value >= 0 && value <= 1))
    throw new CalcInputError(field, value, 'between 0 and 1');
  return value;
}
