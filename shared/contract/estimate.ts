import * as z from 'zod/mini';
import type { Band, Caution, Direction, Doubt, Refusal, Segment, TracePlanPoint } from './plan';
import { chemistryIds } from './equipment';
import { groupVolts, optionalQuantity, quantity } from './quantity';

/** The quick estimate: six numbers, and four that may be left empty. */
export const estimateSchema = z.object({
  chemistry: z.enum(chemistryIds),
  groups: quantity({ name: 'Groups in series', unit: '', min: 1, max: 24, whole: true }),
  ratedAh: quantity({ name: 'Capacity', unit: 'Ah', min: 0, aboveMin: true, max: 1000 }),
  healthPercent: quantity({ name: 'Health', unit: '%', min: 5, max: 120 }),
  spareVolts: groupVolts,
  targetVolts: groupVolts,
  amps: quantity({ name: 'Current', unit: 'A', min: 0, aboveMin: true, max: 2000 }),
  maxVolts: optionalQuantity({ name: 'Charger voltage', unit: 'V', min: 0, aboveMin: true, max: 1000 }),
  maxWatts: optionalQuantity({ name: 'Power', unit: 'W', min: 0, aboveMin: true, max: 100000 }),
  resistanceMilliohm: optionalQuantity({ name: 'Resistance', unit: 'mΩ', min: 0, aboveMin: true, max: 1000 }),
  celsius: optionalQuantity({ name: 'Temperature', unit: '°C', min: -20, max: 60 }),
});
export type EstimateInput = z.infer<typeof estimateSchema>;

export interface EstimateDto {
  direction: Direction;
  /** Null where the numbers rule the charge out. */
  overAndSettle: EstimateWayDto | null;
  onTheMark: EstimateWayDto | null;
  refusals: Refusal[];
  cautions: Caution[];
  ruledOut: string[];
}

export interface EstimateWayDto {
  totalS: Band;
  segments: Segment[];
  trace: TracePlanPoint[];
  ampHours: number;
  setVolts: number | null;
  endGroupVolts: number[];
  dominant: Doubt;
  narrowsByS: number;
}
