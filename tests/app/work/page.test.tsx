import { fireEvent, screen, waitFor, within } from '@testing-library/react';
import { router } from 'expo-router';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import OneWork from '@/app/(workshop)/work/[id]/index';
import OtherWork from '@/app/(workshop)/work/index';
import type { Role } from '@/shared/contract/roles';
import type { WorkDto } from '@/shared/contract/work';
import { draw, emptyDevice, press, problem, reasonOf } from '../charges/bench-of';
import {
  atClock,
  bram,
  brakes,
  cleaning,
  inHands,
  iso,
  listOf,
  now,
  stint,
  workServer,
  type WorkServer,
} from './works';

vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => ({ id: 'w1' }),
}));

let server: WorkServer;
/** The server holds one piece; an act changes it. */
function openOne(work: WorkDto, role: Role = 'technician', acts: Record<string, (body: unknown) => WorkDto> = {}) {
  server = workServer(role);
  let present = work;
  server.answers['GET /api/work/w1'] = () => Response.json(present);
  for (const [path, act] of Object.entries(acts))
    server.answers[`POST /api/work/w1/${path}`] = (body) => Response.json((present = act(body)));
  draw(<OneWork />);
}
const openList = (answers: object) => {
  server = workServer('technician');
  Object.assign(server.answers, answers);
  draw(<OtherWork />);
};
const act = async (name: string | RegExp) => fireEvent.click(await press(name));

beforeEach(() => {
  emptyDevice();
  atClock(now);
  vi.mocked(router.push).mockClear();
});
afterEach(() => {
  vi.useRealTimers();
  vi.unstubAllGlobals();
});

describe('the list of other work', () => {
  it('says of each piece what it takes, what it asks for, when it is due and who has it', async () => {
    openList({ 'GET /api/work?state=open': () => Response.json(listOf([brakes, inHands(cleaning, stint())], 3)) });
    const rows = within(await screen.findByRole('list', { name: 'Other work' })).getAllByRole('link');
    expect(rows.map((row) => row.getAttribute('aria-label')?.replaceAll('\u00a0', ' '))).toEqual([
      'Brake bleed, R-2416, 20–30 min, bay 4 · brakes · high priority, due 17:00, Open',
      'Module cleaning, 40 min–1 h 00, bench 2, Taken by Petra',
    ]);
    expect(screen.getByRole('radio', { name: 'Open 2' })).toBeTruthy();
    expect(screen.getByRole('radio', { name: 'Over 3' })).toBeTruthy();
    fireEvent.click(rows[0]!);
    expect(router.push).toHaveBeenCalledWith('/work/w1');
  });

  it('that is empty offers the one thing to do', async () => {
    openList({ 'GET /api/work?state=open': () => Response.json(listOf([])) });
    await screen.findByText('No other work yet. Add a piece, and it is offered where it fits a wait.');
    fireEvent.click((await screen.findAllByRole('button', { name: 'Add other work' })).at(-1)!);
    expect(router.push).toHaveBeenCalledWith('/work/new');
  });

  it('that could not be read says so, and is read again', async () => {
    openList({ 'GET /api/work?state=open': () => problem(400, 'This cannot be asked so.') });
    await screen.findByText('The work could not be read.');
    server.answers['GET /api/work?state=open'] = () => Response.json(listOf([brakes]));
    await act('Try again');
    await screen.findByRole('list', { name: 'Other work' });
  });
});

