import { CalcInputError } from '../errors';
import { requireFinite, requireNotNegative, requirePositive } from '../require';
import type { Figure } from './figure';

/** Leave out what was not read. */
export interface ResistanceReadings {
  /** Under current, of one group or of the module between its clips, V. */
  voltsUnderCurrent: number;
  /** Rest voltage at the same charge, V: by the curve and the count, or where the rest settled. */
  restVolts: Figure;
  /** Read within a second or so after the current went off, V; null: not read. */
  firstRestVolts: number | null;
  /** Just before it went off; charge positive, A. */
  amps: number;
  /** How long it had flowed at about that strength, s. */
  flowedS: number;
  /** Of the over-voltage, s. */
  timeConstantS: number;
  /** Scatter of a single reading, V. A meter's offset that is in all of them cancels. */
  readingVolts: number;
  /** Of the current, as a share. */
  currentRelative: number;
}

export interface ResistanceFound {
  /** R0 + R1, ohm. */
  longOhm: Figure;
  /** R0, ohm; null without a reading straight after. */
  ohmicOhm: Figure | null;
}

/** Built up less than this, the long resistance would be mostly a guess of the time constant. */
const LEAST_BUILT_UP = 0.5;

/**
 * Resistance from a voltage under current and the rest voltage: (V − U)/I, and its part that goes at once from the first
 * reading of the rest. Where the current had flowed for less than some time constants, the over-voltage that had not built
 * up yet is added.
 *
 * @returns null where the current flowed too short for the whole to be told, or the difference has the wrong sign
 * @throws CalcInputError for numbers that cannot be
 */
export function resistanceFromReadings(input: ResistanceReadings): ResistanceFound | null {
  const { amps, restVolts, voltsUnderCurrent, firstRestVolts } = input;
  requireFinite('voltsUnderCurrent', voltsUnderCurrent);
  requireFinite('restVolts.mean', restVolts.mean);
  requireNotNegative('restVolts.sd', restVolts.sd);
  requirePositive('timeConstantS', input.timeConstantS);
  requireNotNegative('flowedS', input.flowedS);
  requireNotNegative('readingVolts', input.readingVolts);
  requireNotNegative('currentRelative', input.currentRelative);
  if (!Number.isFinite(amps) || amps === 0) throw new CalcInputError('amps', amps, 'a number other than 0');

  const builtUp = 1 - Math.exp(-input.flowedS / input.timeConstantS);
  const whole = (voltsUnderCurrent - restVolts.mean) / amps;
  if (builtUp < LEAST_BUILT_UP || !(whole > 0)) return null;
  const size = Math.abs(amps);
  const doubt = (ohm: number, volts: number): Figure => ({
    mean: ohm,
    sd: Math.hypot(volts / size, ohm * input.currentRelative),
  });
  const wholeSd = Math.hypot(input.readingVolts, restVolts.sd);
  if (firstRestVolts === null) return { longOhm: doubt(whole, wholeSd / builtUp), ohmicOhm: null };
  const ohmic = Math.max(0, (voltsUnderCurrent - requireFinite('firstRestVolts', firstRestVolts)) / amps);
  const ohmicSd = Math.SQRT2 * input.readingVolts;
  const long = ohmic + Math.max(0, whole - ohmic) / builtUp;
  return { longOhm: doubt(long, wholeSd / builtUp), ohmicOhm: doubt(ohmic, ohmicSd) };
}
