import { expect, it } from 'vitest';
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
