import { act, fireEvent, screen, waitFor, within } from '@testing-library/react';
import { router } from 'expo-router';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { connected, lost } from '@/shared/client/link';
import { emptyDevice, press, problem, reasonOf } from '../charges/bench-of';
import { open, part, server, writes } from './open-plan';
import { iso, now, people, plan } from './plan-of';

const address = vi.hoisted(() => ({ params: {} as Record<string, string> }));
vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => address.params,
}));

beforeEach(() => {
  emptyDevice();
  vi.useFakeTimers({ now, toFake: ['Date'] });
  address.params = {};
});
afterEach(() => {
  vi.useRealTimers();
  vi.restoreAllMocks();
  vi.unstubAllGlobals();
});

describe('the bench plan on a desk', () => {
  it('is headed by the day, 6 charges, 1 late, and the next free channel', async () => {
    open();
    expect(await screen.findByText(/Tuesday 9\sJune\s6 charges, 1 late\snext free channel C1, now/)).toBeTruthy();
  });

  it('says each charge of a lane in words: its channel, stage, course and band, and that it can be moved', async () => {
    open();
    const lane = within(await screen.findByRole('list', { name: 'Charges on B1' }));
    expect(lane.getAllByRole('button').map((one) => one.getAttribute('aria-label'))).toEqual([
      'R-2408 on B1, ready, in tolerance, ready 13:35. Current and rest are over.',
      'R-2418 on B1, queued. Clip on 14:00. Charging, constant current until 15:30, rest until 17:00; ready 17:05, between 16:40 and 18:05. Can be moved.',
    ]);
  });

  it('says of the overdue one how many minutes it is over', async () => {
    open();
    expect(await screen.findByRole('button', { name: /^R-2406 on B2, tapering, 22\smin over\./ })).toBeTruthy();
  });

  it('lists the docks of each person, and who is not in', async () => {
    const off = { ...people[3]!, present: [], blocks: [], breaks: [], free: [], lookIns: [] };
    open('foreman', 1440, {
      ...plan,
      people: [...people.slice(0, 3), { ...off, daysOff: [{ day: '2026-06-09', note: 'holiday' }] }],
    });
    const bram = within(await screen.findByRole('list', { name: 'What Bram does' }));
    expect(bram.getAllByRole('listitem')).toHaveLength(7);
    expect(bram.getByLabelText('Fill: Brakes R-2410, 09:00 to 11:55')).toBeTruthy();
    expect(screen.getByText('off: holiday')).toBeTruthy();
  });

  it('shows used, lost and share of the waits: 9 h 20, 4 h 10, 69 %', async () => {
    open();
    const waits = await screen.findByRole('region', { name: 'Waits today' });
    expect(waits.textContent?.replace(/\s+/g, ' ')).toBe('Waits today9 h 20used4 h 10lost69 %used so far');
  });

  it('shows the queue with its band, due time and the other place', async () => {
    open();
    const queue = await part('Queue');
    expect(queue.getByText(/^ready 17:25 \(17:10–17:55\), due Wed\s10:00$/)).toBeTruthy();
    expect(queue.getByText('On B1 at 15:30 it is ready 30 min later.')).toBeTruthy();
  });

  it('offers a start now with the address of a plan that has its spare, target and repair', async () => {
    open();
    const link = await screen.findByRole('link', { name: 'Plan it: R-2424' });
    expect(link.getAttribute('href')).toBe('/plan?spare=s22&target=3.85&repair=R-2424');
    expect(
      screen.getByText(/^Saves 1\sh\s35 of wait: 2\sh\s10 \(1:50–2:40\) now on C1, then 25\smin once it is read\.$/),
    ).toBeTruthy();
  });
});

