import { fireEvent, screen, within } from '@testing-library/react';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import Prove from '@/app/(workshop)/repairs/[id]/prove';
import { draw, emptyDevice, press } from '../charges/bench-of';
import { fakeServer } from '../workshop/server';
import { reading, repairOf } from './read-repair-of';

const gone = vi.fn();
vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => ({ id: 'r1' }),
  useRouter: () => ({ canGoBack: () => false, replace: vi.fn(), push: gone, back: vi.fn() }),
}));

const readings = [
  reading({ id: 'c', stage: 'after-balance', balanceCount: 1, spreadMillivolts: 28, at: '2026-06-11T09:00:00.000Z' }),
  reading({ id: 'b', stage: 'after-fit', spreadMillivolts: 40, at: '2026-06-10T09:00:00.000Z' }),
  reading({ id: 'a', spreadMillivolts: 120 }),
];
let server: ReturnType<typeof fakeServer>;
beforeEach(() => {
  emptyDevice();
  server = fakeServer('technician');
});
afterEach(() => vi.unstubAllGlobals());
const begin = (more: Parameters<typeof repairOf>[0]) => {
  server.answers['GET /api/repairs/r1'] = () => Response.json(repairOf({ readings, ...more }));
  draw(<Prove />);
};

it('shows 28, 40 and 120 mV, the latest first, 2 (1–4) charges to come with their bands, and a fit that is worse than 20–30 mV', async () => {
  begin({
    expectedAfterFit: { low: 20, likely: 25, high: 30 },
    forecast: {
      ...{ aimMillivolts: 10, charges: { p10: 1, p50: 2, p90: 4 }, from: 'both', doesNotConverge: null },
      hoursPerCharge: 10,
      expectedMillivolts: [19, 11, 6, 3].map((p50) => ({ p10: p50 - 3, p50, p90: p50 + 4 })),
    },
  });
  expect(await screen.findByText('2 (1–4)')).toBeTruthy();
  const rows = within(screen.getByRole('list', { name: 'Spread of each reading' })).getAllByText(/^\d+.mV$/);
  expect(rows.map(({ textContent }) => parseInt(textContent ?? '', 10))).toEqual([28, 40, 120]);
  const items = within(screen.getByRole('list', { name: 'Spread of each reading' })).getAllByRole('listitem');
  // What is expected stands above what was read, with its band: after balance charge 1 come 2 to 5.
  expect(items).toHaveLength(7);
  expect(items[3]!.textContent).toMatch(/^Balance charge 2expected19.mV \(16–23\)$/);
  expect(screen.getByText(/^By the usual bleed current and what the last ones took off, each with 10.h /)).toBeTruthy();
  // A balance charge was read since: the lid is on, and its module is out of reach.
  expect(screen.getByText(/^Worse than forecast: 40.mV after the fit, 20–30.mV expected\.$/)).toBeTruthy();
  fireEvent.click(await press('Read the pack again'));
  expect(gone).toHaveBeenCalledWith('/repairs/r1/reading');
});

it('says that a capacity spread does not converge, in place of a count', async () => {
  begin({
    forecast: {
      ...{ aimMillivolts: 10, charges: null, from: null, doesNotConverge: 'capacity-spread' },
      hoursPerCharge: 10,
      expectedMillivolts: [],
    },
  });
  expect(await screen.findByText(/^It does not converge: .* never balances away\.$/)).toBeTruthy();
  expect(screen.queryByText('Balance charges to come')).toBeNull();
});
