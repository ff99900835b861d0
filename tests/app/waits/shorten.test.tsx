import { fireEvent, screen, waitFor, within } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import Waits from '@/app/(workshop)/waits/index';
import type { ReplayDto, ReplayJobDto } from '@/shared/contract/waits-replay';
import { draw, emptyDevice, problem } from '../charges/bench-of';
import { now, serverOf } from './waits-of';

vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => ({}),
  useRouter: () => ({ push: vi.fn(), navigate: vi.fn(), replace: vi.fn(), setParams: vi.fn() }),
}));

beforeEach(() => {
  emptyDevice();
  vi.useFakeTimers({ now, toFake: ['Date'] });
});
afterEach(() => {
  vi.useRealTimers();
  vi.restoreAllMocks();
  vi.unstubAllGlobals();
});

const days = { from: '2026-04-20', to: '2026-06-09' };
const few = { enough: false as const, needs: 20, has: 12 };
const replayOf = (lost: number, p50: number): ReplayDto => ({
  ...{ enough: true, charges: 107, unplaced: 0 },
  lostHoursPerWeek: { value: lost, low: lost - 5, high: lost + 5 },
  p50WaitHours: { value: p50, low: p50 - 0.25, high: p50 + 0.25 },
  p90WaitHours: { value: 2 * p50, low: 2 * p50, high: 2 * p50 },
});
const jobOf = (change: Partial<ReplayJobDto>): ReplayJobDto => ({
  ...{ id: 'job-1', kind: 'what-if', state: 'running', beganAt: '2026-06-09T13:42:00.000Z', progress: 0.45 },
  ...{ whatIf: null, shelf: null, channels: null, problem: null },
  ...change,
});

async function open(path: string, begun: ReplayJobDto, over: ReplayJobDto) {
  const server = serverOf();
  server.answers[`POST /api/waits/${path}`] = () => Response.json(begun, { status: 202 });
  server.answers['GET /api/waits/replays/job-1'] = () => Response.json(over);
  server.answers['POST /api/waits/replays/job-1/cancel'] = () => Response.json({ ...begun, state: 'cancelled' });
  draw(<Waits />);
  return server;
}
const part = async (name: string) => within(await screen.findByRole('region', { name }));
const plain = (element: Element | null) => (element?.textContent ?? '').replace(/\s/g, ' ');

describe('what would shorten it', () => {
  const levers = [{ startAtBooking: true }, { lookInMinutes: 90 }];

  it('replays two ticked levers alone and together, each with its interval', async () => {
    const whatIf = {
      now: replayOf(49, 3.4),
      answers: [
        { levers: levers[0]!, replay: replayOf(26, 2.1) },
        { levers: levers[1]!, replay: replayOf(41, 3) },
      ],
      together: replayOf(17, 1.5),
      leftOut: [{ charges: 4, because: 'no channel of theirs is here any more.' }],
    };
    const server = await open('what-if', jobOf({}), jobOf({ state: 'done', progress: 1, whatIf }));
    const shorten = await part('What would shorten it');
    fireEvent.click(shorten.getByRole('checkbox', { name: /^Start at booking/ }));
    fireEvent.click(shorten.getByRole('checkbox', { name: /^Another look-in interval/ }));
    fireEvent.change(shorten.getByLabelText('Look in every'), { target: { value: '90' } });
    fireEvent.click(shorten.getByRole('button', { name: 'Replay the charges' }));
    expect(await shorten.findByText(/Replayed so far: 45\s%/)).toBeTruthy();
    await waitFor(() => expect(shorten.getByText(/now 49 \(44–54\), over 107 charges/)).toBeTruthy(), {
      timeout: 4000,
    });
    expect(server.writes()[0]?.body).toEqual({ ...days, questions: levers, together: true });
    const words = shorten.getAllByText(/^One charge: half under/).map(plain);
    expect(words).toEqual([
      'One charge: half under 2 h 06 (1:51–2:21), 9 of 10 under 4 h 12.',
      'One charge: half under 3 h 00 (2:45–3:15), 9 of 10 under 6 h 00.',
      'One charge: half under 1 h 30 (1:15–1:45), 9 of 10 under 3 h 00.',
    ]);
    expect(shorten.getByText(/^26 \(21–31\) h$/)).toBeTruthy();
    expect(shorten.getByText('All 2 ticked together')).toBeTruthy();
    expect(shorten.getByText('Left out: 4 charges, no channel of theirs is here any more.')).toBeTruthy();
    // Something else typed is another question: its old number goes.
    fireEvent.change(shorten.getByLabelText('Look in every'), { target: { value: '60' } });
    expect(shorten.getAllByText(/^One charge: half under/)).toHaveLength(1);
    expect(shorten.queryByText('All 2 ticked together')).toBeNull();
  });

  it('says needs 20 charges, has 12, and shows no number', async () => {
    const whatIf = { now: few, answers: [{ levers: levers[0]!, replay: few }], together: null, leftOut: [] };
    await open('what-if', jobOf({ state: 'done', progress: 1, whatIf }), jobOf({ state: 'done', progress: 1, whatIf }));
    const shorten = await part('What would shorten it');
    fireEvent.click(shorten.getByRole('checkbox', { name: /^Start at booking/ }));
    fireEvent.click(shorten.getByRole('button', { name: 'Replay the charges' }));
    expect(await shorten.findAllByText('Needs 20 charges, has 12.')).toHaveLength(2);
    expect(shorten.queryByText(/^One charge/)).toBeNull();
  });

  it('asks for nothing before a lever is ticked and told all, and says what is missing', async () => {
    const server = await open('what-if', jobOf({}), jobOf({}));
    const shorten = await part('What would shorten it');
    const go = shorten.getByRole('button', { name: 'Replay the charges' });
    expect(go.getAttribute('aria-disabled')).toBe('true');
    expect(shorten.getByText('Tick at least one.')).toBeTruthy();
    fireEvent.click(shorten.getByRole('checkbox', { name: /^Other amps/ }));
    fireEvent.click(go);
    expect(await shorten.findByText('Choose a channel.')).toBeTruthy();
    expect(shorten.getByText('Type amps, 0.1 to 1,000.')).toBeTruthy();
    expect(shorten.getByText('2 fields are missing.')).toBeTruthy();
    expect(server.writes()).toEqual([]);
  });

  it('is cancelled while it goes on, and says the server’s sentence where it was refused', async () => {
    const server = await open('what-if', jobOf({}), jobOf({}));
    const shorten = await part('What would shorten it');
    fireEvent.click(shorten.getByRole('checkbox', { name: /^Overnight allowed/ }));
    fireEvent.click(shorten.getByRole('button', { name: 'Replay the charges' }));
    fireEvent.click(await shorten.findByRole('button', { name: 'Cancel the replay' }));
    expect(await shorten.findByText('Cancelled. Nothing was changed.')).toBeTruthy();
    expect(server.writes().map(({ path }) => path)).toEqual(['/api/waits/what-if', '/api/waits/replays/job-1/cancel']);
    server.answers['POST /api/waits/what-if'] = () => problem(409, 'Three calculations go on already.');
    fireEvent.click(shorten.getByRole('button', { name: 'Replay the charges' }));
    expect(plain(await shorten.findByRole('alert'))).toMatch(/Three calculations go on already/);
  });
});