describe('the side column', () => {
  it('compares the better plan in words and takes it by one tap', async () => {
    open();
    const better = await part('A better plan');
    expect(better.getByText('R-2421 ready 30 min later, on time')).toBeTruthy();
    expect(better.getByText('C1 at 15:15 instead of A1 at 14:45')).toBeTruthy();
    expect(better.getByText(/^Late, weighted by priority: 44\smin as it stands, none with it\.$/)).toBeTruthy();
    fireEvent.click(better.getByRole('button', { name: 'Take this plan' }));
    await waitFor(() => expect(writes('/api/bench-plan/accept')[0]?.body).toEqual({ proposalId: 'p-7' }));
  });

  it('says where the better plan is old, and reads what is better now', async () => {
    open();
    server.answers['POST /api/bench-plan/accept'] = () => problem(412, 'R-2418 was begun at 13:43.');
    fireEvent.click(await press('Take this plan'));
    expect(await screen.findByText('R-2418 was begun at 13:43.')).toBeTruthy();
  });

  it('gives a piece of work that fits to the person whose wait it is, and says of others by how much they do not', async () => {
    open();
    expect(await screen.findByRole('heading', { name: /^Fits Marek, 134\smin at 14:56$/ })).toBeTruthy();
    expect(screen.getByText(/12 min too long$/)).toBeTruthy();
    fireEvent.click(await press('Give Charge port flap, R-2419 to Marek'));
    await waitFor(() => expect(writes('/api/work/1/take')[0]?.body).toEqual({ personId: 'marek', from: iso('14:56') }));
  });

  it('says beside the piece why it could not be given', async () => {
    open();
    server.answers['POST /api/work/1/take'] = () => problem(409, 'Bay 1 is taken until 15:20.');
    fireEvent.click(await press('Give Charge port flap, R-2419 to Marek'));
    expect(await screen.findByText('Bay 1 is taken until 15:20.')).toBeTruthy();
  });

  it('shows the fits of the person whose free time is pressed in the lane', async () => {
    open();
    fireEvent.click(await screen.findByRole('button', { name: /^85 min free, 16:05 to 17:30/ }));
    expect(await screen.findByRole('heading', { name: /^Fits Suri, 85\smin at 16:05$/ })).toBeTruthy();
  });

  it('takes the last change back, and says why where it cannot be', async () => {
    open();
    fireEvent.click(await press('Undo: R-2418 from A1 at 14:45 to B1 at 14:00'));
    await waitFor(() => expect(writes('/api/bench-plan/undo/change-1')).toHaveLength(1));
  });

  describe('names the look-ins that nobody can do', () => {
    const look = (clock: string, kind: 'away' | 'busy', because: string) => ({
      ...{ chargeId: 'R-2411', title: 'R-2411', channelName: 'A2', dueAt: iso(clock), doneAt: null, person: null },
      nobody: { kind, because },
    });
    const busy = look('14:50', 'busy', 'Ines clips on R-2418 until 14:57. Nobody else is there.');
    const openWith = (lookIns: (typeof busy)[]) =>
      open('foreman', 1440, {
        ...plan,
        charges: plan.charges.map((one) => (one.card.title === 'R-2411' ? { ...one, lookIns } : one)),
      });

    it('with the reason of each, those of one reason together', async () => {
      const closed = ['18:50', '19:50', '20:50'].map((clock) => look(clock, 'away', 'The workshop is closed then.'));
      openWith([...closed, busy]);
      const words = (await part('Nobody is there to look in')).getAllByText(/asks for a look-in/);
      expect(words.map(({ textContent }) => textContent.replaceAll('\u00a0', ' '))).toEqual([
        'R-2411 on A2 asks for a look-in at 14:50. Ines clips on R-2418 until 14:57. Nobody else is there.',
        'R-2411 on A2 asks for a look-in at 18:50. The workshop is closed then. So it is with 2 more after it.',
      ]);
    });

    it('as nobody’s who is free where whoever is there has their hands full', async () => {
      openWith([busy]);
      expect((await part('Nobody is free to look in')).getByText(/Ines clips on R-2418 until 14:57/)).toBeTruthy();
    });
  });

  it('names an alarm that nobody has, who is free, and gives it to them', async () => {
    open();
    server.answers['GET /api/alerts'] = () =>
      Response.json([
        {
          id: 'al1',
          kind: 'overdue',
          level: 'alarm',
          chargeId: 'R-2406',
          title: 'R-2406 at B2',
          for: null,
          seen: 'Current has stood at 3.1 A on B2.',
          checkFirst: '',
          raisedAt: iso('13:20'),
          lateByS: 0,
          takenBy: null,
          takenAt: null,
          passedAt: null,
          clearedAt: null,
        },
      ]);
    server.answers['POST /api/alerts/al1/pass'] = () => Response.json({});
    const nobody = await part('Nobody has R-2406');
    expect(nobody.getByText('Current has stood at 3.1 A on B2. Bram is free until 14:20.')).toBeTruthy();
    fireEvent.click(nobody.getByRole('button', { name: 'Give R-2406 to Bram' }));
    await waitFor(() => expect(writes('/api/alerts/al1/pass')[0]?.body).toEqual({ personId: 'bram' }));
  });
});

