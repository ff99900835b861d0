import type { LabelForms } from '@/shared/contract/label-words';
import { clock, date } from '../format/clock';
import type { LocaleMarks } from '../format/marks';
import { tolerance, volts, voltsNumber } from '../format/quantities';

/** Numbers and times of a label as this device writes them. */
export const labelForms = (zone: string, marks: LocaleMarks): LabelForms => ({
  voltsNumber: (value) => voltsNumber(value, marks),
  volts: (value) => volts(value, marks),
  tolerance,
  date: (at) => date(at, zone, at),
  clock: (at) => clock(at, zone, marks),
});
