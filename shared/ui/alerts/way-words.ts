/** The ways of alerts and their levels in words. Pure. */
import type { AlertLevel } from '@/shared/contract/alert';
import { alertWays, type AlertWay } from '@/shared/contract/alert-settings';

export const wayNames: Record<AlertWay, string> = {
  app: 'Sound and notice of the open page',
  'browser-push': 'Push to your browsers',
  'phone-push': 'Push to your phones',
  'e-mail': 'E-mail',
};
const shortNames: Record<AlertWay, string> = {
  app: 'sound',
  'browser-push': 'browser',
  'phone-push': 'phone',
  'e-mail': 'e-mail',
};

export const levelTitles: Record<AlertLevel, string> = {
  alarm: 'Alarms',
  amber: 'Needs a hand',
  tell: 'Only tells',
};

/** 'Sound, browser, e-mail'; 'Nowhere' where there is no way. */
export function waysText(ways: readonly AlertWay[]): string {
  const names = alertWays.filter((way) => ways.includes(way)).map((way) => shortNames[way]);
  if (names.length === 0) return 'Nowhere';
  const text = names.join(', ');
  return text.charAt(0).toUpperCase() + text.slice(1);
}
