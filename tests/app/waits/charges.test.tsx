import { fireEvent, screen, waitFor } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import WaitCharges from '@/app/(workshop)/waits/charges';
import { draw, emptyDevice, press, problem } from '../charges/bench-of';
import { eight, now, page, rowOf, serverOf } from './waits-of';

const address = vi.hoisted(() => ({ params: {} as Record<string, string> }));
const router = vi.hoisted(() => ({ push: vi.fn(), replace: vi.fn(), back: vi.fn(), canGoBack: vi.fn(() => false) }));
vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => address.params,
  useRouter: () => router,
}));

beforeEach(() => {
  emptyDevice();
  vi.useFakeTimers({ now, toFake: ['Date'] });
  address.params = {};
});
afterEach(() => {
  vi.useRealTimers();
  vi.restoreAllMocks();
  vi.unstubAllGlobals();
});

describe('the charges behind a number', () => {
  it('are those of the week and the filters of the address, said in words, and open the charge that is pressed', async () => {
    address.params = { type: 't1', week: '2026-06-01' };
    const server = serverOf();
    server.answers[`GET /api/waits/charges?${eight}&moduleTypeId=t1&week=2026-06-01`] = () =>
      Response.json(page([rowOf('R-2411')]));
    draw(<WaitCharges />);
    expect(await screen.findByText(/^Ready in the week from Mon\s1\sJune\. Only 2-series 66 Ah\.$/)).toBeTruthy();
    const row = await screen.findByRole('row', { name: 'Open R-2411' });
    expect(row.textContent).toMatch(/R-24112-series 66 AhA1InesThrough the terminalsMon\s.*3:251:002:25\+4\sminyes/);
    fireEvent.click(row);
    expect(router.push).toHaveBeenCalledWith('/charges/charge-R-2411');
    // Came by a link of its own: there is no page to go back to.
    fireEvent.click(await press('Back to the waits'));
    expect(router.replace).toHaveBeenCalledWith('/waits?type=t1');
  });

  it('come page after page, and say when that is all of them', async () => {
    const server = serverOf();
    server.answers[`GET /api/waits/charges?${eight}`] = () => Response.json(page([rowOf('R-2411')], '17.x'));
    server.answers[`GET /api/waits/charges?${eight}&after=17.x`] = () => Response.json(page([rowOf('R-2408')]));
    draw(<WaitCharges />);
    fireEvent.click(await press('Show more'));
    await waitFor(() => expect(screen.getAllByRole('row', { name: /^Open/ })).toHaveLength(2));
    expect(screen.getByText('That is all 2.')).toBeTruthy();
    expect(screen.queryByRole('button', { name: 'Show more' })).toBeNull();
  });

  it('say that none stands behind it, and why they could not be read', async () => {
    const server = serverOf();
    server.answers[`GET /api/waits/charges?${eight}`] = () => Response.json(page([]));
    const { unmount } = draw(<WaitCharges />);
    expect(await screen.findByText('No charge stands behind this.')).toBeTruthy();
    unmount();
    emptyDevice();
    const again = serverOf();
    again.answers[`GET /api/waits/charges?${eight}`] = () => problem(500, 'The database does not answer.');
    draw(<WaitCharges />);
    expect(await screen.findByText('The charges could not be read.')).toBeTruthy();
  });

  it('are not for a technician', async () => {
    serverOf('technician');
    draw(<WaitCharges />);
    expect(await screen.findByText('Waiting statistics are read by a foreman or a manager.')).toBeTruthy();
  });
});
