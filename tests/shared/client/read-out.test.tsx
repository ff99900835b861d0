import { act, render, screen } from '@testing-library/react';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import { alertsQuery } from '@/shared/client/alerts';
import { ClientProvider } from '@/shared/client/client-provider';
import { serverClock } from '@/shared/client/clock';
import { queryClient } from '@/shared/client/query-client';
import { useReadOut } from '@/shared/client/read-out';
import type { AlertDto } from '@/shared/contract/alert';
import { AlertRegion } from '@/shared/ui/primitives/live-region';
import { fakeServer } from '../../app/workshop/server';

// 23:00 on the clock of the workshop, which keeps UTC.
const start = Date.parse('2026-06-09T23:00:00Z');
const alert = (id: string, kind: AlertDto['kind'], level: AlertDto['level']): AlertDto => ({
  ...{ id, kind, level, chargeId: 'c1', title: `R-${id}`, for: null, forRole: null, turn: 0 },
  ...{ seen: 'It stands.', checkFirst: 'The clips.', raisedAt: new Date(start).toISOString(), lateByS: 0 },
  ...{ takenBy: null, takenAt: null, passedAt: null, clearedAt: null },
});

const Region = () => {
  const words = useReadOut();
  return words ? <AlertRegion alerts={words} /> : null;
};
const pass = (ms: number) => act(() => vi.advanceTimersByTimeAsync(ms));
const heard = () => screen.getByRole('alert').textContent;

/** A page that knew of no alert, until these came. */
async function comes(settings: object, ...alerts: AlertDto[]): Promise<void> {
  const server = fakeServer('technician');
  server.answers['GET /api/alerts'] = () => Response.json([]);
  server.answers['GET /api/me/alert-settings'] = () =>
    Response.json({ ways: [], quiet: null, alarmsBreakThrough: true, ...settings });
  render(<Region />, { wrapper: ClientProvider });
  await pass(100);
  act(() => void queryClient.setQueryData(alertsQuery().queryKey, alerts));
  await pass(100);
}

beforeEach(() => {
  vi.useFakeTimers();
  vi.setSystemTime(start);
  serverClock.correct(0);
  queryClient.clear();
});
afterEach(() => {
  vi.useRealTimers();
  vi.unstubAllGlobals();
});

it('each new alert is read out with what to check first', async () => {
  await comes({}, alert('1', 'check-due', 'amber'));
  expect(heard()).toBe('R-1 It stands. The clips.');
});

it('one whose cause is not wanted by this page is not read out beside one that is', async () => {
  const ways = [{ kind: 'check-due', level: 'amber', ways: ['e-mail'] }];
  await comes({ ways }, alert('1', 'check-due', 'amber'), alert('2', 'overdue', 'alarm'));
  expect(heard()).toBe('R-2 It stands. The clips.');
});

it('in quiet hours an alarm alone is read out, the other with their end', async () => {
  const quiet = { from: '22:00', to: '23:20' };
  await comes({ quiet }, alert('1', 'check-due', 'amber'), alert('2', 'overdue', 'alarm'));
  expect(heard()).toBe('R-2 It stands. The clips.');
  await pass(21 * 60_000);
  expect(heard()).toBe('R-1 It stands. The clips.');
});
