import type { WorkshopDto } from '@/shared/contract/workshop';
import { useFormats } from '../format/formats';
import { EN_DASH, NBSP } from '../format/marks';
import { FactList } from '../primitives/fact-list';
import { typedNumber } from './numbers-typed';
import { dayWords, limitFields, technicianDecidesName, unattendedName, weekDays } from './settings-form';

/** The limits as they stand. */
export function LimitFacts({ workshop }: { workshop: WorkshopDto }) {
  const { marks } = useFormats();
  return (
    <FactList
      facts={[
        ...limitFields.map(({ key, name, unit, usual }) => ({
          name,
          value: `${key === 'toleranceMillivolts' ? '±' : ''}${typedNumber(workshop[key] ?? usual, 0, marks)}${NBSP}${unit}`,
        })),
        { name: technicianDecidesName, value: workshop.technicianDecides === true ? 'yes' : 'no' },
      ]}
    />
  );
}

/** Name, clock and working hours as they stand; days of the same hours in one line. */
export function HourFacts({ workshop }: { workshop: WorkshopDto }) {
  return (
    <FactList
      facts={[
        { name: 'Name', value: workshop.name },
        { name: 'Its clock', value: workshop.zone.replaceAll('_', ' ') },
        ...sameDays(workshop.workingHours).map(({ days, hours }) => ({ name: days, value: hours })),
        { name: unattendedName, value: workshop.unattendedCharges === true ? 'yes' : 'no' },
      ]}
    />
  );
}

/** Days in a row with the same hours: 'Monday–Friday', '08:00–17:00'. */
export function sameDays(hours: WorkshopDto['workingHours']): { days: string; hours: string }[] {
  const runs: { from: number; to: number; hours: string }[] = [];
  weekDays.forEach((_, day) => {
    const words = dayWords(hours[day]);
    const last = runs.at(-1);
    if (last && last.hours === words) last.to = day;
    else runs.push({ from: day, to: day, hours: words });
  });
  return runs.map(({ from, to, hours: words }) => ({
    days: from === to ? (weekDays[from] ?? '') : `${weekDays[from]}${EN_DASH}${weekDays[to]}`,
    hours: words,
  }));
}
