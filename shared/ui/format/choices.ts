import { dayName } from './clock';
import { parseTimeOfDay, timeOfDayText } from './parse';
import { addDays } from './zone';

/** Every quarter hour of a day, as they are offered. */
export const quarterHours: readonly string[] = Array.from({ length: 96 }, (_, i) => timeOfDayText(i * 15));

/** The quarter hour nearest to what stands in a field; noon where nothing that is a time stands there. */
export const nearestQuarter = (text: string): string =>
  timeOfDayText((Math.round((parseTimeOfDay(text) ?? 720) / 15) * 15) % 1440);

/** The days around today, counted from it (negative for the past), each with its name. */
export function dayOptions(today: string, from: number, to: number): { value: string; label: string }[] {
  return Array.from({ length: to - from + 1 }, (_, i) => {
    const day = addDays(today, from + i);
    return { value: day, label: dayName(day, today) };
  });
}
