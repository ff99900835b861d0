import { fireEvent, screen, waitFor, within } from '@testing-library/react';
import { router } from 'expo-router';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import Live from '@/app/(workshop)/charges/[id]/index';
import { lost, connected } from '@/shared/client/link';
import { waitingQueue } from '@/shared/client/waiting/waiting';
import { charge, iso, reading } from '../../shared/ui/charge/charges';
import { draw, emptyDevice, input, press, problem, reasonOf, serverWith } from './bench-of';

vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => ({ id: 'c1' }),
}));

const mine = { person: { id: 'p1', name: 'Petra Aldwin' } };

/** The connection has been gone for longer than is mended without a word. */
function goOffline(): void {
  lost();
  const later = Date.now() + 6000;
  vi.spyOn(Date, 'now').mockImplementation(() => later);
  lost();
}

beforeEach(() => {
  emptyDevice();
  vi.mocked(router.push).mockClear();
});
afterEach(() => {
  vi.unstubAllGlobals();
  vi.restoreAllMocks();
  connected();
});

describe('a running charge', () => {
  it('is held only with a reason; where somebody was quicker it says who did what, and the choice stays', async () => {
    const runs = charge('charging', { ...mine, rev: 3 });
    const server = serverWith(runs);
    const events = [
      { id: 'a', at: iso('11:50'), kind: 'started', by: mine.person, text: 'Clipped on at A2.' },
      {
        id: 'b',
        at: iso('13:41'),
        kind: 'held',
        by: { id: 'h', name: 'Hella Brandt' },
        text: 'Held: The lift is needed.',
      },
    ];
    const held = charge('held', { ...mine, rev: 4, heldAt: iso('13:41'), heldFrom: 'charging', events });
    server.answers['POST /api/charges/c1/hold'] = () => {
      server.becomes(held);
      return problem(412, 'Hella Brandt held it at 13:41; this is how it stands now.', {
        code: 'stale',
        present: held,
        changed: { by: { id: 'h', name: 'Hella Brandt' }, at: iso('13:41'), did: 'held it' },
      });
    };
    draw(<Live />);
    fireEvent.click(await press('Hold'));
    const sheet = within(await screen.findByRole('dialog'));
    expect(sheet.queryAllByRole('radio', { checked: true })).toEqual([]);
    const hold = sheet.getByRole('button', { name: 'It is off: hold the charge' });
    expect(hold.getAttribute('aria-disabled')).toBe('true');
    fireEvent.click(sheet.getByRole('radio', { name: 'Nobody is there to look in' }));
    fireEvent.click(hold);
    expect(
      await sheet.findByText(
        'Hella Brandt held it at 13:41; this is how it stands now. Look at it again, then decide.',
      ),
    ).toBeTruthy();
    expect(server.writes()[0]).toMatchObject({ rev: '"3"', body: { reason: 'Nobody is there to look in' } });
    expect(sheet.getByRole('radio', { name: 'Nobody is there to look in' }).getAttribute('aria-checked')).toBe('true');
    expect((await screen.findAllByText('Held while charging')).length).toBeGreaterThan(0);
  });

  it('keeps a typed reason over closing the sheet', async () => {
    serverWith(charge('charging', mine));
    draw(<Live />);
    fireEvent.click(await press('Stop'));
    fireEvent.click(await screen.findByRole('radio', { name: 'Something else' }));
    fireEvent.change(await input('The reason'), { target: { value: 'The pack was sold' } });
    fireEvent.click(await press('Let it run'));
    await waitFor(() => expect(screen.queryByRole('dialog')).toBeNull());
    fireEvent.click(await press('Stop'));
    expect((await input('The reason')).value).toBe('The pack was sold');
  });

  it('has what to do at smoke one tap away, the workshop’s own plan first', async () => {
    serverWith(charge('charging', mine));
    draw(<Live />);
    fireEvent.click(await press('Smoke, smell or swelling now'));
    const sheet = within(await screen.findByRole('dialog'));
    expect(sheet.getByText(/own emergency plan and the maker’s instructions come first/)).toBeTruthy();
    const steps = sheet.getAllByRole('listitem').map((step) => step.textContent);
    expect(steps[0]).toMatch(/Get everybody out.*Do not touch or move the module/);
    expect(steps.findIndex((step) => /fire service/.test(step ?? ''))).toBeGreaterThan(0);
    await waitFor(() => expect(sheet.getByText(/lithium-ion, NMC/)).toBeTruthy());
    expect(sheet.getByText(/keep away, and stop the charge here afterwards/)).toBeTruthy();
  });

  it.each([
    ['queued', /do not clip it on, and keep away\. Put S-0398 into quarantine afterwards/],
    ['check-due', /keep away, and stop the charge here afterwards/],
    ['ready', /do not fit it, and keep away\. Shelve it here afterwards/],
    ['stopped', /Put S-0398 into quarantine afterwards, where that was not done with the stop/],
  ] as const)('%s, it still says what to do at smoke, by what can be done then', async (stage, words) => {
    serverWith(charge(stage, mine));
    draw(<Live />);
    fireEvent.click(await press('Smoke, smell or swelling now'));
    const sheet = within(await screen.findByRole('dialog'));
    expect(sheet.getByText(words)).toBeTruthy();
    const off = sheet.getAllByRole('listitem')[2]!.textContent;
    expect(/^3If it is still or already clipped on/.test(off ?? '')).toBe(stage !== 'check-due');
  });

  it.each(['fitted', 'shelved'] as const)(
    '%s, it is not on the bench any more and says nothing of smoke',
    async (stage) => {
      serverWith(charge(stage, mine));
      draw(<Live />);
      await screen.findAllByText(/S-0398/);
      expect(screen.queryByRole('button', { name: 'Smoke, smell or swelling now' })).toBeNull();
    },
  );

  it('is handed over by who has it, not by a technician from a colleague', async () => {
    serverWith(charge('charging', mine));
    const { unmount } = draw(<Live />);
    await press('Hand the charge over to a colleague');
    unmount();
    emptyDevice();
    serverWith(charge('charging', { person: { id: 'bram', name: 'Bram Teal' } }));
    draw(<Live />);
    expect(await screen.findByText('Bram Teal has it. Bram or a foreman hands it over.')).toBeTruthy();
    expect(screen.queryByRole('button', { name: 'Hand the charge over to a colleague' })).toBeNull();
  });

  it('keeps a corrected reading in the log, and says of the new one why; only the new one can be corrected', async () => {
    const old = reading('13:06', { id: 'r1', terminalVolts: 11.92, replacedBy: 'r2' });
    const next = reading('13:06', {
      id: 'r2',
      terminalVolts: 11.29,
      replaces: 'r1',
      meterId: 'm1',
      reason: 'Two digits the wrong way round',
    });
    serverWith(charge('charging', { ...mine, readings: [old, next] }));
    draw(<Live />);
    expect(await screen.findByText('11.92 V · 10.0 A · 24 °C')).toBeTruthy();
    expect(screen.getByText(/Ines, off the charger’s display, corrected since$/)).toBeTruthy();
    expect(screen.getByText('11.29 V · 10.0 A · 24 °C')).toBeTruthy();
    expect(
      await screen.findByText(/Ines, with Hand meter 1, a correction: Two digits the wrong way round$/),
    ).toBeTruthy();
    expect(screen.getAllByRole('button', { name: /^Correct the reading/ })).toHaveLength(1);
  });
});

