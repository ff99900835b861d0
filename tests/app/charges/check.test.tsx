import { fireEvent, screen, waitFor } from '@testing-library/react';
import { router } from 'expo-router';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import Check from '@/app/(workshop)/charges/[id]/check';
import { at, charge, iso } from '../../shared/ui/charge/charges';
import { draw, emptyDevice, input, press, problem, serverWith } from './bench-of';

vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => ({ id: 'c1' }),
}));

const due = charge('check-due', { checkDueAt: iso('13:30'), currentEndAt: iso('11:57'), rev: 5 });
const verdict = (within: boolean) => ({
  id: 'k1',
  at: iso('13:42'),
  by: { id: 'ines', name: 'Ines Marlow' },
  groupVolts: [],
  celsius: null,
  early: false,
  verdict: { within, groups: [], spreadVolts: 0.002, worstGroup: 0 },
});
const type = async (label: string, text: string) => {
  const field = await input(label);
  fireEvent.change(field, { target: { value: text } });
  fireEvent.blur(field);
  return field;
};

beforeEach(() => {
  emptyDevice();
  vi.mocked(router.push).mockClear();
  vi.mocked(router.replace).mockClear();
});
afterEach(() => {
  vi.useRealTimers();
  vi.unstubAllGlobals();
});

describe('the check after the rest', () => {
  it('has what to do at smoke one tap away', async () => {
    serverWith(due);
    draw(<Check />);
    fireEvent.click(await press('Smoke, smell or swelling now'));
    expect(await screen.findByText(/stop the charge here afterwards/)).toBeTruthy();
    expect(await screen.findByText(/lithium-ion, NMC/)).toBeTruthy();
  });

  it('judges each group as it is typed and keeps the text, comma and all', async () => {
    serverWith(due);
    draw(<Check />);
    const first = await type('Group 1', '3,907');
    expect(await screen.findByText('2 mV above, inside')).toBeTruthy();
    await type('Group 2', '3.898');
    expect(await screen.findByText('7 mV below, outside')).toBeTruthy();
    expect(first.value).toBe('3,907');
  });

  it('asks for three decimals after the field is left, not before, and does not send two', async () => {
    const server = serverWith(due);
    draw(<Check />);
    const first = await input('Group 1');
    fireEvent.change(first, { target: { value: '3.9' } });
    expect(screen.queryByText(/decimal/, { selector: '[id$="-note"]' })).toBeNull();
    fireEvent.change(first, { target: { value: '3.90' } });
    fireEvent.blur(first);
    expect(await screen.findByText('Two decimals are not enough to judge 5 mV. Type three.')).toBeTruthy();
    fireEvent.click(await press('Save the check'));
    expect(await screen.findByText('3 fields need a change.')).toBeTruthy();
    await waitFor(() => expect(document.activeElement).toBe(first));
    expect(server.writes()).toEqual([]);
  });

  it('takes the offset of the meter off: 3.912 V with the meter that reads 2 mV high is 5 mV above, inside', async () => {
    serverWith(due);
    draw(<Check />);
    await type('Group 1', '3.912');
    expect(await screen.findByText('7 mV above, outside')).toBeTruthy();
    fireEvent.change(await screen.findByLabelText('Meter'), { target: { value: 'm2' } });
    expect(await screen.findByText('5 mV above, inside')).toBeTruthy();
    expect(screen.getByText('−2 mV for its offset.')).toBeTruthy();
  });

  it('outside: saves the check and goes on to the plan of the top-up, filled in', async () => {
    const server = serverWith(due);
    server.answers['POST /api/charges/c1/rest-check'] = () =>
      Response.json({ ...due, rev: 6, modulePosition: '5', restChecks: [verdict(false)] });
    draw(<Check />);
    await type('Group 1', '3.905');
    await type('Group 2', '3.904');
    await type('Group 3', '3.898');
    await type('At the module', '21');
    expect(await screen.findByText(/^Group 3 needs \d\.\d Ah more$/)).toBeTruthy();
    fireEvent.click(await press('Plan the top-up'));
    await waitFor(() => expect(router.push).toHaveBeenCalled());
    expect(server.writes()[0]).toMatchObject({
      body: { groupVolts: [3.905, 3.904, 3.898], celsius: 21, meterId: 'm1' },
      rev: '"5"',
    });
    const url = new URL(String(vi.mocked(router.push).mock.calls[0]![0]), 'https://bidewell.example.com');
    expect(url.pathname).toBe('/plan');
    expect(Object.fromEntries(url.searchParams)).toEqual({
      spare: 's1',
      topUpOf: 'c1',
      target: '3.906',
      repair: 'R-2411',
      position: '5',
      meter: 'm1',
      celsius: '21',
      tolerance: '5',
    });
  });

  it('where a colleague has entered it meanwhile says who and what, and keeps what was typed', async () => {
    const server = serverWith(due);
    const events = [
      {
        id: 'e',
        at: iso('13:41'),
        kind: 'outside',
        by: { id: 'b', name: 'Bram Teal' },
        text: 'Group 2 is 9 mV below, outside.',
      },
    ];
    server.answers['POST /api/charges/c1/rest-check'] = () =>
      problem(412, 'Bram Teal checked it at 13:41; this is how it stands now.', {
        code: 'stale',
        present: { ...due, rev: 6, events },
      });
    draw(<Check />);
    for (const group of ['Group 1', 'Group 2', 'Group 3']) await type(group, '3.905');
    fireEvent.click(await press('Save it: in tolerance'));
    expect(
      await screen.findByText(
        'Bram Teal checked it at 13:41; this is how it stands now. Look at it again, then decide.',
      ),
    ).toBeTruthy();
    expect((await input('Group 3')).value).toBe('3.905');
    expect(router.replace).not.toHaveBeenCalled();
  });

  it('says where each group settles, and that a check 18 min before the minimum rest is over is marked early', async () => {
    const band = (p50: number) => ({ p10: p50 - 0.002, p50, p90: p50 + 0.002 });
    serverWith({
      ...due,
      currentEndAt: iso('13:00'),
      checkDueAt: iso('13:40'),
      rest: {
        settledVolts: [3.905, 3.906, 3.903].map(band),
        chance: 0.94,
        restedEnough: true,
        enoughAt: iso('13:40'),
        readings: 7,
      },
    });
    vi.setSystemTime(at('13:42'));
    draw(<Check />);
    expect(await screen.findByText(/G2 settles at 3\.906\sV \(3\.904–3\.908\)/)).toBeTruthy();
    expect(screen.getByText('Rested enough since 13:40: the check may come now.')).toBeTruthy();
    expect(screen.getByText(/The minimum rest is over in 18\smin: .*marked early/)).toBeTruthy();
  });

  it('keeps what is typed over a reload', async () => {
    serverWith(due);
    const { unmount } = draw(<Check />);
    await type('Group 2', '3,904');
    unmount();
    draw(<Check />);
    expect((await input('Group 2')).value).toBe('3,904');
  });
});