describe('the shelf voltage of a type', () => {
  it('marks the best, says what is on the shelf now and what bringing it there costs, and has its table', async () => {
    const shelf = {
      ...{ moduleTypeId: 't1', typeName: '2-series 66 Ah', enough: true as const, charges: 104 },
      curve: [
        { volts: 3.6, meanMinutes: 120 },
        { volts: 3.7, meanMinutes: 80 },
        { volts: 3.8, meanMinutes: 95 },
      ],
      best: { volts: 3.7, meanMinutes: 80 },
      now: { volts: 3.6, meanMinutes: 120, spares: 7 },
      window: { lowVolts: 3.6, highVolts: 3.8 },
      stockChargerHours: 14.4,
    };
    const done = jobOf({ kind: 'shelf', state: 'done', progress: 1, shelf });
    const server = await open('shelf', done, done);
    const region = await part('Shelf voltage');
    await region.findByRole('option', { name: '2-series 66 Ah' });
    fireEvent.change(region.getByLabelText('Spares of'), { target: { value: 't1' } });
    fireEvent.click(region.getByRole('button', { name: 'Find the shelf voltage' }));
    expect(await region.findByText(/^Best at 3\.700\sV: 1\sh\s20 on the charger\.$/)).toBeTruthy();
    expect(region.getByText(/^Now 3\.600\sV, the middle of 7 spares: 2\sh\s00\.$/)).toBeTruthy();
    expect(region.getByText(/^Bringing the present stock there takes 14\sh of the chargers\.$/)).toBeTruthy();
    expect(server.writes()[0]?.body).toEqual({ ...days, moduleTypeId: 't1' });
    fireEvent.click(region.getByRole('button', { name: 'Minutes against volts of a group, as a table' }));
    expect(region.getAllByRole('row').map(plain)).toEqual([
      ...['Shelf voltsOn the charger', '3.600 V2 h 00', '3.700 V1 h 20', '3.800 V1 h 35'],
    ]);
  });
});

describe('the channels needed', () => {
  it('are found by replay for a wished wait, with the formula’s figure labelled as a rough check', async () => {
    const channels = {
      ...{ enough: true as const, present: 1, channels: 3, roughChannels: 2, leftOut: [] },
      replay: replayOf(20, 2),
    };
    const done = jobOf({ kind: 'channels', state: 'done', progress: 1, channels });
    const server = await open('channels-needed', done, done);
    const region = await part('Channels needed');
    await region.findByRole('option', { name: 'A1, A' });
    fireEvent.click(region.getByRole('button', { name: 'Find the number of channels' }));
    expect(await region.findByText('Type hours, 0.1 to 1,000.')).toBeTruthy();
    expect(server.writes()).toEqual([]);
    fireEvent.change(region.getByLabelText('Like channel'), { target: { value: 'a1' } });
    fireEvent.change(region.getByLabelText('9 of 10 ready within'), { target: { value: '4,5' } });
    fireEvent.click(region.getByRole('button', { name: 'Find the number of channels' }));
    expect(
      await region.findByText(/^like A1, A; now 1\. 9 of 10 are then ready under 4\sh\s00, half under 2\sh\s00/),
    ).toBeTruthy();
    expect(region.getByText(/^Rough check by Erlang’s formula, all kinds of channels together: 2\./)).toBeTruthy();
    expect(server.writes()[0]?.body).toEqual({ ...days, channelId: 'a1', wishedP90Hours: 4.5 });
  });
});
