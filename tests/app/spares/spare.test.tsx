import { fireEvent, screen, waitFor, within } from '@testing-library/react';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import Spare from '@/app/(workshop)/spares/[id]/index';
import type { SpareDto } from '@/shared/contract/spare';
import { draw, emptyDevice, press } from '../charges/bench-of';
import { fakeServer, problem } from '../workshop/server';

vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => ({ id: 's1' }),
}));

const spare: SpareDto = {
  id: 's1',
  label: 'S-0408',
  moduleTypeId: 't1',
  shelfPlace: 'D4',
  capacityAh: 61,
  healthPercent: null,
  capacitySource: 'measured',
  condition: 'sound',
  note: null,
  typeName: '2-series 66 Ah',
  groupsInSeries: 2,
  chargeLimitVolts: 4.2,
  dischargeLimitVolts: 3,
  floorVolts: 2.5,
  shelfVolts: 3.8,
  where: 'charge',
  usedCapacityAh: 61,
  capacitySdAh: 1,
  quarantine: null,
  charge: { id: 'c1', title: 'R-2418', stage: 'queued', rev: 3 },
  reading: {
    id: 'r1',
    at: '2026-06-09T06:00:00.000Z',
    groupVolts: [3.571, 3.57],
    celsius: 21,
    meterId: null,
    by: { id: 'p1', name: 'Petra Aldwin' },
    note: null,
  },
  rev: 5,
};

beforeEach(emptyDevice);
afterEach(() => vi.unstubAllGlobals());

function stockOf(present: SpareDto) {
  const server = fakeServer('technician');
  const state = { present };
  Object.assign(server.answers, {
    'GET /api/spares/s1': () => Response.json(state.present),
    'GET /api/spares/s1/history': () => Response.json({ readings: [], charges: [] }),
    'GET /api/module-types': () => Response.json([]),
    'GET /api/meters': () => Response.json([]),
    'GET /api/workshop': () => Response.json({ id: 'w1' }),
    'GET /api/board': () => Response.json({ rev: 1, at: spare.reading!.at, charges: [], channels: [] }),
  });
  return { ...server, becomes: (next: SpareDto) => (state.present = next) };
}

it('sets a queued spare aside with one write that names the charge as it was seen', async () => {
  const server = stockOf(spare);
  server.answers['POST /api/spares/s1/quarantine'] = () =>
    Response.json({ ...spare, where: 'quarantine', charge: null, rev: 6 });
  draw(<Spare />);
  fireEvent.click(await press('Quarantine'));
  const sheet = within(await screen.findByRole('dialog'));
  expect(sheet.getByText('It is queued for R-2418. That plan falls away.')).toBeTruthy();
  fireEvent.click(sheet.getByRole('radio', { name: 'Swollen' }));
  fireEvent.change(sheet.getByLabelText('Where it goes'), { target: { value: 'Outdoor box' } });
  fireEvent.click(sheet.getByRole('button', { name: 'Put in quarantine' }));
  await waitFor(() => expect(screen.queryByRole('dialog')).toBeNull());
  expect(server.writes()).toEqual([
    {
      method: 'POST',
      path: '/api/spares/s1/quarantine',
      rev: '"5"',
      body: { reason: 'Swollen', condition: 'swollen', shelfPlace: 'Outdoor box', charge: { id: 'c1', rev: 3 } },
    },
  ]);
});

it('says who was quicker, keeps what was chosen, and sends it over the present state on the next press', async () => {
  const server = stockOf(spare);
  const moved = { ...spare, charge: { ...spare.charge!, rev: 4 } };
  const who = 'Hella Brandt queued it at 13:41; this is how it stands now.';
  server.answers['POST /api/spares/s1/quarantine'] = () => {
    server.becomes(moved);
    return problem(412, who, { code: 'stale', present: moved });
  };
  draw(<Spare />);
  fireEvent.click(await press('Quarantine'));
  const sheet = within(await screen.findByRole('dialog'));
  fireEvent.click(sheet.getByRole('radio', { name: 'Dented' }));
  fireEvent.click(sheet.getByRole('button', { name: 'Put in quarantine' }));
  expect(await sheet.findByText(who)).toBeTruthy();
  expect(sheet.getByRole('radio', { name: 'Dented' }).getAttribute('aria-checked')).toBe('true');
  const reads = () => server.sent.filter(({ method, path }) => method === 'GET' && path === '/api/spares/s1').length;
  await waitFor(() => expect(reads()).toBe(2));
  await waitFor(() => {
    fireEvent.click(sheet.getByRole('button', { name: 'Put in quarantine' }));
    expect(server.writes().at(-1)!.body).toMatchObject({ reason: 'Dented', charge: { id: 'c1', rev: 4 } });
  });
});
