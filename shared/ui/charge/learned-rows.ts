/** What the readings of a charge have taught, in words. Pure. */
import type { Learned } from '@/calc/live-types';
import { EN_DASH, type LocaleMarks } from '../format/marks';
import { fixed } from '../format/number';

export interface LearnedFigures {
  /** Mean of the groups, Ah. */
  capacityAh: Learned | null;
  /** R0 + R1, mean of the groups, ohm. */
  longOhm: Learned | null;
  /** Of the charger that ran last, ohm. */
  leadOhm: Learned | null;
}

/** Half of the 10–90 % band of a normal spread, in standard deviations (tables of the normal distribution: 1.2816). */
const BAND_SD = 1.2816;

interface Row {
  name: string;
  now: string;
  before: string;
}

/** '60.4 (59.5–61.3)' of a mean with its standard deviation; nothing here is below nought. */
const banded = (mean: number, sd: number, times: number, decimals: number, marks: LocaleMarks): string => {
  const text = (value: number) => fixed(Math.max(0, value) * times, decimals, marks);
  return `${text(mean)} (${text(mean - BAND_SD * sd)}${EN_DASH}${text(mean + BAND_SD * sd)})`;
};

/** What the readings of this charge have taught, in words; empty: nothing yet. */
export function learnedRows({ capacityAh, longOhm, leadOhm }: LearnedFigures, marks: LocaleMarks): Row[] {
  const row = (name: string, figure: Learned | null, times: number, decimals: number): Row[] =>
    figure === null
      ? []
      : [
          {
            name,
            now: banded(figure.mean, figure.sd, times, decimals, marks),
            before: banded(figure.priorMean, figure.priorSd, times, decimals, marks),
          },
        ];
  return [
    ...row('Capacity of a group, Ah', capacityAh, 1, 1),
    ...row('Resistance of a group, mΩ', longOhm, 1000, 2),
    ...row('Leads, mΩ', leadOhm, 1000, 1),
  ];
}
