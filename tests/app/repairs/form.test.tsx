import { fireEvent, screen, waitFor } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import EditRepair from '@/app/(workshop)/repairs/[id]/edit';
import NewRepair from '@/app/(workshop)/repairs/new';
import { mapHint, positionsTyped } from '@/shared/ui/repair/pack-form';
import { draw, emptyDevice, input, press } from '../charges/bench-of';
import { fakeServer, problem } from '../workshop/server';
import { repairOf } from './repair-of';

const gone = vi.hoisted(() => vi.fn());
vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => ({ id: 'r1' }),
  useRouter: () => ({ push: gone, replace: gone, back: gone, canGoBack: () => false }),
}));

beforeEach(() => {
  emptyDevice();
  gone.mockClear();
});
afterEach(() => vi.unstubAllGlobals());

const packType = {
  id: 'k1',
  name: 'Van pack 96',
  note: null,
  rev: 1,
  pack: {
    moduleTypeId: 't1',
    groupCount: 96,
    groupsPerModule: 2,
    positionOfGroup: null,
    bleedAmps: 0.12,
    aimMillivolts: 15,
    moduleTypeName: '2-series 66 Ah',
    moduleCount: 48,
  },
};
function serverOf() {
  const server = fakeServer('technician');
  Object.assign(server.answers, {
    'GET /api/pack-types': () => Response.json([packType]),
    'GET /api/module-types': () => Response.json([{ id: 't1', name: '2-series 66 Ah', groupsInSeries: 2 }]),
  });
  return server;
}
const type = async (label: string | RegExp, text: string) =>
  fireEvent.change(await input(label), { target: { value: text } });

describe('starting a repair', () => {
  it('books vehicle, pack type, promise and the one who books it, in one write', async () => {
    const server = serverOf();
    server.answers['POST /api/repairs'] = () => Response.json(repairOf('read'), { status: 201 });
    draw(<NewRepair />);
    await type(/^Vehicle/, 'Grey van');
    fireEvent.change(await screen.findByLabelText('Pack type'), { target: { value: 'k1' } });
    fireEvent.click(await press('Start the repair'));
    await waitFor(() => expect(gone).toHaveBeenCalledWith('/repairs/r1'));
    expect(server.writes()).toMatchObject([
      {
        path: '/api/repairs',
        body: {
          number: null,
          vehicle: 'Grey van',
          packTypeId: 'k1',
          pack: { moduleTypeId: 't1', groupCount: 96, groupsPerModule: 2, positionOfGroup: null },
          promisedAt: null,
          personIds: ['p1'],
        },
      },
    ]);
  });

  it('refuses 95 groups in modules of 2 at the field, and sends nothing', async () => {
    const server = serverOf();
    draw(<NewRepair />);
    await type(/^Vehicle/, 'Grey van');
    await type(/^Groups(?! per)/, '95');
    await type(/^Groups per module/, '2');
    fireEvent.click(await press('Start the repair'));
    expect(await screen.findByText(/95 groups do not fill modules of 2/)).toBeTruthy();
    expect(server.writes()).toEqual([]);
  });

  it('keeps all that was typed when the number is taken, and says so at the number', async () => {
    const server = serverOf();
    server.answers['POST /api/repairs'] = () =>
      problem(409, 'Taken.', { fields: { number: 'R-2418 is taken. Leave it empty for the next one.' } });
    draw(<NewRepair />);
    await type(/^Vehicle/, 'Grey van');
    await type(/^Repair number/, 'R-2418');
    fireEvent.change(await screen.findByLabelText('Pack type'), { target: { value: 'k1' } });
    fireEvent.click(await press('Start the repair'));
    expect(await screen.findByText(/R-2418 is taken/)).toBeTruthy();
    expect((await input(/^Vehicle/)).value).toBe('Grey van');
  });

  it('brings back what was typed after a reload', async () => {
    serverOf();
    const first = draw(<NewRepair />);
    await type(/^Vehicle/, 'Blue hatchback');
    first.unmount();
    draw(<NewRepair />);
    expect((await input(/^Vehicle/)).value).toBe('Blue hatchback');
  });
});

describe('changing a repair', () => {
  it('goes out at the revision its texts come from; somebody else’s change stands beside one’s own', async () => {
    const server = serverOf();
    server.answers['GET /api/repairs/r1'] = () => Response.json(repairOf('read'));
    server.answers['PATCH /api/repairs/r1'] = () =>
      problem(412, 'Changed meanwhile.', { present: repairOf('read', { bay: 'yard', rev: 5 }) });
    draw(<EditRepair />);
    await type(/^Bay/, 'bay 7');
    fireEvent.click(await press('Save the changes'));
    const table = await screen.findByRole('table', { name: 'What differs' });
    expect(table.textContent).toContain('yard');
    expect(table.textContent).toContain('bay 7');
    fireEvent.click(await press('Save mine over it'));
    await waitFor(() => expect(server.writes()).toHaveLength(2));
    expect(server.writes().map(({ rev }) => rev)).toEqual(['"4"', '"5"']);
    expect(server.writes()[1]?.body).toMatchObject({ bay: 'bay 7' });
  });
});

describe('the map of groups to modules', () => {
  it.each([
    ['', null],
    ['1, 1, 2, 2', ['1', '1', '2', '2']],
    ['1 1 2 2', ['1', '1', '2', '2']],
    ['3 left; 3 left; 3 right;', ['3 left', '3 left', '3 right']],
    ['1\n1\n2\n', ['1', '1', '2']],
  ])('typed as %j is %j', (text, positions) => expect(positionsTyped(text)).toEqual(positions));

  it('says how many of the 4 groups have a position', () =>
    expect(
      mapHint({
        moduleTypeId: '',
        groupCount: '4',
        groupsPerModule: '2',
        positionOfGroup: '1, 1, 2',
        bleedAmps: '',
        aimMillivolts: '',
      }),
    ).toBe('3 of 4 groups have a position.'));
});
