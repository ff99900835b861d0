/** What was understood of a log, in words. Pure. */
import type { LogPreviewDto } from '@/shared/contract/charge-log';
import type { LocaleMarks } from '../format/marks';
import { moment } from '../format/clock';
import { shortest } from '../format/number';
import { millivolts } from '../format/quantities';
import type { Fact } from '../primitives/fact-list';

const count = (value: number, one: string, many: string): string =>
  `${value.toLocaleString('en').replaceAll(',', '\u202f')} ${value === 1 ? one : many}`;

export function understoodFacts(
  preview: LogPreviewDto,
  { zone, now, marks }: { zone: string; now: number; marks: LocaleMarks },
): Fact[] {
  const at = (instant: string) => moment(Date.parse(instant), zone, now, marks);
  const { lines, readings, firstAt, lastAt, stored, there } = preview;
  return [
    { name: 'In the file', value: count(lines, 'line', 'lines') },
    { name: 'Understood', value: count(readings, 'reading', 'readings') },
    ...(firstAt && lastAt ? [{ name: 'First and last', value: `${at(firstAt)} – ${at(lastAt)}` }] : []),
    { name: 'To be kept', value: count(stored, 'reading', 'readings') },
    ...(there > 0 ? [{ name: 'Of these here already', value: count(there, 'reading', 'readings') }] : []),
  ];
}

/** Why fewer are kept than were understood. */
export function keptSentence({ readings, stored, within }: LogPreviewDto, marks: LocaleMarks): string | null {
  if (stored >= readings) return null;
  const bounds = [
    millivolts(within.terminalVolts),
    `${shortest(within.amps, 2, marks)}\u00a0A`,
    `${shortest(within.celsius, 1, marks)}\u00a0°C`,
  ];
  return `A reading is left out only where it lies within ${bounds.join(', ')} of the straight line between the kept ones, ${Math.round(within.mostS / 60)} minutes apart at most. One that stands out is kept.`;
}

/** '4, 5, 9 and 3 more'. */
export function lineNumbers({ lines, count: all }: LogPreviewDto['leftOut'][number]): string {
  const more = all - lines.length;
  return `${all === 1 ? 'line' : 'lines'} ${lines.join(', ')}${more > 0 ? ` and ${more} more` : ''}`;
}

/** What the button will do; null: there is nothing for it. */
export function addTitle(preview: LogPreviewDto | null): string | null {
  if (preview === null || preview.problem !== null) return null;
  const fresh = preview.stored - preview.there;
  return fresh === 0 ? null : `Add ${count(fresh, 'reading', 'readings')}`;
}
