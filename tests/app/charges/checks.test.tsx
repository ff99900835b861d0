import { fireEvent, screen, waitFor } from '@testing-library/react';
import { router } from 'expo-router';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import Checks from '@/app/(workshop)/charges/[id]/checks';
import { charge, checks, iso } from '../../shared/ui/charge/charges';
import { draw, emptyDevice, input, press, problem, reasonOf, serverWith } from './bench-of';

vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => ({ id: 'c1' }),
}));

const ines = { id: 'ines', name: 'Ines Marlow' };
const yes = { answer: 'yes', answeredBy: ines, answeredAt: iso('13:38') } as const;
const queued = (change: Parameters<typeof checks>[0] = {}, more: Parameters<typeof charge>[1] = {}) =>
  charge('queued', {
    startedAt: null,
    clipOnAt: iso('14:00'),
    checks: checks(change),
    startBlockedBy: '6 answers still to come. What the readings rule out is locked.',
    ...more,
  });
const allYes = {
  isolation: yes,
  polarity: yes,
  condition: yes,
  ceiling: yes,
  ventilation: yes,
  attendance: yes,
} as const;

beforeEach(() => {
  emptyDevice();
  vi.mocked(router.push).mockClear();
  vi.mocked(router.replace).mockClear();
});
afterEach(() => vi.unstubAllGlobals());

