import { NBSP } from '../format/marks';
import { fixed } from '../format/number';

/** Under so many charges a middle value says little, and is not shown. */
export const fewCharges = 5;
export const fewWords = `fewer than ${fewCharges} charges`;

/** '1 charge', '236 charges' */
export const chargesWord = (count: number): string => `${count} ${count === 1 ? 'charge' : 'charges'}`;

/** '+4 min', '−12 min', over two hours '+2 h 05': later or sooner than planned. */
export function againstPlan(seconds: number): string {
  const minutes = Math.round(seconds / 60);
  const sign = minutes > 0 ? '+' : minutes < 0 ? '−' : '';
  const size = Math.abs(minutes);
  if (size <= 120) return `${sign}${size}${NBSP}min`;
  return `${sign}${Math.floor(size / 60)}${NBSP}h${NBSP}${String(size % 60).padStart(2, '0')}`;
}

/** '49 h', under ten '4.2 h': hours of waiting. */
export const hoursWord = (hours: number): string => `${fixed(hours, hours < 9.95 ? 1 : 0)}${NBSP}h`;

/** Share of the waiting in which other work was done; null: nobody waited within working hours. */
export const usedShare = ({ usedHours, lostHours }: { usedHours: number; lostHours: number }): number | null =>
  usedHours + lostHours > 0 ? usedHours / (usedHours + lostHours) : null;
