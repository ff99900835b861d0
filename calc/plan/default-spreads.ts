/**
 * How far each number may be off where nobody has said so: one standard deviation per source.
 *
 * The shares come from worked error budgets (5 % capacity, 3 mV a reading, 1 % current, 20 %
 * resistance give the 5 to 95 % band the tests compare with); the split by source is common practice: what was
 * measured here is trusted twice as far as a label, a guess half as far as a label.
 */
import type { ModuleParameters, NumberSource, ResistanceKind } from '../plan-types';

export const CAPACITY_RELATIVE_SD: Record<NumberSource, number> = { measured: 0.03, label: 0.06, guessed: 0.12 };

/** A typed resistance is as good as its way to the long one; nothing typed is the chemistry's guess. */
export const RESISTANCE_RELATIVE_SD: Record<ResistanceKind | 'guessed', number> = {
  long: 0.1,
  'pulse-10s': 0.2,
  'pulse-0.5s': 0.25,
  'ac-1khz': 0.35,
  guessed: 0.4,
};

export const DEFAULT_SPREADS = {
  currentRelative: 0.01,
  /** Hand meter on its 6 V range, common practice. */
  meterVolts: 0.002,
  readingVolts: 0.001,
  targetVolts: 0.001,
  /** A pack's own counter, or a person's word for it: a guess. */
  targetSoc: 0.02,
  /** A charger whose voltmeter was never compared with the workshop's. */
  chargerVolts: 0.005,
  /**
   * The whole curve, one offset a module. A worked budget for one make of cell has 4 mV on the table; a published table also
   * stands for cells of another maker and another age, for which a guess of the trade is some 6 mV: √(4² + 6²) mV.
   */
  curveVolts: 0.007,
  temperatureCelsius: 2,
  /** Module temperature taken for the room's. */
  temperatureUnreadCelsius: 4,
  selfDischargeRelative: 0.5,
} as const;

/** Spread of the module's resistance, as a share, by what was typed. */
export const resistanceRelativeSd = (module: ModuleParameters): number =>
  RESISTANCE_RELATIVE_SD[module.resistanceOhm === null ? 'guessed' : module.resistanceKind];
