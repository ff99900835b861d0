import { fireEvent, screen, waitFor } from '@testing-library/react';
import { router } from 'expo-router';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import SpareReading from '@/app/(workshop)/spares/[id]/reading';
import NewSpare from '@/app/(workshop)/spares/new';
import { draw, emptyDevice, input, meters, press } from '../charges/bench-of';
import { fakeServer } from '../workshop/server';

vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => ({ id: 's1' }),
}));

const type = {
  id: 't1',
  name: '2-series 66 Ah',
  ratedAh: 66,
  groupsInSeries: 2,
  chargeLimitVolts: 4.2,
  dischargeLimitVolts: 2.7,
  floorVolts: 2.5,
};
const spare = {
  ...type,
  id: 's1',
  label: 'S-0408',
  moduleTypeId: 't1',
  typeName: type.name,
  where: 'shelf',
  charge: null,
  quarantine: null,
  condition: 'sound',
  // Read with the other meter before, by somebody else.
  reading: {
    id: 'k1',
    at: '2026-06-01T09:00:00Z',
    groupVolts: [3.571, 3.57],
    celsius: 21,
    meterId: 'm2',
    movedBy: null,
  },
};
let server: ReturnType<typeof fakeServer>;
function stock(own = meters) {
  server = fakeServer('technician');
  Object.assign(server.answers, {
    'GET /api/module-types': () => Response.json([type]),
    'GET /api/meters': () => Response.json(own),
    'GET /api/spares/s1': () => Response.json(spare),
    'POST /api/spares/s1/readings': () => Response.json(spare),
    'POST /api/spares': () => Response.json(spare),
  });
}
const meter = () => screen.getByLabelText<HTMLSelectElement>('Read with');
const typeIn = async (label: string, text: string) => fireEvent.change(await input(label), { target: { value: text } });
async function typeReading() {
  await typeIn('G1', '3.571');
  await typeIn('G2', '3.570');
}
const keep = async () => fireEvent.click(await press('Keep the reading'));

beforeEach(() => {
  emptyDevice();
  stock();
  vi.mocked(router.back).mockClear();
});
afterEach(() => vi.unstubAllGlobals());

describe('the meter of a new reading', () => {
  it('is not preselected on a device that has none of this person, and a reading without the choice is not sent', async () => {
    draw(<SpareReading />);
    await typeReading();
    expect(meter().selectedOptions[0]!.textContent).toBe('Choose the meter');
    await keep();
    expect(await screen.findByText('Choose the meter, or not known.')).toBeTruthy();
    expect(server.writes()).toEqual([]);
    fireEvent.change(meter(), { target: { value: 'none' } });
    await keep();
    await waitFor(() => expect(server.writes()[0]?.body).toMatchObject({ meterId: null }));
  });

  it('is the one this person last read with here, for the next reading and for a new spare; not known is for once', async () => {
    const first = draw(<SpareReading />);
    await typeReading();
    fireEvent.change(meter(), { target: { value: 'm1' } });
    await keep();
    await waitFor(() => expect(router.back).toHaveBeenCalledTimes(1));
    expect(server.writes()[0]!.body).toMatchObject({ meterId: 'm1', groupVolts: [3.571, 3.57] });
    first.unmount();

    const second = draw(<SpareReading />);
    await typeReading();
    expect(meter().value).toBe('m1');
    fireEvent.change(meter(), { target: { value: 'none' } });
    await keep();
    await waitFor(() => expect(router.back).toHaveBeenCalledTimes(2));
    expect(server.writes()[1]!.body).toMatchObject({ meterId: null });
    second.unmount();

    draw(<NewSpare />);
    fireEvent.change(await screen.findByLabelText('Type'), { target: { value: 't1' } });
    await input('G1');
    expect(meter().value).toBe('m1');
  });

  it('that was taken off the list is chosen anew', async () => {
    localStorage.setItem('bw.meter.p1', 'gone');
    draw(<SpareReading />);
    await input('G1');
    expect(meter().selectedOptions[0]!.textContent).toBe('Choose the meter');
  });

  it('is not asked for in a workshop without meters', async () => {
    stock([]);
    draw(<SpareReading />);
    await typeReading();
    await keep();
    await waitFor(() => expect(server.writes()[0]?.body).toMatchObject({ meterId: null }));
  });
});
