import { expect, it } from 'vitest';
import { demoBreaks } from '@/server/demo/crew';
import { demoHours, demoZone } from '@/server/demo/hours';

it('puts a machine without a place beside the harbour, and opens its day around the seeding', () => {
  expect(demoZone('UTC')).toBe('Europe/Amsterdam');
  expect(demoZone('America/Toronto')).toBe('America/Toronto');
  const night = Date.parse('2026-06-10T01:00:00Z');
  expect(demoHours(night, 'Europe/Amsterdam')[2]).toEqual({ from: '00:00', to: '18:00' });
  expect(demoHours(Date.parse('2026-06-07T20:00:00Z'), 'Europe/Amsterdam')[6]).toEqual({
    from: '16:00',
    to: '23:59',
  });
});

it('moves a break that would be at the moment of the seeding, and no other', () => {
  const at = (clock: string) => demoBreaks(Date.parse(`2026-06-09T${clock}:00+02:00`), 'Europe/Amsterdam');
  expect(at('15:00')).toEqual([
    { from: '09:45', to: '10:00' },
    { from: '12:30', to: '13:00' },
  ]);
  expect(at('12:42')).toEqual([
    { from: '09:45', to: '10:00' },
    { from: '13:55', to: '14:25' },
  ]);
  expect(at('09:00')[0]).toEqual({ from: '10:15', to: '10:30' });
});
