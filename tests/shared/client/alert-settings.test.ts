import { expect, it } from 'vitest';
import { isHeardHere } from '@/shared/client/alert-settings';
import type { AlertDto } from '@/shared/contract/alert';
import type { AlertSettingsDto } from '@/shared/contract/alert-settings';

const settings = (more: Partial<AlertSettingsDto> = {}): AlertSettingsDto => ({
  ways: [
    { kind: 'charge-done', level: 'amber', ways: ['e-mail'] },
    { kind: 'charge-done', level: 'tell', ways: ['app'] },
    { kind: 'overdue', level: 'alarm', ways: ['app'] },
  ],
  quiet: { from: '22:00', to: '06:00' },
  alarmsBreakThrough: true,
  eMail: { address: 'petra@example.com', on: false },
  devices: [],
  ...more,
});
const alert = (kind: AlertDto['kind'], level: AlertDto['level']) => ({ kind, level }) as AlertDto;
// 14:00 and 23:00 in Berlin.
const day = Date.parse('2026-06-09T12:00:00Z');
const night = Date.parse('2026-06-09T21:00:00Z');
const heard = (one: AlertDto, at: number, more?: Partial<AlertSettingsDto>) =>
  isHeardHere(settings(more), one, 'Europe/Berlin', at);

it('the open page tells a cause at the level at which its person wants it there', () => {
  expect(heard(alert('charge-done', 'amber'), day)).toBe(false);
  expect(heard(alert('charge-done', 'tell'), day)).toBe(true);
});

it('a cause that the settings do not know yet is told', () => {
  expect(heard(alert('wall-unseen', 'tell'), day)).toBe(true);
});

it('in the quiet hours of the workshop’s clock it tells alarms alone, and not even those where its person says so', () => {
  expect(heard(alert('charge-done', 'tell'), night)).toBe(false);
  expect(heard(alert('overdue', 'alarm'), night)).toBe(true);
  expect(heard(alert('overdue', 'alarm'), night, { alarmsBreakThrough: false })).toBe(false);
  expect(heard(alert('charge-done', 'tell'), night, { quiet: null })).toBe(true);
});
