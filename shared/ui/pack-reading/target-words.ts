/** What takes trust from a target, in words. Pure. */
import type { ComputedTargetDto, TrustReason } from '@/shared/contract/pack-reading';
import { pointMarks, type LocaleMarks } from '../format/marks';
import { fixed } from '../format/number';

export const trustWords: Record<ComputedTargetDto['trust'], string> = { good: 'good', fair: 'fair', poor: 'poor' };

export const trustReasons: Record<TrustReason, string> = {
  'flat-curve': 'The curve is flat at this voltage: a few millivolts are a lot of charge.',
  'old-reading': 'The reading is old. Read the pack again before the spare is charged to it.',
  'few-healthy': 'Few healthy groups stand behind it.',
  'wide-spread': 'The healthy groups are far apart.',
  'short-rest': 'The pack had rested too short a time when it was read.',
  'unknown-rest': 'Nobody noted how long the pack had rested.',
  'cold-or-warm': 'The pack was cold or warm when it was read.',
};

/** '±0.4 mV'; the standard error of the target. */
export const errorText = (millivolts: number, marks: LocaleMarks = pointMarks): string =>
  `±${fixed(millivolts, 1, marks)}\u00a0mV`;

/** '6.2 mV a percent of charge'; null: no curve is known. */
export const slopeText = (slope: number | null, marks: LocaleMarks = pointMarks): string =>
  slope === null ? 'not known, no module type' : `${fixed(slope, 1, marks)}\u00a0mV a percent of charge`;