describe('other states of the bench plan', () => {
  it('without a connection keeps the plan, and says of every act that it needs the connection', async () => {
    open();
    const give = await press('Give Charge port flap, R-2419 to Marek');
    try {
      act(() => lost());
      vi.setSystemTime(now + 6000);
      act(() => lost());
      await waitFor(() => expect(give.getAttribute('aria-disabled')).toBe('true'));
      for (const [button, why] of [
        [give, 'Giving work needs the connection.'],
        [await press('Take this plan'), 'Taking it needs the connection.'],
        [await press(/^Undo: R-2418/), 'Taking it back needs the connection.'],
      ] as const)
        expect(reasonOf(button)).toBe(why);
      fireEvent.click(give);
      expect(server.writes()).toEqual([]);
      expect(screen.getByRole('list', { name: 'Charges on B1' })).toBeTruthy();
    } finally {
      act(() => connected());
    }
  });

  it('is a list by channel and person on a phone, with the same moves in a sheet', async () => {
    open('foreman', 390);
    fireEvent.click(
      await screen.findByRole('button', { name: /^Move R-2421 on A1, planned, clip on 14:45, ready 17:25/ }),
    );
    const sheet = within(await screen.findByRole('dialog'));
    fireEvent.click(await sheet.findByRole('radio', { name: /C1/ }));
    fireEvent.click(sheet.getByRole('button', { name: 'Move R-2421 to C1 at 13:45' }));
    await waitFor(() => expect(writes('/api/bench-plan/move')).toHaveLength(1));
  });

  it('of a technician says which role plans the bench and who that is, and leads to their own day', async () => {
    open('technician');
    expect(await screen.findByText('The bench is planned by a foreman or a manager.')).toBeTruthy();
    expect(await screen.findByText('Here that is Hella Brandt.')).toBeTruthy();
    expect(server.sent.some(({ path }) => path.startsWith('/api/bench-plan'))).toBe(false);
    fireEvent.click(await press('To my day'));
    expect(router.navigate).toHaveBeenCalledWith('/my-day');
  });

  it('without a channel says that a charger brings them', async () => {
    open('manager', 1440, { ...plan, channels: [], charges: [], queue: [] });
    expect(await screen.findByText('No channels yet. A charger brings them.')).toBeTruthy();
    expect(await press('Enter a charger')).toBeTruthy();
  });

  it('of a day without charges and without anybody says both, and keeps its lanes', async () => {
    open('foreman', 1440, { ...plan, charges: [], people: [], queue: [], lastChange: null });
    expect(await screen.findByText('Nothing is planned for this day.')).toBeTruthy();
    expect(await screen.findByText('Nobody has hours on this day.')).toBeTruthy();
    expect(screen.getByRole('heading', { name: 'C2' })).toBeTruthy();
  });

  it('that could not be read says what is safe and tries again', async () => {
    let there = false;
    open('foreman', 1440, plan, {
      'GET /api/bench-plan?days=1': () => (there ? Response.json(plan) : problem(403, 'This workshop is closed.')),
    });
    expect(await screen.findByText('The bench plan could not be read.')).toBeTruthy();
    expect(screen.getByText('This workshop is closed.')).toBeTruthy();
    there = true;
    fireEvent.click(await press('Try again'));
    expect(await screen.findByRole('list', { name: 'Charges on B1' })).toBeTruthy();
  });

  it('of a week shows seven days, the charges of each channel in them, and a way to each day', async () => {
    address.params = { days: '7' };
    open();
    const week = within(await screen.findByRole('table', { name: 'Seven days' }));
    expect(week.getAllByRole('columnheader')).toHaveLength(8);
    expect(week.getByRole('link', { name: 'R-2418 on B1, queued, clip on 14:00' })).toBeTruthy();
    fireEvent.click(week.getByRole('button', { name: 'Show tomorrow' }));
    expect(router.setParams).toHaveBeenCalledWith({ day: '2026-06-10', days: '' });
  });
});
