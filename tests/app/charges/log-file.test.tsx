import { fireEvent, screen, waitFor } from '@testing-library/react';
import { router } from 'expo-router';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import LogFile from '@/app/(workshop)/charges/[id]/log-file';
import type { LogPreviewDto } from '@/shared/contract/charge-log';
import { charge } from '../../shared/ui/charge/charges';
import { draw, emptyDevice, press, problem, serverWith } from './bench-of';

vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => ({ id: 'c1' }),
}));

const { sendForm } = vi.hoisted(() => ({ sendForm: vi.fn() }));
vi.mock('@/shared/client/send-form', () => ({
  sendForm: (...sent: unknown[]) => sendForm(...sent) as Promise<Response>,
}));

const runs = charge('charging');
const preview: LogPreviewDto = {
  choices: {
    separator: ';',
    decimal: ',',
    headerLine: 1,
    columns: [
      { use: 'time', unit: 's' },
      { use: 'volts', unit: 'V' },
      { use: 'none', unit: '' },
    ],
    zeroAt: null,
    takenAt: null,
  },
  columns: [
    { name: 'Zeit', samples: ['0', '1'] },
    { name: 'Spannung', samples: ['11,60', '11,61'] },
    { name: 'Strom', samples: ['10,0', '10,0'] },
  ],
  rows: [{ line: 2, at: '2026-06-09T08:00:00.000Z', terminalVolts: 11.6, amps: null, celsius: null, groupVolts: null }],
  lines: 1802,
  readings: 1800,
  firstAt: '2026-06-09T08:00:00.000Z',
  lastAt: '2026-06-09T08:30:00.000Z',
  stored: 5,
  there: 1,
  within: { terminalVolts: 0.004, amps: 0.02, celsius: 0.3, groupVolts: 0.001, mostS: 600 },
  leftOut: [{ reason: 'The time cannot be read.', count: 15, lines: [3, 4, 5] }],
  problem: null,
};
const drop = () => {
  const dropped = new Event('drop', { bubbles: true, cancelable: true });
  const file = new File(['Zeit;Spannung'], 'bench 2.csv');
  fireEvent(document, Object.assign(dropped, { dataTransfer: { files: [file] } }));
};

const addresses = () => sendForm.mock.calls.map(([address]) => new URL(String(address), 'http://bench').pathname);
const choicesSent = () => {
  const { searchParams } = new URL(String(sendForm.mock.calls.at(-1)![0]), 'http://bench');
  return searchParams.get('choices');
};

beforeEach(() => {
  emptyDevice();
  sendForm.mockReset();
  vi.mocked(router.back).mockClear();
});
afterEach(() => vi.unstubAllGlobals());

describe('a logger’s file', () => {
  it('of a charge that is over says why none is taken', async () => {
    serverWith(charge('fitted'));
    draw(<LogFile />);
    expect(await screen.findByText('Readings belong to a charge that is under way. This one is not.')).toBeTruthy();
    expect(screen.queryByText('Choose a file')).toBeNull();
  });

  it('dropped, is shown as it was understood; a changed column is asked for anew; confirmed, it goes back to the charge', async () => {
    serverWith(runs);
    sendForm.mockImplementation(() => Promise.resolve(Response.json(preview)));
    draw(<LogFile />);
    await press('Choose a file');
    drop();
    expect(await screen.findByText('The time cannot be read. (lines 3, 4, 5 and 12 more)')).toBeTruthy();
    expect(choicesSent()).toBeNull();
    expect(await press('Add 4 readings')).toBeTruthy();

    const changed = {
      ...preview.choices,
      columns: [...preview.choices.columns.slice(0, 2), { use: 'amps', unit: 'A' }],
    };
    sendForm.mockImplementation(() => Promise.resolve(Response.json({ ...preview, choices: changed, stored: 9 })));
    fireEvent.change(screen.getByLabelText('Strom'), { target: { value: 'amps' } });
    await waitFor(() => expect(choicesSent()).toBe(JSON.stringify(changed)));
    const add = await press('Add 8 readings');
    sendForm.mockImplementation(() =>
      Promise.resolve(Response.json({ charge: { ...runs, rev: 2 }, added: 8, there: 1 })),
    );
    fireEvent.click(add);
    await waitFor(() => expect(router.back).toHaveBeenCalled());
    expect(addresses()).toEqual(['log-preview', 'log-preview', 'log-file'].map((part) => `/api/charges/c1/${part}`));
  });

  it('refused, says why, and keeps what was chosen for another try', async () => {
    serverWith(runs);
    sendForm.mockImplementation(() => Promise.resolve(Response.json(preview)));
    draw(<LogFile />);
    await press('Choose a file');
    drop();
    await press('Add 4 readings');
    sendForm.mockImplementation(() => Promise.resolve(problem(409, 'Another file of yours is still on its way.')));
    fireEvent.change(screen.getByLabelText('Strom'), { target: { value: 'celsius' } });
    expect(await screen.findByText('Another file of yours is still on its way.')).toBeTruthy();
    expect(screen.getByLabelText<HTMLSelectElement>('Strom').value).toBe('celsius');
    sendForm.mockImplementation(() =>
      Promise.resolve(Response.json({ ...preview, problem: 'No column is the time.' })),
    );
    fireEvent.click(await press('Read it again'));
    await waitFor(() => expect(choicesSent()).toContain('celsius'));
    expect(await screen.findByText('No column is the time.')).toBeTruthy();
    expect((await press('Add the readings')).getAttribute('aria-disabled')).toBe('true');
  });
});
