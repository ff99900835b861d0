import { fireEvent, screen, waitFor, within } from '@testing-library/react';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import Spares from '@/app/(workshop)/repairs/[id]/spares';
import type { TargetDto } from '@/shared/contract/pack-reading';
import type { CandidateDto, RepairPageDto } from '@/shared/contract/repair';
import { draw, emptyDevice, press } from '../charges/bench-of';
import { fakeServer, problem } from '../workshop/server';
import { reading, repairOf } from './read-repair-of';

const gone = vi.fn();
vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => ({ id: 'r1' }),
  useRouter: () => ({ canGoBack: () => false, replace: vi.fn(), push: gone, back: vi.fn() }),
}));

const target: TargetDto = {
  ...{ readingId: 'read1', volts: 3.95, standardErrorMillivolts: 0.6, slopeMillivoltsPerPercent: 8, healthy: 3 },
  ...{ trust: 'good', reasons: [], toleranceMillivolts: 5, typed: false, reason: null },
  ...{ at: '2026-06-09T10:00:00.000Z', by: { id: 'p1', name: 'Petra Aldwin' } },
};
const candidate = (more: Partial<CandidateDto>): CandidateDto => ({
  ...{ spareId: 's1', label: 'S-0398', shelfPlace: 'D4', groupVolts: [3.655, 3.66], readAt: null, usedCapacityAh: 61 },
  ...{ capacitySource: 'measured', seconds: { p10: 11_700, p50: 13_200, p90: 15_900 }, channelName: 'A2' },
  ...{ needsCharge: true, problems: [], ruledOut: false, reservedFor: null, agreement: null },
  ...more,
});
const list = [
  candidate({ agreement: { fullMillivolts: 4, lowMillivolts: -38, bestMatchPercent: 46 } }),
  candidate({ spareId: 's2', label: 'S-0402', reservedFor: { repairId: 'r9', number: 'R-2409' } }),
  candidate({ spareId: 's3', label: 'S-0391', seconds: null, ruledOut: true, problems: ['It was at 2.41 V.'] }),
];

let server: ReturnType<typeof fakeServer>;
let present: RepairPageDto;
beforeEach(() => {
  emptyDevice();
  gone.mockClear();
  server = fakeServer('technician');
  present = repairOf({ readings: [reading()], target, failing: '2' });
  Object.assign(server.answers, {
    'GET /api/repairs/r1': () => Response.json(present),
    'GET /api/repairs/r1/candidates': () => Response.json(list),
    'GET /api/module-types': () => Response.json([]),
  });
});
afterEach(() => vi.unstubAllGlobals());
const row = async (name: string) => within(await screen.findByRole('listitem', { name }));

it('shows the time of each with its band, what rules one out, and where to match another capacity', async () => {
  draw(<Spares />);
  const first = await row('S-0398');
  expect(first.getByText(/3.h.40 \(3:15–4:25\)/)).toBeTruthy();
  expect(first.getByText(/\+4.mV when full, −38.mV at low charge\. Least apart when matched at 46.%/)).toBeTruthy();
  const third = await row('S-0391');
  expect(third.getByText('It was at 2.41 V.')).toBeTruthy();
  expect(third.queryByRole('button')).toBeNull();
  const second = await row('S-0402');
  expect(second.getByText('Reserved for R-2409')).toBeTruthy();
  expect(second.queryByRole('button')).toBeNull();
});

it('reserves one, and plans its charge with repair, module, spare and target filled in', async () => {
  server.answers['POST /api/repairs/r1/spare'] = () => {
    present = { ...present, spare: { id: 's1', label: 'S-0398', shelfPlace: 'D4' }, rev: 4 };
    return Response.json(present);
  };
  draw(<Spares />);
  fireEvent.click(await press('Reserve S-0398'));
  fireEvent.click(await press('Plan a charge'));
  expect(server.writes()[0]).toMatchObject({ method: 'POST', body: { spareId: 's1' } });
  expect(gone).toHaveBeenCalledWith('/plan?spare=s1&target=3.950&tolerance=5&repair=R-2423&position=2');
});

it('says who has the spare where somebody was quicker', async () => {
  server.answers['POST /api/repairs/r1/spare'] = () => problem(409, 'S-0398 is reserved for R-2409.');
  draw(<Spares />);
  fireEvent.click(await press('Reserve S-0398'));
  expect((await screen.findByRole('alert')).textContent).toBe('S-0398 is reserved for R-2409.');
});

it('releases the reserved one at the revision that was seen', async () => {
  present = { ...present, spare: { id: 's1', label: 'S-0398', shelfPlace: 'D4' } };
  server.answers['DELETE /api/repairs/r1/spare'] = () => {
    present = { ...present, spare: null, rev: 4 };
    return Response.json(present);
  };
  draw(<Spares />);
  fireEvent.click(await press('Release S-0398'));
  expect(await press('Reserve S-0398')).toBeTruthy();
  expect(server.writes()[0]).toMatchObject({ method: 'DELETE', rev: '"3"' });
});

it('asks for the target first where none is taken', async () => {
  present = repairOf();
  draw(<Spares />);
  fireEvent.click(await press('Take the target'));
  expect(gone).toHaveBeenCalledWith('/repairs/r1/target');
});

it('says that 3.951 and 3.947 V need no charge for 3.950 V, and keeps the fit at the revision seen; old, it is read first', async () => {
  const within = candidate({ needsCharge: false, groupVolts: [3.951, 3.947], seconds: { p10: 0, p50: 0, p90: 0 } });
  server.answers['GET /api/repairs/r1/candidates'] = () => Response.json([within]);
  const spare = { id: 's1', label: 'S-0398', shelfPlace: 'D4' };
  present = repairOf({ ...present, spare, asItIs: { readAt: '2026-06-09T09:50:00.000Z', old: false } });
  server.answers['POST /api/repairs/r1/fit'] = () => {
    present = repairOf({ ...present, rev: 4, asItIs: null });
    return Response.json(present);
  };
  draw(<Spares />);
  expect((await row('S-0398')).getByText('Within the tolerance: no charge needed')).toBeTruthy();
  expect(screen.queryByRole('button', { name: 'Plan a charge' })).toBeNull();
  fireEvent.click(await press('Fit S-0398 without a charge'));
  expect(
    await screen.findByText(/^It rests within ±5.mV of 3\.950.V, .* It goes in as module 2, with your name/),
  ).toBeTruthy();
  expect(server.writes()).toEqual([]);
  fireEvent.click(await press('It is fitted'));
  await waitFor(() => expect(server.writes()).toMatchObject([{ path: '/api/repairs/r1/fit', body: { note: null } }]));
  expect(server.writes()[0]!.rev).toContain('3');
});

it('asks to read a spare once more whose reading within the tolerance is old', async () => {
  const spare = { id: 's1', label: 'S-0398', shelfPlace: 'D4' };
  present = repairOf({ ...present, spare, asItIs: { readAt: '2026-06-05T09:50:00.000Z', old: true } });
  draw(<Spares />);
  fireEvent.click(await press('Read S-0398 once more'));
  expect(gone).toHaveBeenCalledWith('/spares/s1/reading');
});