describe('what the readings say', () => {
  it('an odd one stands with what was seen, what was expected and what to check first', async () => {
    serverWith(
      charge('charging', {
        ...mine,
        readings: [reading('13:06'), reading('13:36', { amps: 3.1 })],
        odd: {
          kind: 'stuck-current',
          quantity: 'amps',
          group: null,
          seen: 3.1,
          expected: 0.4,
          readings: 2,
          since: iso('13:30'),
        },
      }),
    );
    draw(<Live />);
    const box = within(await screen.findByRole('region', { name: 'Odd reading' }));
    expect(box.getByText(/^Current has stood at 3\.1\sA\. 0\.4\sA was expected\.$/)).toBeTruthy();
    expect(box.getByText(/warmth at the groups, then what A2 is set to/)).toBeTruthy();
    expect(box.getByText(/2 readings in a row since .*13:30; nothing is learned from them/)).toBeTruthy();
  });

  it('what they taught stands beside what was known; a charge that has taught nothing shows no table', async () => {
    const learned = {
      capacityAh: { mean: 60, sd: 0.78, priorMean: 62, priorSd: 3.9 },
      longOhm: null,
      leadOhm: null,
    };
    serverWith(charge('charging', { ...mine, learned }));
    const { unmount } = draw(<Live />);
    // On a phone the two bands stand under each other: side by side they would run into one another.
    const list = within(await screen.findByRole('list', { name: 'Learned from this charge' }));
    expect(list.getAllByRole('listitem').map((row) => row.textContent)).toEqual([
      'Capacity of a group, Ahbefore 62.0 (57.0–67.0)60.0 (59.0–61.0)',
    ]);
    unmount();
    emptyDevice();
    serverWith(charge('charging', mine));
    draw(<Live />);
    await screen.findByText('No reading yet. The times are the plan’s until the first one.');
    expect(screen.queryByText('Learned from this charge')).toBeNull();
  });
});

