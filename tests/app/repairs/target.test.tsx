import { fireEvent, screen, waitFor } from '@testing-library/react';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import Target from '@/app/(workshop)/repairs/[id]/target';
import type { ComputedTargetDto } from '@/shared/contract/pack-reading';
import { draw, emptyDevice, meters, press } from '../charges/bench-of';
import { fakeServer } from '../workshop/server';
import { reading, repairOf, source } from './read-repair-of';

const gone = vi.fn();
const replaced = vi.fn();
vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => ({ id: 'r1' }),
  useRouter: () => ({ canGoBack: () => false, replace: replaced, dismissTo: gone, push: vi.fn(), back: vi.fn() }),
}));

const computed: ComputedTargetDto = {
  ...{ readingId: 'read1', volts: 3.9503, standardErrorMillivolts: 0.6, slopeMillivoltsPerPercent: 8.1, healthy: 3 },
  ...{ trust: 'fair', reasons: ['old-reading', 'few-healthy'] },
};
let server: ReturnType<typeof fakeServer>;
beforeEach(() => {
  emptyDevice();
  gone.mockClear();
  server = fakeServer('technician');
  server.answers['GET /api/meters'] = () => Response.json(meters);
  server.answers['POST /api/repairs/r1/target'] = () => Response.json(repairOf({ rev: 4 }));
});
afterEach(() => vi.unstubAllGlobals());
const begin = (more: Parameters<typeof repairOf>[0] = {}) => {
  server.answers['GET /api/repairs/r1'] = () => Response.json(repairOf({ readings: [reading()], computed, ...more }));
  draw(<Target />);
};

it('shows 3.950 V with ±0.6 mV, what takes trust from it, and takes it as it was computed', async () => {
  begin();
  expect(await screen.findByText(/^±0\.6.mV$/)).toBeTruthy();
  expect(screen.getByText(/^The reading is old/)).toBeTruthy();
  expect(screen.getByText('Few healthy groups stand behind it.')).toBeTruthy();
  fireEvent.click(await press('Take the computed target'));
  await waitFor(() => expect(gone).toHaveBeenCalledWith('/repairs/r1'));
  expect(server.writes()[0]!.body).toEqual({
    ...{ readingId: 'read1', volts: null, toleranceMillivolts: 5, reason: null },
  });
});

it('takes a typed target only with its reason', async () => {
  begin();
  fireEvent.click(await screen.findByRole('radio', { name: /Type another/ }));
  fireEvent.change(screen.getByLabelText('Other target'), { target: { value: '3,960' } });
  fireEvent.click(await press('Take the typed target'));
  expect(await screen.findByText('Say why another target than the computed one is taken.')).toBeTruthy();
  expect(server.writes()).toEqual([]);
  fireEvent.change(screen.getByLabelText(/Why another/), { target: { value: 'Customer drives it down first' } });
  fireEvent.click(await press('Take the typed target'));
  await waitFor(() =>
    expect(server.writes()[0]?.body).toMatchObject({ volts: 3.96, reason: 'Customer drives it down first' }),
  );
});

it('leads to a new reading where the present one is old', async () => {
  begin();
  fireEvent.click(await press('Read the pack again'));
  expect(replaced).toHaveBeenCalledWith('/repairs/r1/reading');
});

it('says the 12 mV that the meter reads above the pack on one healthy group', async () => {
  begin({ sources: [source({ offsetMillivolts: 12 })] });
  expect(await screen.findByText(/^On a healthy group .* read 12.mV above the pack’s instrument\.$/)).toBeTruthy();
});
