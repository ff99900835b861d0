import { fireEvent, screen, waitFor, within } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import Waits from '@/app/(workshop)/waits/index';
import { connected, lost } from '@/shared/client/link';
import { saveFile } from '@/shared/client/save-file';
import { draw, emptyDevice, press, problem } from '../charges/bench-of';
import { comparison, eight, groupOf, now, page, rowOf, serverOf, waitsOf } from './waits-of';

const address = vi.hoisted(() => ({ params: {} as Record<string, string> }));
const gone = vi.hoisted(() => vi.fn());
const set = vi.hoisted(() => vi.fn());
vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => address.params,
  useRouter: () => ({ push: gone, navigate: gone, replace: gone, setParams: set }),
}));
vi.mock('@/shared/client/save-file', () => ({ saveFile: vi.fn() }));

/** Words are compared without their no-break spaces. */
const plain = (element: Element | null) => (element?.textContent ?? '').replace(/\s/g, ' ');

beforeEach(() => {
  emptyDevice();
  vi.useFakeTimers({ now, toFake: ['Date'] });
  address.params = {};
  for (const one of [gone, set, vi.mocked(saveFile)]) one.mockClear();
});
afterEach(() => {
  vi.useRealTimers();
  vi.restoreAllMocks();
  vi.unstubAllGlobals();
});

const figures = async () => {
  const used = await screen.findByRole('link', { name: /Wait that was used/ });
  return used.parentElement!.textContent!.replace(/\s+/g, ' ');
};

