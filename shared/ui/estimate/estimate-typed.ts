/** What is typed into the quick estimate. No schema here: the first paint does not need it. */

export interface EstimateTyped {
  chemistry: string;
  spareVolts: string;
  targetVolts: string;
  ratedAh: string;
  healthPercent: string;
  groups: string;
  amps: string;
  celsius: string;
  maxVolts: string;
  maxWatts: string;
  resistanceMilliohm: string;
}

export type EstimateField = keyof EstimateTyped;

/** Health of a used module nobody has measured: the guess that plans begin with too. */
const usualHealth = '92';

export const emptyEstimate: EstimateTyped = {
  chemistry: 'nmc',
  spareVolts: '',
  targetVolts: '',
  ratedAh: '',
  healthPercent: usualHealth,
  groups: '',
  amps: '',
  celsius: '',
  maxVolts: '',
  maxWatts: '',
  resistanceMilliohm: '',
};

/** Fields without which there is no time. */
export const neededFields = ['spareVolts', 'targetVolts', 'ratedAh', 'healthPercent', 'groups', 'amps'] as const;

/** Nothing was typed over what stands there at first. */
export const isUntouched = (typed: EstimateTyped): boolean =>
  (Object.keys(emptyEstimate) as EstimateField[]).every((field) => typed[field] === emptyEstimate[field]);
