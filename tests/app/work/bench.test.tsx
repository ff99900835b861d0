import { fireEvent, screen, waitFor, within } from '@testing-library/react';
import { router } from 'expo-router';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import Bench from '@/app/(workshop)/bench';
import type { FitsDto, MyDayDto } from '@/shared/contract/bench-plan';
import { charges } from '../bench-plan/plan-of';
import { draw, emptyDevice, press, problem } from '../charges/bench-of';
import {
  at,
  atClock,
  brakes,
  cleaning,
  fill,
  fit,
  fitsOf,
  free,
  inHands,
  iso,
  myDay,
  now,
  stint,
  workServer,
  type WorkServer,
} from './works';

let server: WorkServer;
const state = { fits: null as FitsDto | null, day: myDay() };
function open(fits: FitsDto | null, day: MyDayDto = myDay(), cards = charges.map(({ card }) => card)) {
  state.fits = fits;
  state.day = day;
  server = workServer('technician');
  Object.assign(server.answers, {
    'GET /api/workshop': () => Response.json({ id: 'w1', lagLimitMillivolts: 20 }),
    'GET /api/board': () => Response.json({ rev: 1, at: iso('13:42'), charges: cards, channels: [] }),
    'GET /api/chargers': () => Response.json([]),
    'GET /api/module-types': () => Response.json([]),
    'GET /api/spares': () => Response.json([]),
    'GET /api/bench-plan/fits': () => (state.fits ? Response.json(state.fits) : problem(400, 'Not now.')),
    'GET /api/bench-plan/my-day': () => Response.json(state.day),
  });
  draw(<Bench />);
}
const foot = async () => within(await screen.findByRole('region', { name: 'Other work' }));

beforeEach(() => {
  emptyDevice();
  atClock(now);
  vi.mocked(router.push).mockClear();
});
afterEach(() => {
  vi.useRealTimers();
  vi.unstubAllGlobals();
});

