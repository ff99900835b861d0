/** Numbers and names as the sentences of charges, events and alerts carry them (look: §7, §8). */
import { DateTime } from 'luxon';

const GAP = '\u00a0';
const minus = (digits: string): string => digits.replace(/^-/, '−');

/** '13:42', another day 'Wed 10:00'; in the workshop's zone. */
export function clockText(at: number, zone: string, now: number): string {
  const time = DateTime.fromMillis(at, { zone, locale: 'en' });
  const today = time.hasSame(DateTime.fromMillis(now, { zone }), 'day');
  return time.toFormat(today ? 'HH:mm' : 'ccc HH:mm');
}

/** '55 min', '3 h 40', 'about 2½ days'; rounded to 5 min over an hour. */
export function durationText(seconds: number): string {
  const minutes = Math.max(0, Math.round(seconds / 60));
  if (minutes < 60) return `${minutes}${GAP}min`;
  const rounded = Math.round(minutes / 5) * 5;
  if (rounded < 24 * 60) return `${Math.floor(rounded / 60)}${GAP}h${GAP}${String(rounded % 60).padStart(2, '0')}`;
  const halfDays = Math.round(rounded / 720);
  const half = halfDays % 2 === 1 ? '½' : '';
  return `about ${Math.floor(halfDays / 2)}${half}${GAP}${halfDays === 2 ? 'day' : 'days'}`;
}

/** '3.968 V' of a cell group. */
export const cellText = (volts: number): string => `${minus(volts.toFixed(3))}${GAP}V`;
/** '11.64 V' at the clips. */
export const clipText = (volts: number): string => `${minus(volts.toFixed(2))}${GAP}V`;
/** What a charger is set to, never rounded to the unsafe side: down while charging, up while discharging. */
export function setVoltsText(volts: number, direction: 'charge' | 'discharge'): string {
  const hundredths = direction === 'charge' ? Math.floor(volts * 100 + 1e-6) : Math.ceil(volts * 100 - 1e-6);
  return clipText(hundredths / 100);
}
/** '10.0 A'. */
export const ampsText = (amps: number): string => `${minus(amps.toFixed(1))}${GAP}A`;
/** '20 A' as a charger is named or set. */
export const plainAmpsText = (amps: number): string => `${minus(String(Math.round(amps * 10) / 10))}${GAP}A`;
/** '29.7 Ah'. */
export const ampHoursText = (ampHours: number): string => `${minus(ampHours.toFixed(1))}${GAP}Ah`;
/** '21 °C'. */
export const celsiusText = (celsius: number): string => `${minus(String(Math.round(celsius)))}${GAP}°C`;
/** '7 mV' out of volts, without a sign. */
export const millivoltsText = (volts: number): string => `${Math.round(Math.abs(volts) * 1000)}${GAP}mV`;
/** 'group 2', 'groups 1 and 2', 'groups 1 to 6' out of 0-based indexes. */
export function groupsText(groups: readonly number[]): string {
  const names = groups.map((group) => String(group + 1));
  if (names.length <= 1) return `group ${names.join('')}`;
  const inRow = groups.every((group, index) => group === groups[0]! + index);
  if (inRow && names.length > 2) return `groups ${names[0]} to ${names.at(-1)}`;
  return `groups ${names.slice(0, -1).join(', ')} and ${names.at(-1)}`;
}
/** 'A1', 'A1 and A2', 'A1, A2 and B1'. */
export const listText = (names: readonly string[]): string =>
  names.length <= 1 ? names.join('') : `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`;
/** 'Ready by' → 'ready by': to go on within a sentence. */
export const lowerFirst = (text: string): string => text.charAt(0).toLowerCase() + text.slice(1);
export const upperFirst = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);
/** A reason as the end of a sentence: without its own stop. */
export const bare = (text: string): string => text.trim().replace(/[.\s]+$/, '');

/** The repair where there is one, else the charge's number. */
export const titleOf = (charge: { repairRef: string | null; number: string }): string =>
  charge.repairRef ?? charge.number;
