import type { CellGroup, Source, StepInput, StepStop } from '@/calc/index';

export const OPEN_STOP: StepStop = { relaxedVolts: null, toleranceVolts: 0, cutoffAmps: null, groupVolts: null };

export const NO_LIMIT: Source = {
  maxAmps: null,
  setVolts: null,
  maxWatts: null,
  leadResistanceOhm: 0,
  heldGroupVolts: null,
  loadOhm: null,
};

/** A group of the worked cases' LMO-blend module: 66 Ah, 0.8 mΩ at once and 1.2 mΩ with 300 s. */
export const lmoGroup = (restVolts: number, more: Partial<CellGroup> = {}): CellGroup => ({
  capacityAh: 66,
  ohmicResistanceOhm: 0.0008,
  polarisationResistanceOhm: 0.0012,
  polarisationTimeConstantS: 300,
  restVolts,
  ...more,
});

/** A charge without links and losses, settled within 2 mV a group, of what is given. */
export const stepOf = (
  groups: CellGroup[],
  curve: StepInput['curve'],
  source: Partial<Source>,
  stop: Partial<StepStop>,
  more: Partial<StepInput> = {},
): StepInput => ({
  groups,
  curve,
  linkResistanceOhm: 0,
  coulombicEfficiency: 1,
  direction: 'charge',
  source: { ...NO_LIMIT, ...source },
  stop: { ...OPEN_STOP, ...stop },
  settledVolts: 0.002 * groups.length,
  ...more,
});