describe('the checks before clipping on', () => {
  it('has what to do at smoke one tap away', async () => {
    serverWith(queued());
    draw(<Checks />);
    fireEvent.click(await press('Smoke, smell or swelling now'));
    expect(await screen.findByText(/do not clip it on, and keep away/)).toBeTruthy();
    expect(await screen.findByText(/lithium-ion, NMC/)).toBeTruthy();
  });

  it('show one open at a time, nothing of it chosen, and the timer cannot be started: the reason stands at the button', async () => {
    serverWith(queued());
    draw(<Checks />);
    const answer = await press('Yes to isolation. Isolation');
    expect(answer.getAttribute('aria-pressed')).toBeNull();
    expect(answer.getAttribute('aria-checked')).toBeNull();
    expect(screen.queryByRole('button', { name: 'Yes to polarity. Polarity' })).toBeNull();
    const start = await press('Clip on and start the timer');
    expect(start.getAttribute('aria-disabled')).toBe('true');
    expect(reasonOf(start)).toBe('6 answers still to come. What the readings rule out is locked.');
  });

  it('open the next one after an answer, and an answered one again by its change', async () => {
    const server = serverWith(queued());
    server.answers['POST /api/charges/c1/checks'] = () => {
      server.becomes(queued({ isolation: yes }, { rev: 2 }));
      return Response.json(queued({ isolation: yes }, { rev: 2 }));
    };
    draw(<Checks />);
    fireEvent.click(await press('Yes to isolation. Isolation'));
    await press('Yes to polarity. Polarity');
    expect(server.writes()[0]!.body).toMatchObject({ code: 'isolation', answer: 'yes', asked: 'Isolation?' });
    expect(screen.getByText(/^Ines .*13:38$/)).toBeTruthy();
    fireEvent.click(await press('Change the answer to isolation'));
    await press('No to isolation. Isolation');
    expect(screen.queryByRole('button', { name: 'Yes to polarity. Polarity' })).toBeNull();
  });

  it('say why an answer was not taken, and keep the question open', async () => {
    const server = serverWith(queued());
    server.answers['POST /api/charges/c1/checks'] = () => problem(409, 'R-2411 is charging. Its checks are closed.');
    draw(<Checks />);
    fireEvent.click(await press('Yes to isolation. Isolation'));
    expect(await screen.findByText('R-2411 is charging. Its checks are closed.')).toBeTruthy();
    await press('No to isolation. Isolation');
  });

  it('offer a new reading where the last one rules it out, and no way to tick it', async () => {
    const cold = {
      by: 'ruled-out',
      answer: 'no',
      question: '7 °C, allowed 10–45 °C',
      detail: 'Ruled out by the reading at 13:37. Locked.',
    } as const;
    const server = serverWith(
      queued({ ...allYes, temperature: cold }, { startBlockedBy: 'Too cold to charge. That cannot be ticked away.' }),
    );
    server.answers['POST /api/spares/s1/readings'] = () => problem(503, 'Try again in a moment.');
    draw(<Checks />);
    const start = await press('Clip on and start the timer');
    expect(start.getAttribute('aria-disabled')).toBe('true');
    expect(screen.queryByRole('button', { name: /Temperature/ })).toBeNull();
    fireEvent.click(await press('Read it again'));
    const celsius = await input('Module is at');
    fireEvent.change(celsius, { target: { value: 'warm' } });
    fireEvent.click(await press('Keep the reading'));
    expect(await screen.findByText('“warm” is no number. Type it like 3.968.')).toBeTruthy();
    expect(celsius.value).toBe('warm');
    expect(server.writes()).toEqual([]);
  });

  it('lead to another plan where the channel is taken, with the target as it was typed', async () => {
    serverWith(
      queued(allYes, { startBlockedBy: 'A2 is taken by R-2405. Wait until it is free, or plan on another channel.' }),
    );
    draw(<Checks />);
    fireEvent.click(await press('Plan another way'));
    const [path] = vi.mocked(router.push).mock.calls[0]!;
    const url = new URL(String(path), 'https://bidewell.example.com');
    expect(url.pathname).toBe('/plan');
    expect(Object.fromEntries(url.searchParams)).toEqual({
      spare: 's1',
      insteadOf: 'c1',
      target: '3.906',
      repair: 'R-2411',
      meter: 'm1',
      celsius: '21',
      tolerance: '5',
    });
  });

  it('lead to a new plan in place of this one where the spare reads something else, before anything is answered', async () => {
    serverWith(queued({}, { startBlockedBy: 'It reads 3.900 V now. Plan it again.', planAgain: true }));
    draw(<Checks />);
    const start = await press('Clip on and start the timer');
    expect(reasonOf(start)).toBe('It reads 3.900 V now. Plan it again.');
    fireEvent.click(await press('Plan it again'));
    const [path] = vi.mocked(router.push).mock.calls[0]!;
    expect(String(path)).toMatch(/^\/plan\?spare=s1&insteadOf=c1&target=3\.906&/);
  });

  it('start with the revision that was seen; where somebody was quicker the sentence and the present state come', async () => {
    const ready = queued(allYes, { startBlockedBy: null, rev: 7 });
    const server = serverWith(ready);
    const taken = 'A2 is taken by R-2405. Wait until it is free, or plan on another channel.';
    server.answers['POST /api/charges/c1/start'] = () => {
      server.becomes({ ...ready, startBlockedBy: taken, rev: 8 });
      return problem(409, taken, { code: 'channel_taken', present: { title: 'R-2405', channelName: 'A2' } });
    };
    draw(<Checks />);
    fireEvent.click(await press('Clip on and start the timer'));
    expect(await screen.findByText(taken)).toBeTruthy();
    expect(server.writes()[0]!.rev).toBe('"7"');
    await press('Plan another way');
    expect((await press('Clip on and start the timer')).getAttribute('aria-disabled')).toBe('true');
    expect(router.replace).not.toHaveBeenCalled();
  });

  it('go on to the live charge once the timer runs', async () => {
    const server = serverWith(queued(allYes, { startBlockedBy: null }));
    server.answers['POST /api/charges/c1/start'] = () => Response.json(charge('charging', { rev: 2 }));
    draw(<Checks />);
    fireEvent.click(await press('Clip on and start the timer'));
    await waitFor(() => expect(router.replace).toHaveBeenCalledWith('/charges/c1'));
  });
});
