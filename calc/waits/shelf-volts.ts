import { CalcInputError } from '../errors';

export interface ShelfInput {
  /** Recorded target volts of a group. */
  targetVolts: readonly number[];
  /** Minutes from a shelf voltage to a target with the present chargers. */
  minutesBetween: (fromVolts: number, toVolts: number) => number;
  /** Storage window of the chemistry, volts of a group. */
  window: { lowVolts: number; highVolts: number };
  /** Volts of the modules on the shelf. */
  stockVolts: readonly number[];
  stepVolts?: number;
}

export interface ShelfVoltage {
  curve: { shelfVolts: number; meanMinutes: number }[];
  best: { shelfVolts: number; meanMinutes: number };
  /** What bringing the present stock to the best takes of chargers, h. */
  stockChargerHours: number;
  /** Recorded targets the curve stands on. */
  count: number;
}

/**
 * Expected wait over the recorded targets against the shelf voltage, on a grid over the chemistry's storage window.
 * With constant currents a and b it is least at the b/(a+b) quantile of the targets in ampere-hours.
 *
 * @throws CalcInputError for no targets, or a window or a step that is none
 */
export function shelfVolts(input: ShelfInput): ShelfVoltage {
  const { targetVolts, minutesBetween, stockVolts, window, stepVolts = 0.005 } = input;
  if (targetVolts.length === 0) throw new CalcInputError('targetVolts', [], 'a list of one or more');
  if (!(window.highVolts > window.lowVolts))
    throw new CalcInputError('window.highVolts', window.highVolts, `above ${window.lowVolts} V`);
  if (!(stepVolts >= 0.0001)) throw new CalcInputError('stepVolts', stepVolts, '0.0001 V or more');
  const steps = Math.max(1, Math.round((window.highVolts - window.lowVolts) / stepVolts));
  const curve = Array.from({ length: steps + 1 }, (_, at) => {
    const shelf = window.lowVolts + ((window.highVolts - window.lowVolts) * at) / steps;
    const sum = targetVolts.reduce((all, target) => all + minutesBetween(shelf, target), 0);
    return { shelfVolts: shelf, meanMinutes: sum / targetVolts.length };
  });
  const best = curve.reduce((least, one) => (one.meanMinutes < least.meanMinutes ? one : least));
  const stock = stockVolts.reduce((all, from) => all + minutesBetween(from, best.shelfVolts), 0);
  return { curve, best, stockChargerHours: stock / 60, count: targetVolts.length };
}
