import { fireEvent, screen, waitFor } from '@testing-library/react';
import { router } from 'expo-router';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import Log from '@/app/(workshop)/charges/[id]/log';
import { waitingQueue } from '@/shared/client/waiting/waiting';
import { charge, reading } from '../../shared/ui/charge/charges';
import { draw, emptyDevice, input, press, problem, serverWith } from './bench-of';

const params = vi.hoisted(() => ({ now: { id: 'c1' } as Record<string, string> }));
vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => params.now,
}));

const runs = charge('charging');
const fill = async (values: Record<string, string>) => {
  for (const [label, text] of Object.entries(values)) fireEvent.change(await input(label), { target: { value: text } });
};

beforeEach(() => {
  emptyDevice();
  params.now = { id: 'c1' };
  vi.mocked(router.back).mockClear();
});
afterEach(() => vi.unstubAllGlobals());

describe('logging a reading', () => {
  it('keeps a bad number with its sentence, goes to the first one and says how many; nothing is sent', async () => {
    const server = serverWith(runs);
    draw(<Log />);
    await fill({ 'At the clips': 'eleven', Current: '10.0 V', Module: '24' });
    fireEvent.click(await press('Log it'));
    expect(await screen.findByText('“eleven” is no number. Type it like 3.968.')).toBeTruthy();
    expect(screen.getByText('“10.0 V” is in another unit. Type it in A.')).toBeTruthy();
    expect(await screen.findByText('2 fields need a change.')).toBeTruthy();
    const clips = await input('At the clips');
    expect(clips.value).toBe('eleven');
    await waitFor(() => expect(document.activeElement).toBe(clips));
    expect(server.writes()).toEqual([]);
  });

  it('asks once about what is odd: read again empties and focuses that field, and it reads so sends it', async () => {
    const server = serverWith(runs);
    server.answers['POST /api/charges/c1/readings'] = () => Response.json({ ...runs, rev: 2 });
    draw(<Log />);
    await fill({ 'At the clips': '11.68', 'Group 1': '3.896', 'Group 2': '3.895', 'Group 3': '3.849' });
    fireEvent.click(await press('Log it'));
    expect(await screen.findByText('G3 is 41 mV under what was expected.')).toBeTruthy();
    expect(server.writes()).toEqual([]);
    fireEvent.click(await press('Read group 3 again'));
    const third = await input('Group 3');
    await waitFor(() => expect(document.activeElement).toBe(third));
    expect(third.value).toBe('');
    await fill({ 'Group 3': '3,849' });
    fireEvent.click(await press('Log it'));
    fireEvent.click(await press('It reads so: log it'));
    await waitFor(() => expect(router.back).toHaveBeenCalled());
    expect(server.writes()[0]!.body).toMatchObject({ terminalVolts: 11.68, groupVolts: [3.896, 3.895, 3.849] });
  });

  it('puts the server’s sentence at its field', async () => {
    const server = serverWith(charge('charging', { amps: null, groups: [] }));
    server.answers['POST /api/charges/c1/readings'] = () =>
      problem(400, 'Some of this cannot be taken as it is.', {
        fields: { amps: '120.0 A is over twice the planned 10.0 A. A point in the wrong place?' },
      });
    draw(<Log />);
    await fill({ Current: '120' });
    fireEvent.click(await press('Log it'));
    const sentence = await screen.findByText('120.0 A is over twice the planned 10.0 A. A point in the wrong place?');
    const current = await input('Current');
    expect(current.getAttribute('aria-describedby')?.split(' ')).toContain(sentence.id);
    expect(current.value).toBe('120');
  });

  it('without a connection keeps it on this device with the time it was read', async () => {
    const server = serverWith(runs);
    server.answers['POST /api/charges/c1/readings'] = () => {
      throw new TypeError('Failed to fetch');
    };
    draw(<Log />);
    await fill({ Current: '10.0' });
    fireEvent.click(await press(/^(Log it|Keep it on this device)$/));
    expect(await screen.findAllByText('Kept on this device until the connection is back.')).not.toEqual([]);
    expect(waitingQueue.store.get()).toMatchObject([{ chargeId: 'c1', input: { amps: 10 }, refused: null }]);
    expect(Date.parse(waitingQueue.store.get()[0]!.input.at)).toBeGreaterThan(0);
  });

  it('corrects a reading from what it was, with the reason, and not one that somebody else may correct only', async () => {
    params.now = { id: 'c1', correct: '13:36' };
    const server = serverWith(charge('charging', { readings: [reading('13:36')] }));
    server.answers['PATCH /api/charges/c1/readings/13:36'] = () => Response.json({ ...runs, rev: 2 });
    draw(<Log />);
    const clips = await input('At the clips');
    expect([clips.value, (await input('Current')).value]).toEqual(['11.64', '10']);
    await fill({ 'At the clips': '11.46', 'What was wrong': 'Two digits the wrong way round' });
    fireEvent.click(await press('Put it right'));
    await waitFor(() => expect(server.writes()).toHaveLength(1));
    expect(server.writes()[0]!.body).toMatchObject({
      terminalVolts: 11.46,
      amps: 10,
      at: reading('13:36').at,
      reason: 'Two digits the wrong way round',
    });
  });

  it('says so where nothing can be logged any more', async () => {
    serverWith(charge('ready'));
    draw(<Log />);
    expect(await screen.findByText('Readings belong to a charge that is under way.')).toBeTruthy();
    expect(screen.queryByLabelText('At the clips')).toBeNull();
  });
});
