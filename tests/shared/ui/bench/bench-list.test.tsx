import { fireEvent, render, screen, within } from '@testing-library/react';
import { describe, expect, it, vi } from 'vitest';
import { FirstPlan } from '@/shared/ui/bench/first-plan';
import { BenchList } from '@/shared/ui/bench/bench-list';
import { needsOf } from '@/shared/ui/bench/plan-needs';
import { nextStep } from '@/shared/ui/bench/next-step';
import { FormatsProvider } from '@/shared/ui/format/formats';
import { card, iso, now, zone } from '../charge/charges';

const go = vi.fn();
const bench = (...cards: ReturnType<typeof card>[]) =>
  render(
    <FormatsProvider languageTag="en-GB" zone={zone}>
      <BenchList charges={cards} at={{ now, asOf: now }} old={false} onGo={go} />
    </FormatsProvider>,
  );
const late = (title: string, since: string) =>
  card(title, 'tapering', ['14:45', '14:55', '15:30'], { overdueSince: iso(since) });
const due = (title: string) => card(title, 'check-due', null, { checkDueAt: iso('13:30'), currentEndAt: iso('11:57') });

describe('the bench', () => {
  it('has at most two call-outs; what else waits stands as a row', () => {
    bench(late('R-1', '13:20'), late('R-2', '13:30'), due('R-3'));
    expect(screen.getAllByRole('region')).toHaveLength(2);
    expect(screen.queryByRole('region', { name: /R-3/ })).toBeNull();
    expect(screen.getByRole('link', { name: 'R-3, Check due, S-0400' })).toBeTruthy();
  });

  it('says how long a check waits and how long it rested, and its button leads to the group voltages', () => {
    bench(due('R-2409'));
    const call = within(screen.getByRole('region', { name: 'R-2409, Check due' }));
    expect(call.getByText('12 min waiting')).toBeTruthy();
    expect(call.getByText('S-0400 at A1, rested 1 h 45')).toBeTruthy();
    fireEvent.click(call.getByRole('button', { name: 'Enter the group voltages, R-2409' }));
    expect(go).toHaveBeenLastCalledWith('/charges/R-2409/check');
  });

  it('never shows a time without its band', () => {
    bench(
      card('R-2411', 'charging', ['15:15', '15:30', '15:55']),
      card('R-2418', 'queued', ['16:40', '17:05', '18:05'], { clipOnAt: iso('14:00'), startedAt: null }),
    );
    const running = screen.getByRole('link', { name: /^R-2411/ }).textContent ?? '';
    expect(running).toMatch(/1\s*h\s*48/);
    expect(running).toContain('(15:15–15:55)');
    const queued = screen.getByRole('link', { name: /^R-2418/ }).textContent ?? '';
    expect(queued).toMatch(/3\s*h\s*05/);
    expect(queued).toContain('(16:40–18:05)');
    expect(queued).toContain('clip on at 14:00');
  });

  it.each([
    ['queued', {}, 'Checks before clipping on', '/checks'],
    ['check-due', {}, 'Enter the group voltages', '/check'],
    ['charging', {}, 'Log a reading', '/log'],
    ['charging', { nextHand: 'Swap to group 2' }, 'Swap to group 2', ''],
    ['resting', { nextHand: 'Switch A2 off' }, 'Switch A2 off', ''],
  ] as const)('the next step of a %s charge %j is %s', (stage, more, title, path) => {
    expect(nextStep(card('R-1', stage, null, more))).toEqual({ title, path: `/charges/R-1${path}` });
  });

  it('a resting charge whose charger is off only waits', () => {
    expect(nextStep(card('R-1', 'resting', null))).toBeNull();
  });
});

describe('the empty bench', () => {
  const spare = { where: 'shelf', reading: {} } as never;

  it('names what is missing for a first plan and who enters it', () => {
    const needs = needsOf({ chargers: [], types: [{} as never], spares: [] }, { equipment: false, stock: true })!;
    expect(needs.map(({ done }) => done)).toEqual([false, true, false]);
    render(<FirstPlan needs={needs} onGo={go} />);
    expect(screen.getByText('A manager enters it under Workshop.')).toBeTruthy();
    expect(screen.queryByRole('button', { name: /a charger/ })).toBeNull();
    fireEvent.click(screen.getByRole('button', { name: 'Enter one: a spare with its readings' }));
    expect(go).toHaveBeenLastCalledWith('/spares/new');
  });

  it('counts channels that are in use and spares on the shelf that were read', () => {
    const chargers = [
      { retired: false, channels: [{}, {}] },
      { retired: true, channels: [{}] },
    ] as never[];
    const needs = needsOf(
      { chargers, types: [{} as never], spares: [spare, { where: 'shelf', reading: null } as never] },
      {
        equipment: true,
        stock: true,
      },
    )!;
    expect(needs.map(({ detail }) => detail)).toEqual(['2 channels', '1 type', '1 on the shelf']);
  });
});
