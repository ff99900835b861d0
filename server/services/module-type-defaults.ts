import type { ModuleType } from '../entities/module-type';

/** What may be left out of a module type, as a new one has it. */
export const nothingMore = {
  curveId: null,
  ownCurve: null,
  pulseShortS: null,
  pulseShortMilliohm: null,
  pulseLongerS: null,
  pulseLongerMilliohm: null,
  coldCurrentPercent: null,
  warmCurrentPercent: null,
  prechargeBelowVolts: null,
} as const satisfies Partial<ModuleType>;