describe('one piece of other work', () => {
  it('is taken for now unless another time is typed, begun, and ended with 10 min left', async () => {
    const begun = stint({ state: 'begun', from: iso('13:42'), to: iso('14:12'), begunAt: iso('13:42') });
    openOne(brakes, 'technician', {
      take: () => inHands(brakes, stint({ from: iso('13:42') })),
      'stints/s1/begin': () => inHands(brakes, begun),
      'stints/s1/done': () => ({ ...brakes, leftMinutes: 10, leftLongMinutes: 15, rev: 7 }),
    });
    await act('Take it');
    const sheet = within(await screen.findByRole('dialog'));
    fireEvent.click(sheet.getByRole('button', { name: 'Take it' }));
    await act('Begin');
    await act('Done');
    const done = within(await screen.findByRole('dialog'));
    fireEvent.change(done.getByLabelText('Minutes still to be done'), { target: { value: '10' } });
    fireEvent.click(done.getByRole('button', { name: /^Put 10\smin back on the list$/ }));
    await press('Take it');
    expect(server.writes().map(({ path, body }) => [path, body])).toEqual([
      ['/api/work/w1/take', {}],
      ['/api/work/w1/stints/s1/begin', {}],
      ['/api/work/w1/stints/s1/done', { minutesLeft: 10 }],
    ]);
    expect(screen.getByText(/^10–15\smin$/)).toBeTruthy();
  });

  it('is given by a foreman to somebody with the skill, for a time; who lacks it cannot be chosen', async () => {
    openOne(brakes, 'foreman', { take: () => inHands(brakes, stint()) });
    await act('Give it to…');
    const sheet = within(await screen.findByRole('dialog'));
    expect(sheet.getByRole('radio', { name: /^Bram Teal/ }).textContent).toContain('has not the skill brakes');
    expect(sheet.getByRole('radio', { name: /^Bram Teal/ }).getAttribute('aria-disabled')).toBe('true');
    expect(sheet.getByRole('button', { name: 'Choose a person first' }).getAttribute('aria-disabled')).toBe('true');
    expect(server.writes()).toEqual([]);
  });

  it('without a skill is given to Bram for 15:00', async () => {
    openOne({ ...cleaning, id: 'w1' }, 'foreman', { take: () => inHands(cleaning, stint({ person: bram })) });
    await act('Give it to…');
    const sheet = within(await screen.findByRole('dialog'));
    fireEvent.click(sheet.getByRole('radio', { name: 'Bram Teal' }));
    fireEvent.change(sheet.getByLabelText('Begins'), { target: { value: '1500' } });
    fireEvent.change(sheet.getByLabelText('How much of it'), { target: { value: '20' } });
    fireEvent.click(sheet.getByRole('button', { name: 'Give it to Bram for 15:00' }));
    await screen.findAllByText('Module cleaning is with Bram Teal.');
    expect(server.writes()[0]?.body).toEqual({ personId: 'p3', from: iso('15:00'), minutes: 20 });
  });

  it('is not given out by a technician, who may give back what is their own', async () => {
    openOne(inHands(brakes, stint()), 'technician', { 'stints/s1/give-back': () => ({ ...brakes, rev: 6 }) });
    await press('Begin');
    expect(screen.queryByRole('button', { name: 'Give it to…' })).toBeNull();
    await act('Give back');
    await press('Take it');
  });

  it('of somebody else is left to them', async () => {
    openOne(inHands(brakes, stint({ person: bram })));
    await screen.findByText('Bram Teal');
    expect(screen.queryByRole('button', { name: /^(Begin|Done|Give back|Take it)/ })).toBeNull();
  });

  it('keeps the server’s sentence in the sheet where the time is not free', async () => {
    openOne(brakes);
    server.answers['POST /api/work/w1/take'] = () => problem(409, 'You fit R-2411 from 14:00 to 15:00.');
    await act('Take it');
    const sheet = within(await screen.findByRole('dialog'));
    fireEvent.click(sheet.getByRole('button', { name: 'Take it' }));
    expect((await sheet.findByRole('alert')).textContent).toBe('You fit R-2411 from 14:00 to 15:00.');
  });

  it('is dropped only with a reason, and can be opened again', async () => {
    openOne(brakes, 'technician', {
      drop: () => ({
        ...brakes,
        state: 'dropped',
        over: { at: iso('13:42'), by: bram, reason: 'The owner does it.' },
        rev: 5,
      }),
      reopen: () => ({ ...brakes, rev: 6 }),
    });
    await act('Drop it');
    const sheet = within(await screen.findByRole('dialog'));
    expect(sheet.getByRole('button', { name: 'Drop it' }).getAttribute('aria-disabled')).toBe('true');
    fireEvent.change(sheet.getByLabelText('Reason'), { target: { value: 'The owner does it.' } });
    fireEvent.click(sheet.getByRole('button', { name: 'Drop it' }));
    await screen.findByText('Dropped by Bram Teal, 13:42');
    await act('Open it again');
    await press('Take it');
    await waitFor(() =>
      expect(server.writes().map(({ body }) => body)).toEqual([{ reason: 'The owner does it.' }, {}]),
    );
  });

  it('that somebody is at cannot be dropped, and says why', async () => {
    openOne(inHands(brakes, stint({ person: bram, state: 'begun' })));
    const drop = await press('Drop it');
    expect(drop.getAttribute('aria-disabled')).toBe('true');
    expect(reasonOf(drop)).toBe('Somebody is at it. It can be dropped once that is ended or given back.');
  });

  it('that is gone leads to the list', async () => {
    server = workServer('technician');
    server.answers['GET /api/work/w1'] = () => problem(404, 'This work is not here.');
    draw(<OneWork />);
    await act('All other work');
    expect(router.replace).toHaveBeenCalledWith('/work');
  });
});