describe('the foot of the bench', () => {
  const wait = free('14:55', '15:30');

  it('says what fits the wait at 14:55, 35 min free: minutes, place, own skill; and by how much another is too long', async () => {
    open(
      fitsOf(
        wait,
        fit(brakes, '14:55', '15:25'),
        fit(cleaning, '14:55', '15:55', { span: null, overByMinutes: 25, because: '25 min too long' }),
      ),
    );
    const part = await foot();
    await part.findByText('Fits the wait at 14:55');
    expect(part.getByText(/^35\smin free$/)).toBeTruthy();
    const rows = part.getAllByRole('listitem').map((row) => row.textContent?.replaceAll('\u00a0', ' '));
    expect(rows).toEqual([
      'Brake bleed, R-241630 min · bay 4 · your skill · highTake it',
      'Module cleaning15 min or more of 60 · 25 min too long',
    ]);
    expect(part.getAllByRole('button', { name: /^Take it/ })).toHaveLength(1);
  });

  it('passes over 12 min that nothing fits, says so, and shows the next wait with something in it', async () => {
    const [short, long] = [free('14:00', '14:12'), free('14:55', '15:30')];
    const over = fit(brakes, '14:00', '14:30', { span: null, overByMinutes: 18, because: '18 min too long' });
    const both = fitsOf(short, over);
    both.people[0]?.stretches.push({ ...long, fits: [fit(brakes, '14:55', '15:25')] });
    open(both);
    const part = await foot();
    await part.findByText('Fits the wait at 14:55');
    expect(part.getByText(/^Nothing fits the 12\smin at 14:00\.$/)).toBeTruthy();
    expect(part.getAllByRole('button', { name: /^Take it/ })).toHaveLength(1);
  });

  it('takes it in one tap for 14:55, and gives it back in one from the word that says so', async () => {
    open(fitsOf(wait, fit(brakes, '14:55', '15:25')));
    server.answers['POST /api/work/w1/take'] = () => {
      state.fits = fitsOf(free('15:25', '15:35'));
      state.day = myDay({ blocks: [fill('taken')] });
      return Response.json(inHands(brakes, stint()));
    };
    server.answers['POST /api/work/w1/stints/s1/give-back'] = () => {
      state.day = myDay();
      return Response.json(brakes);
    };
    fireEvent.click(await press('Take it: Brake bleed, R-2416'));
    await screen.findAllByText('Brake bleed is yours, 14:55–15:25.');
    // It stands as the next thing of the own day.
    await press('Begin: Brake bleed R-2416');
    fireEvent.click(await press('Give it back'));
    await waitFor(() => expect(screen.queryByRole('button', { name: 'Begin: Brake bleed R-2416' })).toBeNull());
    expect(server.writes().map(({ path, body }) => [path, body])).toEqual([
      ['/api/work/w1/take', { from: iso('14:55') }],
      ['/api/work/w1/stints/s1/give-back', {}],
    ]);
  });

  it('takes of work that can be split the 35 min that fit', async () => {
    open(fitsOf(wait, fit(cleaning, '14:55', '15:30', { minutes: 35 })));
    server.answers['POST /api/work/w2/take'] = () => Response.json(inHands(cleaning, stint()));
    expect((await foot()).queryByText(/60\smin ·/)).toBeNull();
    fireEvent.click(await press('Take it: Module cleaning'));
    await waitFor(() => expect(server.writes()).toHaveLength(1));
    expect(server.writes()[0]?.body).toEqual({ from: iso('14:55'), minutes: 35 });
    expect((await foot()).getByText(/^35\smin of 60 · bench 2$/)).toBeTruthy();
  });

  it('10 min into the wait no longer offers 30 min of work: it is 5 min too long, and 25 min are free', async () => {
    atClock(at('15:05'));
    open(fitsOf(wait, fit(brakes, '14:55', '15:25')));
    const part = await foot();
    await part.findByText('Fits the wait now');
    expect(part.getByText(/^25\smin free$/)).toBeTruthy();
    expect(part.getByText(/^30\smin · 5\smin too long$/)).toBeTruthy();
    expect(part.queryByRole('button', { name: /^Take it/ })).toBeNull();
  });

  it('shows at the piece why it was not taken, and asks again what fits', async () => {
    open(fitsOf(wait, fit(brakes, '14:55', '15:25')));
    server.answers['POST /api/work/w1/take'] = () =>
      problem(409, 'Bram Teal has it from 14:00. Nothing of it is left.');
    fireEvent.click(await press('Take it: Brake bleed, R-2416'));
    expect((await (await foot()).findByRole('alert')).textContent).toBe(
      'Bram Teal has it from 14:00. Nothing of it is left.',
    );
    const asked = () => server.sent.filter(({ path }) => path === '/api/bench-plan/fits').length;
    await waitFor(() => expect(asked()).toBeGreaterThan(1));
  });

  it('stands under an empty bench too, with the ways to the own day and to all other work', async () => {
    open(fitsOf(free('14:55', '15:30', null), fit(brakes, '14:55', '15:25')), myDay(), []);
    const part = await foot();
    await part.findByText('Fits at 14:55');
    fireEvent.click(part.getByRole('link', { name: 'My day' }));
    expect(router.push).toHaveBeenCalledWith('/my-day');
  });

  it('says that it could not be read while the charges stand', async () => {
    open(null);
    await (await foot()).findByText('What fits your waits could not be read.');
    expect(screen.getByText(/R-2411/)).toBeTruthy();
  });
});

describe('a fill that is taken', () => {
  it('is done from the bench once it is begun, all of it or but for 5 min', async () => {
    open(fitsOf(free('15:25', '15:55')), myDay({ blocks: [fill('begun', { from: iso('13:30'), to: iso('14:00') })] }));
    server.answers['POST /api/work/w1/stints/s1/done'] = () => {
      state.day = myDay({ blocks: [fill('done')] });
      return Response.json(brakes);
    };
    fireEvent.click(await press('Done: Brake bleed R-2416'));
    const sheet = within(await screen.findByRole('dialog'));
    fireEvent.click(sheet.getByRole('button', { name: 'All of it is done' }));
    await waitFor(() => expect(screen.queryByRole('button', { name: /Brake bleed R-2416$/ })).toBeNull());
    expect(server.writes().map(({ body }) => body)).toEqual([{ minutesLeft: 0 }]);
  });

  it('before its time stands at the foot, and from 10 min before it in front of what runs', async () => {
    open(fitsOf(free('15:25', '15:55')), myDay({ blocks: [fill('taken', { from: iso('13:53') })] }));
    await (await foot()).findByRole('button', { name: 'Begin: Brake bleed R-2416' });
    document.body.innerHTML = '';
    emptyDevice();
    open(fitsOf(free('15:25', '15:55')), myDay({ blocks: [fill('taken', { from: iso('13:51') })] }));
    await press('Begin: Brake bleed R-2416');
    expect((await foot()).queryByRole('button', { name: 'Begin: Brake bleed R-2416' })).toBeNull();
  });
});