describe('the waits', () => {
  it('lead with the hours lost in the last whole week, the share used, the wait of one charge and the band', async () => {
    serverOf();
    draw(<Waits />);
    expect(await figures()).toBe(
      'Lost in week 2349 h27 h less than in week 22Wait that was used58 %58 of 100 h, 107 charges' +
        'Wait of one charge3 h 259 of 10 under 6 h 10Finish inside its band83 %80 % is the aim',
    );
  });

  it('say fewer than 5 charges in the place of every middle value of so few', async () => {
    const server = serverOf();
    server.answers[`GET /api/waits?${eight}`] = () => Response.json(waitsOf({ charges: 3, few: true }));
    draw(<Waits />);
    expect(await figures()).toMatch(/Wait of one charge–fewer than 5 chargesFinish inside its band–fewer than 5/);
    const table = within(await screen.findByRole('table', { name: 'Waits by module type' }));
    const cells = (name: RegExp) => within(table.getByRole('row', { name })).getAllByRole('cell').map(plain);
    expect(cells(/104 charges/)).toEqual(['2-series 66 Ah', '104', '3 h 25', '6 h 10', '58 %', '42 h', '+4 min']);
    expect(cells(/3 charges/)).toEqual(['4-series 105 Ah', '3', 'fewer than 5', '–', '58 %', '42 h', '–']);
    expect(screen.getByText(/Not drawn, fewer than 5 charges: Tapering\./)).toBeTruthy();
  });

  it('narrow by what the address holds, ask the server for nothing else, and say it in words', async () => {
    address.params = { weeks: '4', type: 't1', weekday: '2', by: 'channel' };
    const server = serverOf();
    const asked = 'from=2026-05-18&to=2026-06-09&moduleTypeId=t1&weekday=2';
    Object.assign(server.answers, {
      [`GET /api/waits?${asked}`]: () => Response.json(waitsOf()),
      [`GET /api/waits/groups?${asked}&by=channel`]: () =>
        Response.json({ by: 'channel', groups: [groupOf('a1', 'A1', 20)] }),
      [`GET /api/waits/charges?${asked}`]: () => Response.json(page([rowOf('R-2411')])),
    });
    draw(<Waits />);
    expect(await screen.findByText('Only 2-series 66 Ah, Tuesday.')).toBeTruthy();
    expect(await screen.findByRole('table', { name: 'Waits by channel' })).toBeTruthy();
    const paths = server.sent.map(({ path }) => path).filter((path) => path.startsWith('/api/waits'));
    expect(new Set(paths)).toEqual(
      new Set([`/api/waits?${asked}`, `/api/waits/groups?${asked}&by=channel`, `/api/waits/charges?${asked}`]),
    );
    fireEvent.click(await press('Clear the filters'));
    expect(set).toHaveBeenCalledWith(expect.objectContaining({ type: undefined, weekday: undefined }));
  });

  it('write a chosen filter into the address, and days of one’s own with the days that were shown', async () => {
    serverOf();
    draw(<Waits />);
    // The choices come with an answer of their own.
    await within(await screen.findByLabelText('Module type')).findByRole('option', { name: '2-series 66 Ah' });
    fireEvent.change(screen.getByLabelText('Module type'), { target: { value: 't1' } });
    expect(set).toHaveBeenLastCalledWith({ type: 't1' });
    fireEvent.click(await press(/^More filters/));
    fireEvent.change(await screen.findByLabelText('Way'), { target: { value: 'paralleled' } });
    expect(set).toHaveBeenLastCalledWith({ way: 'paralleled' });
    fireEvent.change(screen.getByLabelText('Period'), { target: { value: 'days' } });
    expect(set).toHaveBeenLastCalledWith({ weeks: 'days', from: '2026-04-20', to: '2026-06-09' });
  });

  it('lead from a bar, a channel, a group and a figure to the charges behind it, with the filters kept', async () => {
    address.params = { technician: 'p2' };
    const server = serverOf();
    const asked = `${eight}&technicianId=p2`;
    Object.assign(server.answers, {
      [`GET /api/waits?${asked}`]: () => Response.json(waitsOf()),
      [`GET /api/waits/groups?${asked}&by=module-type`]: () =>
        Response.json({ by: 'module-type', groups: [groupOf('t1', '2-series 66 Ah', 104)] }),
      [`GET /api/waits/charges?${asked}`]: () => Response.json(page([rowOf('R-2411')])),
    });
    draw(<Waits />);
    fireEvent.click(await press(/^Open the 14 charges of week 23: 49 h lost, 58 h used$/));
    fireEvent.click(await press(/^A1, busy 36\s%\. Open its charges$/));
    fireEvent.click(await screen.findByRole('row', { name: 'Open the 104 charges of 2-series 66 Ah' }));
    fireEvent.click(screen.getByRole('link', { name: /Wait of one charge/ }));
    fireEvent.click(await press('All 107 charges'));
    expect(gone.mock.calls.flat()).toEqual([
      '/waits/charges?technician=p2&week=2026-06-01',
      '/waits/charges?channel=a1&technician=p2',
      '/waits/charges?type=t1&technician=p2',
      '/waits/charges?technician=p2',
      '/waits/charges?technician=p2',
    ]);
  });

  it('give every chart its table and its CSV', async () => {
    const server = serverOf();
    draw(<Waits />);
    await figures();
    for (const [chart, what] of [
      ['Hours of waiting, by week', 'weeks'],
      ['Channel busy', 'channels'],
      ['Where the middle wait goes', 'stages'],
      ['Waits by module type', 'module-type'],
      ['The charges', 'charges'],
    ] as const) {
      server.answers[`GET /api/waits.csv?${eight}&what=${what}`] = () => new Response('a,b');
      fireEvent.click(await press(`${chart}, as a CSV file`));
      const name = what === 'charges' ? 'waits' : `waits-by-${what}`;
      await waitFor(() =>
        expect(saveFile).toHaveBeenLastCalledWith(expect.anything(), `${name}-2026-04-20-2026-06-09.csv`),
      );
    }
    for (const [chart, table] of [
      ['Hours of waiting, by week', /^Waits by week/],
      ['Channel busy', 'How busy the channels were'],
      ['Where the middle wait goes', 'Waits by stage'],
    ] as const) {
      fireEvent.click(await press(`${chart}, as a table`));
      expect(await screen.findByRole('table', { name: table })).toBeTruthy();
    }
  });

  it('say why a table could not be saved', async () => {
    const server = serverOf();
    server.answers[`GET /api/waits.csv?${eight}&what=weeks`] = () => problem(503, 'The server is being moved.');
    draw(<Waits />);
    fireEvent.click(await press('Hours of waiting, by week, as a CSV file'));
    expect((await screen.findByRole('alert')).textContent).toContain('The table could not be saved.');
  });

  it('show planned against actual with bias, half the errors and the share inside the band', async () => {
    address.params = { show: 'plan' };
    serverOf();
    draw(<Waits />);
    const row = within(await screen.findByRole('row', { name: /104 charges/ }));
    expect(row.getAllByRole('cell').map(plain)).toEqual([
      ...['2-series 66 Ah', '104', '+13 min', '+4 min', '9 min', '83 %'],
    ]);
  });

  it('compare with as many weeks before, the method stated, and not where one of the two has under 5', async () => {
    address.params = { compare: 'before' };
    serverOf();
    const { unmount } = draw(<Waits />);
    const part = within(await screen.findByRole('region', { name: 'Compare two periods' }));
    expect(await part.findByText('Shorter: −25 min.')).toBeTruthy();
    expect(part.getByText(/bootstrap, 95 %.*Mann–Whitney.*p is under 0\.05/)).toBeTruthy();
    expect(part.getAllByRole('columnheader').map(plain)).toEqual([
      ...['', '23 February – 14 April', '20 April – 9 June'],
    ]);
    unmount();
    emptyDevice();
    const few = { ...comparison, before: { ...comparison.before, charges: 3, few: true }, difference: null };
    const again = serverOf();
    again.answers[`GET /api/waits/compare?${eight}&compareFrom=2026-02-23&compareTo=2026-04-14`] = () =>
      Response.json(few);
    draw(<Waits />);
    expect(
      await screen.findByText(
        /No difference is reckoned: fewer than 5 charges in 23\sFebruary – 14\sApril \(3 charges\)\./,
      ),
    ).toBeTruthy();
    expect(screen.queryByText(/Mann–Whitney/)).toBeNull();
  });

  it('on a phone keep the name, the count and the lost hours in each row, and the filters behind one word', async () => {
    serverOf('manager', 390);
    draw(<Waits />);
    const list = within(await screen.findByRole('list', { name: 'Waits by module type' }));
    expect(list.getAllByRole('listitem')[0]!.textContent).toMatch(
      /2-series 66 Ah104 charges · 9 of 10 under 6\sh\s10 · 42\sh lost3\sh\s25/,
    );
    expect(screen.queryByLabelText('Module type')).toBeNull();
    fireEvent.click(await press(/^More filters/));
    expect(await screen.findByLabelText('Module type')).toBeTruthy();
  });

  it('name who reads them to a technician, and ask for none of them', async () => {
    const server = serverOf('technician');
    draw(<Waits />);
    expect(await screen.findByText('Waiting statistics are read by a foreman or a manager.')).toBeTruthy();
    expect(await screen.findByText('Here that is Hella Brandt.')).toBeTruthy();
    expect(server.sent.filter(({ path }) => path.includes('waits'))).toEqual([]);
  });

  it('say that nothing was finished, and that nothing fits the filters', async () => {
    const server = serverOf();
    const none = waitsOf({ charges: 0, few: true, plan: null, stages: [], byModuleType: [] });
    server.answers[`GET /api/waits?${eight}`] = () => Response.json(none);
    const { unmount } = draw(<Waits />);
    expect(await screen.findByText('No charge was finished in this time.')).toBeTruthy();
    unmount();
    address.params = { way: 'resistor' };
    server.answers[`GET /api/waits?${eight}&way=resistor`] = () => Response.json(none);
    draw(<Waits />);
    expect(await screen.findByText('No charge was finished in this time that fits the filters.')).toBeTruthy();
  });

  it('say why they could not be read, and read again', async () => {
    const server = serverOf();
    server.answers[`GET /api/waits?${eight}`] = () => problem(500, 'The database does not answer.');
    draw(<Waits />);
    expect(await screen.findByText('The waits could not be read.')).toBeTruthy();
    server.answers[`GET /api/waits?${eight}`] = () => Response.json(waitsOf());
    fireEvent.click(await press('Try again'));
    expect(await figures()).toContain('Lost in week 23');
  });

  it('without a connection keep the figures and say why no table can be saved', async () => {
    serverOf();
    draw(<Waits />);
    await figures();
    lost();
    expect(await screen.findByText('No connection: the tables can be saved as CSV when it is back.')).toBeTruthy();
    expect(screen.queryByRole('button', { name: /as a CSV file$/ })).toBeNull();
    expect(await figures()).toContain('Lost in week 23');
    connected();
  });
});
