/**
 * Numbers as the sentences of the planner carry them (look: cells with three decimals, differences in whole millivolts,
 * charge with one decimal). A no-break space stands between number and unit.
 */
const GAP = '\u00a0';

/** '3.968 V'. */
export const voltsText = (volts: number): string => `${minus(volts.toFixed(3))}${GAP}V`;

/** '4.20 V': limits and whole modules. */
export const limitText = (volts: number): string => `${minus(volts.toFixed(2))}${GAP}V`;

/** '7 mV' out of volts, without a sign. */
export const millivoltsText = (volts: number): string => `${Math.round(Math.abs(volts) * 1000)}${GAP}mV`;

/** '20 A', '2.5 A', '0.40 A'. */
export const ampsText = (amps: number): string => {
  const size = Math.abs(amps);
  const digits = size >= 10 ? Math.round(size).toString() : trimmed(size < 1 ? size.toFixed(2) : size.toFixed(1));
  return `${digits}${GAP}A`;
};

/** '29.7 Ah'. */
export const ampHoursText = (ampHours: number): string => `${Math.abs(ampHours).toFixed(1)}${GAP}Ah`;

/** '21 °C'. */
export const celsiusText = (celsius: number): string => `${minus(Math.round(celsius).toString())}${GAP}°C`;

/** 'G2' of the 0-based group. */
export const groupText = (group: number): string => `G${group + 1}`;

/** 'G1', 'G1 and G3', 'G1, G3 and G4', 'G1, G3 and 6 more'. */
export function groupsText(groups: readonly number[]): string {
  const names = groups.map(groupText);
  if (names.length <= 1) return names.join('');
  if (names.length > 4) return `${names.slice(0, 2).join(', ')} and ${names.length - 2} more`;
  return `${names.slice(0, -1).join(', ')} and ${names[names.length - 1]}`;
}

/** '55 min', '3 h 40', 'about 2½ days'. */
export function durationText(seconds: number): string {
  const minutes = Math.round(seconds / 60);
  if (minutes < 60) return `${minutes}${GAP}min`;
  const rounded = Math.round(minutes / 5) * 5;
  if (rounded < 24 * 60) return `${Math.floor(rounded / 60)}${GAP}h${GAP}${String(rounded % 60).padStart(2, '0')}`;
  const halfDays = Math.round(rounded / 720);
  const whole = Math.floor(halfDays / 2);
  const half = halfDays % 2 === 1 ? '½' : '';
  return `about ${whole}${half}${GAP}${whole === 1 && half === '' ? 'day' : 'days'}`;
}

/** '12 days', '1 day'. */
export const daysText = (seconds: number): string => {
  const days = Math.max(1, Math.round(seconds / 86_400));
  return `${days} ${days === 1 ? 'day' : 'days'}`;
};

const minus = (digits: string): string => digits.replace(/^-/, '−');
const trimmed = (digits: string): string => (digits.endsWith('.0') ? digits.slice(0, -2) : digits);
