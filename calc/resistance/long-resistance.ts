import { CalcInputError } from '../errors';
import type { ResistanceKind } from '../plan-types';
import { requireNotNegative } from '../require';

/**
 * Long resistance ÷ typed resistance. The first two from a 33 Ah LMO-blend cell at 25 °C, mid-range: 1.57 mΩ after
 * 0.5 s and 2.03 mΩ after 10 s against 3.7 to 5 mΩ for the whole polarisation of a rest after C/3 (batterysim,
 * equiv-circ-model). That a 1 kHz reading stands near the 0.5 s one is a guess.
 */
const FACTOR: Record<ResistanceKind, number> = { long: 1, 'pulse-10s': 2.1, 'pulse-0.5s': 2.7, 'ac-1khz': 2.7 };

/**
 * The resistance that decides charges of hours, R0 + R1, from the one a person has typed, ohm.
 *
 * @throws CalcInputError for an unknown kind or a resistance below 0
 * @example longResistance('pulse-10s', 0.5) === 1.05
 */
export function longResistance(kind: ResistanceKind, ohm: number): number {
  const factor = FACTOR[kind];
  if (factor === undefined)
    throw new CalcInputError('resistanceKind', kind, `one of ${Object.keys(FACTOR).join(', ')}`);
  return factor * requireNotNegative('resistanceOhm', ohm);
}

/**
 * Shares of the long resistance: R0 acts at once, R1 builds up. R0 is taken as what a 0.5 s pulse sees, 1/2.7 of the
 * long one (source as above).
 *
 * @example splitLongResistance(0.0027).ohmicResistanceOhm === 0.001
 */
export function splitLongResistance(longOhm: number): {
  ohmicResistanceOhm: number;
  polarisationResistanceOhm: number;
} {
  requireNotNegative('longOhm', longOhm);
  const ohmicResistanceOhm = longOhm / FACTOR['pulse-0.5s'];
  return { ohmicResistanceOhm, polarisationResistanceOhm: longOhm - ohmicResistanceOhm };
}