describe('after the current', () => {
  it('asks to switch off what does not stop by itself, now or since a time that is typed', async () => {
    const rests = charge('resting', { ...mine, nextHand: 'Switch A2 off', currentEndAt: iso('13:33'), rev: 6 });
    const server = serverWith(rests);
    server.answers['POST /api/charges/c1/current-off'] = () =>
      problem(400, 'Some of this cannot be taken as it is.', {
        fields: { at: '23:10 is still to come. Type when it was.' },
      });
    draw(<Live />);
    expect(await screen.findByText('18.7 Ah are in. It does not stop by itself.')).toBeTruthy();
    fireEvent.click(await press('It was switched off earlier'));
    const time = await input('Switched off at');
    fireEvent.change(time, { target: { value: 'noon' } });
    fireEvent.click(await press('It is off'));
    expect(await screen.findByText('This is no time. Type it like 14:05.')).toBeTruthy();
    expect(time.value).toBe('noon');
    expect(server.writes()).toEqual([]);
  });

  it('says it is off now with the revision that was seen', async () => {
    const server = serverWith(
      charge('resting', { ...mine, nextHand: 'Switch A2 off', currentEndAt: iso('13:33'), rev: 6 }),
    );
    server.answers['POST /api/charges/c1/current-off'] = () => Response.json(charge('resting', { ...mine, rev: 7 }));
    draw(<Live />);
    fireEvent.click(await press('A2 is off now'));
    await waitFor(() => expect(screen.queryByRole('button', { name: 'A2 is off now' })).toBeNull());
    expect(server.writes()[0]).toMatchObject({ method: 'POST', path: '/api/charges/c1/current-off', rev: '"6"' });
  });

  it('a check outside leads to the top-up with its time and band', async () => {
    const groups = [
      { group: 0, volts: 3.906, deviationVolts: 0.001, within: true, ampHoursToGo: 0 },
      { group: 1, volts: 3.898, deviationVolts: -0.007, within: false, ampHoursToGo: 0.6 },
      { group: 2, volts: 3.905, deviationVolts: 0, within: true, ampHoursToGo: 0 },
    ];
    const check = {
      id: 'k',
      at: iso('13:40'),
      by: mine.person,
      groupVolts: [3.906, 3.898, 3.905],
      celsius: 21,
      early: false,
      verdict: { within: false, groups, spreadVolts: 0.008, worstGroup: 1 },
    };
    const due = charge('check-due', { ...mine, checkDueAt: iso('13:30'), restChecks: [check] });
    const server = serverWith(due);
    const soonest = {
      ...due.option,
      channelText: 'A1 · 5 A',
      totalS: { p10: 2880, p50: 3300, p90: 4200 },
      restS: 1800,
    };
    server.answers['POST /api/plans'] = () => Response.json({ plan: { options: [soonest], refusals: [] } });
    draw(<Live />);
    expect(await screen.findByText('Group 2 needs 0.6 Ah more')).toBeTruthy();
    expect(await screen.findByText('A1 · 5 A, then 30 min rest')).toBeTruthy();
    expect(screen.getByText(/\(48–70 min\)/)).toBeTruthy();
    fireEvent.click(await press('Plan the top-up'));
    expect(String(vi.mocked(router.push).mock.calls[0]![0])).toMatch(/^\/plan\?spare=s1&topUpOf=c1&/);
  });
});

describe('without a connection', () => {
  it('logging stays, hold and stop say that they need it, and readings that wait are listed with their removal', async () => {
    serverWith(charge('charging', { ...mine, nextLookInAt: iso('13:50'), lastReadingAt: iso('13:36') }));
    localStorage.setItem(
      'bw.list.waiting.p1',
      JSON.stringify([
        {
          kind: 'reading',
          key: 'k1',
          chargeId: 'c1',
          title: 'R-2411',
          offsetMs: 0,
          keptAt: Date.now(),
          input: { at: iso('13:40'), terminalVolts: 11.64, amps: 10, celsius: 24 },
          refused: null,
        },
      ]),
    );
    await waitingQueue.belongTo('p1');
    draw(<Live />);
    await press('Hold');
    goOffline();
    await screen.findByText(/^Alerts do not reach this/, {}, { timeout: 10_000 });
    expect((await press('Hold')).getAttribute('aria-disabled')).toBe('true');
    expect(reasonOf(await press('Stop'))).toBe('Hold and Stop need the connection.');
    expect((await press('Log a reading')).getAttribute('aria-disabled')).toBeNull();
    expect(screen.getByText(/^Alerts do not reach this/)).toBeTruthy();
    fireEvent.click(await press(/^Remove the reading of/));
    await waitFor(() => expect(screen.queryByText(/^Waiting on this/)).toBeNull());
    expect(waitingQueue.store.get()).toEqual([]);
  });
});
