import { fireEvent, screen, waitFor, within } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import Spare from '@/app/(workshop)/spares/[id]/index';
import type { SpareCapacityDto, SpareDto } from '@/shared/contract/spare';
import { PlanFields } from '@/shared/ui/plan/plan-fields';
import { emptyPlan } from '@/shared/ui/plan/plan-typed';
import { SpareRow } from '@/shared/ui/spare/spare-row';
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
  capacities: [],
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
    movedBy: null,
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

const moved: SpareDto = {
  ...spare,
  where: 'shelf',
  charge: null,
  reading: { ...spare.reading!, movedBy: { id: 'c7', title: 'R-2406' } },
};
const now = Date.parse('2026-06-09T12:00:00.000Z');

it('says on its page that a reading is of before a charge, and offers no plan before it is read again', async () => {
  stockOf(moved);
  const { unmount } = draw(<Spare />);
  expect(await screen.findByText('Read before R-2406.')).toBeTruthy();
  expect(screen.queryByText('Plan a charge with S-0408')).toBeNull();
  await press('Enter a reading');
  unmount();
  emptyDevice();
  stockOf({ ...moved, reading: spare.reading });
  draw(<Spare />);
  expect(await screen.findByText('Plan a charge with S-0408')).toBeTruthy();
  expect(screen.queryByText('Read before R-2406.')).toBeNull();
});

it('says so in the list and where a plan chooses its spare', async () => {
  stockOf(moved);
  draw(
    <>
      <SpareRow item={{ spare: moved, card: null }} now={now} onOpen={() => {}} />
      <PlanFields
        typed={{ ...emptyPlan, spareId: 's1' }}
        errors={{}}
        spares={[moved]}
        meters={[]}
        today="2026-06-09"
        toleranceHint="5"
        chemistry="nmc"
        onChange={() => {}}
        onLeave={() => {}}
      />
    </>,
  );
  expect(screen.getByRole('link', { name: /S-0408.*read before R-2406.*read again/ })).toBeTruthy();
  expect((await screen.findAllByText(/S-0408 · 2-series 66 Ah, to be read again/)).length).toBeGreaterThan(0);
});

it('shows the figures of its own charge while that is under way, whatever was read before', async () => {
  stockOf({ ...moved, where: 'charge', charge: { id: 'c7', title: 'R-2406', stage: 'charging', rev: 9 } });
  draw(<Spare />);
  await press('Open the charge');
  expect(screen.queryByText('Read before R-2406.')).toBeNull();
});

describe('what a charge has found of the capacity', () => {
  const told = {
    at: '2026-06-08T10:00:00.000Z',
    by: { id: 'p1', name: 'Petra Aldwin' },
    apart: null,
    chargeId: null,
  };
  const found: SpareCapacityDto = {
    ...told,
    id: 'k2',
    ampHours: 54.2,
    sdAh: 0.8,
    source: 'two readings',
    state: 'found',
    apart: 5.3,
    chargeId: 'c9',
  };
  const typed: SpareCapacityDto = { ...told, id: 'k1', ampHours: 61, sdAh: 1, source: 'typed', state: 'used' };
  const withFinding: SpareDto = { ...spare, where: 'shelf', charge: null, capacities: [found, typed] };

  it('stands with its standard deviation in the history, and asks to be taken or left with both bands', async () => {
    stockOf(withFinding);
    draw(<Spare />);
    // 10 and 90 % of a normal spread lie 1.2816 standard deviations out: 54.2 ± 1.03 and 61 ± 1.28.
    expect(await screen.findByText(/give 54\.2 \(53\.2–55\.2\), plans go by 61\.0 \(59\.7–62\.3\)/)).toBeTruthy();
    const rows = within(await screen.findByRole('list', { name: 'Capacity, told so far' })).getAllByRole('listitem');
    expect(rows.map((row) => row.textContent?.replaceAll('\u00a0', ' '))).toEqual([
      expect.stringMatching(/read before and after a charge, Petra, waits for an answer.*54\.2 Ah±0\.8 Ah$/),
      expect.stringMatching(/typed, Petra.*61\.0 Ah±1\.0 Ah$/),
    ]);
  });

  it('is taken with one write at the revision that was seen', async () => {
    const server = stockOf(withFinding);
    const taken: SpareDto = {
      ...withFinding,
      usedCapacityAh: 54.2,
      capacitySdAh: 0.8,
      capacities: [{ ...found, state: 'used' }, typed],
      rev: 6,
    };
    server.answers['POST /api/spares/s1/capacities/k2'] = () => {
      server.becomes(taken);
      return Response.json(taken);
    };
    draw(<Spare />);
    fireEvent.click(await press(/^Take 54\.2/));
    await waitFor(() => expect(screen.queryByText(/Take 54\.2/)).toBeNull());
    expect(server.writes()).toEqual([
      { method: 'POST', path: '/api/spares/s1/capacities/k2', rev: '"5"', body: { answer: 'take' } },
    ]);
  });

  it('stays open with the sentence where somebody else has changed the spare, and reads it again', async () => {
    const server = stockOf(withFinding);
    server.answers['POST /api/spares/s1/capacities/k2'] = () =>
      problem(412, 'Bram Teal changed it at 13:41.', { code: 'stale', present: withFinding });
    draw(<Spare />);
    fireEvent.click(await press('Leave it'));
    expect(await screen.findByText(/^Bram Teal changed it/)).toBeTruthy();
    await waitFor(() => expect(server.sent.filter(({ path }) => path === '/api/spares/s1').length).toBeGreaterThan(1));
  });
});
