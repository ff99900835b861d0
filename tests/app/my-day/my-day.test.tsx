import { fireEvent, screen, waitFor, within } from '@testing-library/react';
import { router } from 'expo-router';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import MyDay from '@/app/(workshop)/my-day';
import type { MyDayDto, PlanBlockDto, PlanLookInDto } from '@/shared/contract/bench-plan';
import { draw, emptyDevice, press, problem } from '../charges/bench-of';
import {
  atClock,
  brakes,
  fill,
  fit,
  fitsOf,
  free,
  iso,
  myDay,
  now,
  petra,
  workServer,
  type WorkServer,
} from '../work/works';

const state = vi.hoisted(() => ({ params: {} as Record<string, string> }));
vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => state.params,
}));

let server: WorkServer;
const open = (day: MyDayDto | null, answers: object = {}, params: Record<string, string> = {}) => {
  state.params = params;
  server = workServer('technician');
  Object.assign(server.answers, {
    'GET /api/bench-plan/my-day': () => (day ? Response.json(day) : problem(400, 'Not now.')),
    ...answers,
  });
  draw(<MyDay />);
};
const hand = (kind: PlanBlockDto['kind'], title: string, from: string, to: string): PlanBlockDto => ({
  ...{ kind, title, chargeId: title.split(' ').at(-1)!, repairId: null, workId: null, stint: null, place: 'A2' },
  from: iso(from),
  to: iso(to),
});
const lookIn = (title: string, dueAt: string, doneAt: string | null = null): PlanLookInDto => ({
  nobody: null,
  ...{ chargeId: title, title, channelName: 'A2', person: petra },
  dueAt: iso(dueAt),
  doneAt: doneAt === null ? null : iso(doneAt),
});
const full = myDay({
  blocks: [
    fill('taken'),
    hand('fit', 'Fit R-2411', '15:35', '16:35'),
    hand('clip-on', 'Clip on R-2411', '11:45', '11:50'),
    hand('check', 'Check R-2409', '14:05', '14:15'),
  ],
  lookIns: [lookIn('R-2411', '14:50'), lookIn('R-2411', '13:50'), lookIn('R-2411', '12:50', '12:48')],
  free: [free('14:15', '14:55')],
});
const rows = async () =>
  within(await screen.findByRole('list', { name: 'My day' }))
    .getAllByRole('listitem')
    .map((row) => row.textContent?.replaceAll('\u00a0', ' ') ?? '');

beforeEach(() => {
  emptyDevice();
  atClock(now);
  vi.mocked(router.push).mockClear();
  vi.mocked(router.setParams).mockClear();
});
afterEach(() => {
  vi.useRealTimers();
  vi.unstubAllGlobals();
});

describe('my day', () => {
  it('lists hands, look-ins, breaks, fills and free time by the clock, with now between them; 3 that are over unfolded', async () => {
    open(full);
    fireEvent.click(await press('Show what is over: 3'));
    const begins = [
      '11:45Clip on R-2411',
      '12:00Break, to 12:30',
      '12:48Look in at R-2411A2 · done 12:48',
      'now 13:42',
      '13:50Look in at R-2411A2Looked in',
      '14:05Check R-2409',
      '14:1540 min free14:15–14:55 · waiting for R-2411',
      '14:50Look in at R-2411A2',
      '14:55Brake bleed R-2416',
      '15:35Fit R-2411',
    ];
    expect((await rows()).map((row, index) => row.slice(0, begins[index]?.length))).toEqual(begins);
    expect(screen.getByText(/^Tue(sday)?\s9\sJune · 08:00–17:00$/)).toBeTruthy();
  });

  it('leads from a clip-on that is over to the charge, and from a check to come to its check', async () => {
    open(full);
    fireEvent.click(await press(/^Show what is over/));
    fireEvent.click(await screen.findByRole('link', { name: /^Clip on R-2411/ }));
    fireEvent.click(screen.getByRole('link', { name: /^Check R-2409/ }));
    expect(vi.mocked(router.push).mock.calls.flat()).toEqual(['/charges/R-2411', '/charges/R-2409/check']);
  });

  it('has a look-in done by a tap, the next one only, or leads to a reading', async () => {
    open(full, { 'POST /api/charges/R-2411/look-ins': () => Response.json({ id: 'R-2411', rev: 2 }) });
    expect(await screen.findAllByRole('button', { name: 'Looked in at R-2411' })).toHaveLength(1);
    fireEvent.click(screen.getByRole('link', { name: 'Log a reading of R-2411' }));
    expect(router.push).toHaveBeenCalledWith('/charges/R-2411/log');
    fireEvent.click(screen.getByRole('button', { name: 'Looked in at R-2411' }));
    await screen.findAllByText('Looked in at R-2411.');
    expect(server.writes()).toMatchObject([{ path: '/api/charges/R-2411/look-ins', body: {} }]);
    const asked = () => server.sent.filter(({ path }) => path === '/api/bench-plan/my-day').length;
    await waitFor(() => expect(asked()).toBeGreaterThan(1));
  });

  it('offers in a free stretch what fits it', async () => {
    open(full, {
      'GET /api/bench-plan/fits': () => Response.json(fitsOf(free('14:15', '14:55'), fit(brakes, '14:15', '14:45'))),
    });
    await press('Take it: Brake bleed, R-2416');
  });

  it('begins a fill where it stands', async () => {
    open(full, { 'POST /api/work/w1/stints/s1/begin': () => Response.json(brakes) });
    fireEvent.click(await press('Begin: Brake bleed R-2416'));
    await screen.findAllByText('Brake bleed R-2416 is begun.');
  });

  it('says a day off with its note, and a day without hours', async () => {
    open(myDay({ present: [], breaks: [], daysOff: [{ day: '2026-06-09', note: 'leave' }] }));
    await screen.findByText('Day off: leave');
    document.body.innerHTML = '';
    emptyDevice();
    open(myDay({ present: [], breaks: [] }));
    await screen.findByText('By your working hours you are not here on this day.');
  });

  it('goes to the day before and after, and asks for the one that is named', async () => {
    open(
      full,
      { 'GET /api/bench-plan/my-day?day=2026-06-10': () => Response.json(myDay({ day: '2026-06-10' })) },
      { day: '2026-06-10' },
    );
    await screen.findByText(/^Wed(nesday)?\s10\sJune/);
    await screen.findByText('Nothing of the bench plan is left for you on this day.');
    fireEvent.click(screen.getByRole('button', { name: /^The day after/ }));
    fireEvent.click(screen.getByRole('button', { name: 'Today' }));
    expect(vi.mocked(router.setParams).mock.calls.flat()).toEqual([{ day: '2026-06-11' }, { day: '' }]);
  });

  it('saves its day sheet, and says why where it could not', async () => {
    open(full);
    fireEvent.click(await press('Save the day sheet for printing'));
    await screen.findByText(/^The day sheet could not be made\./);
    expect(server.sent.at(-1)?.path).toMatch(/^\/api\/bench-plan\/day-sheet\.pdf\?.*day=2026-06-09/);
  });

  it('that could not be read says so, and is read again', async () => {
    open(null);
    await screen.findByText('Your day could not be read.');
    server.answers['GET /api/bench-plan/my-day'] = () => Response.json(full);
    fireEvent.click(await press('Try again'));
    await screen.findByRole('list', { name: 'My day' });
  });
});
