import { act, fireEvent, waitFor } from '@testing-library/react';
import { router } from 'expo-router';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import Log from '@/app/(workshop)/charges/[id]/log';
import { charge } from '../../shared/ui/charge/charges';
import { pressFrom } from '../../support/press';
import { draw, emptyDevice, input, press, serverWith } from './bench-of';

vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => ({ id: 'c1' }),
}));

beforeEach(() => {
  emptyDevice();
  vi.mocked(router.back).mockClear();
});
afterEach(() => vi.unstubAllGlobals());

it('asks about an odd group after the press, never puts its question under the finger that logs', async () => {
  const runs = charge('charging');
  const server = serverWith(runs);
  server.answers['POST /api/charges/c1/readings'] = () => Response.json({ ...runs, rev: 2 });
  draw(<Log />);
  for (const [label, text] of Object.entries({ 'At the clips': '11.68', 'Group 1': '3.896', 'Group 2': '3.895' }))
    fireEvent.change(await input(label), { target: { value: text } });
  const third = await input('Group 3');
  act(() => third.focus());
  fireEvent.change(third, { target: { value: '3.849' } });
  const logIt = await press(/^(Log it|Keep it on this device)$/);
  const { click } = await pressFrom(third, () => logIt);
  expect(click).toMatch(/>(Log it|Keep it on this device)</);
  expect(click).not.toContain('Read group 3 again');
  await press('Read group 3 again');
  expect(server.writes()).toEqual([]);
  fireEvent.click(await press('It reads so: log it'));
  await waitFor(() => expect(router.back).toHaveBeenCalled());
  expect(server.writes()).toHaveLength(1);
});
