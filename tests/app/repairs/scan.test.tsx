import { fireEvent, screen, within } from '@testing-library/react';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import Spares from '@/app/(workshop)/repairs/[id]/spares';
import type { TargetDto } from '@/shared/contract/pack-reading';
import { draw, emptyDevice, press } from '../charges/bench-of';
import { fakeServer, problem } from '../workshop/server';
import { reading, repairOf } from './read-repair-of';

vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => ({ id: 'r1' }),
  useRouter: () => ({ canGoBack: () => false, replace: vi.fn(), push: vi.fn(), back: vi.fn() }),
}));
// The camera itself has a test of its own.
const seen = vi.hoisted(() => ({ text: '' }));
vi.mock('@/shared/ui/scan/camera-view', () => ({
  CameraView: ({ onText }: { onText: (text: string) => void }) => (
    <button onClick={() => onText(seen.text)}>a label comes into the picture</button>
  ),
}));

const target: TargetDto = {
  ...{ readingId: 'read1', volts: 3.95, standardErrorMillivolts: 0.6, slopeMillivoltsPerPercent: 8, healthy: 3 },
  ...{ trust: 'good', reasons: [], toleranceMillivolts: 5, typed: false, reason: null },
  ...{ at: '2026-06-09T10:00:00.000Z', by: { id: 'p1', name: 'Petra Aldwin' } },
};
const candidate = (spareId: string, label: string, more = {}) => ({
  ...{ spareId, label, shelfPlace: 'D4', groupVolts: [3.655, 3.66], readAt: null, usedCapacityAh: 61 },
  ...{ capacitySource: 'measured', seconds: { p10: 11_700, p50: 13_200, p90: 15_900 }, channelName: 'A2' },
  ...{ needsCharge: true, problems: [], ruledOut: false, reservedFor: null, agreement: null },
  ...more,
});

let server: ReturnType<typeof fakeServer>;
beforeEach(() => {
  emptyDevice();
  server = fakeServer('technician');
  let page = repairOf({ readings: [reading()], target, failing: '2' });
  Object.assign(server.answers, {
    'GET /api/repairs/r1': () => Response.json(page),
    'GET /api/repairs/r1/candidates': () =>
      Response.json([
        candidate('s1', 'S-0398'),
        candidate('s3', 'S-0391', { seconds: null, ruledOut: true, problems: ['It was at 2.41 V.'] }),
      ]),
    'GET /api/module-types': () => Response.json([]),
    'GET /api/charges/c7': () => Response.json({ id: 'c7', rev: 1, spare: { id: 's1', label: 'S-0398' } }),
    'GET /api/charges/c8': () => problem(404, 'This charge is not there.'),
    'POST /api/repairs/r1/spare': () => {
      page = { ...page, spare: { id: 's1', label: 'S-0398', shelfPlace: 'D4' }, rev: 4 };
      return Response.json(page);
    },
  });
  vi.stubGlobal('isSecureContext', true);
  vi.stubGlobal('navigator', Object.assign(Object.create(navigator), { mediaDevices: {} }));
});
afterEach(() => vi.unstubAllGlobals());

async function scan(text: string) {
  seen.text = text;
  draw(<Spares />);
  // The first page of a file takes its time to load.
  fireEvent.click(await screen.findByRole('button', { name: 'Scan the label of a spare' }, { timeout: 8000 }));
  fireEvent.click(await within(await screen.findByRole('dialog')).findByText('a label comes into the picture'));
}

it.each(['http://another-name.example.com:4300/charges/c7', 's-0398'])(
  'reserves the spare whose label %s was scanned, and closes the camera',
  async (text) => {
    await scan(text);
    await screen.findByText('S-0398 is reserved for this repair.', {}, { timeout: 4000 });
    expect(server.writes()).toMatchObject([{ method: 'POST', path: '/api/repairs/r1/spare', body: { spareId: 's1' } }]);
    expect(screen.queryByText('a label comes into the picture')).toBeNull();
  },
);

it.each([
  ['S-0391', 'S-0391: It was at 2.41 V.'],
  ['S-9999', 'S-9999 is no spare of this pack’s type in stock. Scan another.'],
  ['http://bench.example.com/charges/c8', 'This label is of no charge of this workshop. Type the label of the spare.'],
  ['https://example.com/menu', 'This code is none of a spare’s label. Scan another, or type the label.'],
])('says why %s is not taken, and reserves nothing', async (text, sentence) => {
  await scan(text);
  expect((await screen.findByRole('alert')).textContent).toBe(sentence);
  expect(server.writes()).toEqual([]);
});

it('has no button where the browser opens no camera', async () => {
  vi.stubGlobal('isSecureContext', false);
  draw(<Spares />);
  await press('Reserve S-0398');
  expect(screen.queryByRole('button', { name: 'Scan the label of a spare' })).toBeNull();
});
