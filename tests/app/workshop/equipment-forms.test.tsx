import { fireEvent, render, screen, waitFor, within } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import Charger from '@/app/(workshop)/workshop/chargers/[id]';
import ModuleType from '@/app/(workshop)/workshop/module-types/[id]';
import { ClientProvider } from '@/shared/client/client-provider';
import { queryClient } from '@/shared/client/query-client';
import { rememberSignedIn } from '@/shared/client/session-state';
import { ToastProvider } from '@/shared/ui/primitives/toast';
import { router } from '../../mocks/expo-router';
import { fakeServer, problem } from './server';

let server: ReturnType<typeof fakeServer>;
const open = (page: React.ReactNode) =>
  render(
    <ClientProvider>
      <ToastProvider>{page}</ToastProvider>
    </ClientProvider>,
  );
const field = (label: string) => screen.findByLabelText<HTMLInputElement>(label);
const type = async (label: string, text: string) => fireEvent.change(await field(label), { target: { value: text } });
const press = (name: string) => fireEvent.click(screen.getByRole('button', { name }));

beforeEach(() => {
  queryClient.clear();
  localStorage.clear();
  sessionStorage.clear();
  rememberSignedIn('p1');
  vi.mocked(router.back).mockClear();
  server = fakeServer('manager');
  server.answers['GET /api/meters'] = () => Response.json([]);
});
afterEach(() => vi.unstubAllGlobals());

const filled: Record<string, string> = {
  Name: '2-series 66 Ah',
  'Groups in series': '2',
  'Cells a group': '3',
  Rated: '66',
  'Charge to': '4,20 V',
  'Not below': '3.00',
  Floor: '2.5',
  'Current up to': '66',
  'Discharge up to': '66',
  'Charge from': '10',
  'Charge up to': '45',
};
const fillType = async (change: Record<string, string> = {}) => {
  for (const [label, text] of Object.entries({ ...filled, ...change })) await type(label, text);
  fireEvent.change(screen.getByLabelText('Chemistry'), { target: { value: 'nmc' } });
};

describe('a new module type', () => {
  it('chooses no chemistry by itself, and asks for it', async () => {
    open(<ModuleType />);
    await field('Name');
    expect((screen.getByLabelText('Chemistry') as HTMLSelectElement).value).toBe('');
    press('Save the type');
    expect((await screen.findAllByText('Choose or type this.')).length).toBeGreaterThan(0);
    expect(server.writes()).toEqual([]);
  });

  it.each([
    ['Charge to', '42.0', /42\s?V is over 5\s?V, the most for this\. A point in the wrong place\?/],
    ['Charge to', '4200', /4200 looks like millivolts: 4\.200\s?V\?/],
    ['Rated', '0', /0\s?Ah is too little\./],
    ['Groups in series', '2.5', /Groups in series is a whole number\./],
    ['Rated', 'sixty', /“sixty” is no number\./],
  ])('keeps %s %s as typed and says what to change', async (label, text, sentence) => {
    open(<ModuleType />);
    await type(label, text);
    press('Save the type');
    await screen.findByText(sentence);
    expect((await field(label)).value).toBe(text);
    expect(server.writes()).toEqual([]);
  });

  it('weighs its limits against each other', async () => {
    open(<ModuleType />);
    await fillType({ 'Charge to': '3.5', 'Not below': '3.6', Floor: '3.7' });
    press('Save the type');
    await screen.findByText('Must be under the charge limit.');
    await screen.findByText('The floor is not above the discharge limit.');
    expect(screen.getByText('2 fields need a change.')).toBeTruthy();
    expect(server.writes()).toEqual([]);
  });

  it('is sent as numbers, with what was left empty as unknown', async () => {
    server.answers['POST /api/module-types'] = (body) => Response.json({ ...(body as object), id: 't1', rev: 1 });
    open(<ModuleType />);
    await fillType();
    press('Save the type');
    await waitFor(() => expect(router.back).toHaveBeenCalledOnce());
    expect(server.writes()[0]?.body).toMatchObject({
      name: '2-series 66 Ah',
      chemistry: 'nmc',
      groupsInSeries: 2,
      chargeLimitVolts: 4.2,
      shelfVolts: null,
      resistanceMilliohm: null,
      resistanceKind: 'pulse-10s',
    });
  });

  it('puts a name that is taken at its field', async () => {
    const sentence = 'There is a type called 2-series 66 Ah already. Choose another name.';
    server.answers['POST /api/module-types'] = () => problem(409, sentence, { fields: { name: sentence } });
    open(<ModuleType />);
    await fillType();
    press('Save the type');
    await screen.findByText(sentence);
    expect((await field('Name')).getAttribute('aria-invalid')).toBe('true');
    expect(router.back).not.toHaveBeenCalled();
  });
});

describe('a new charger', () => {
  const inChannel = (name: string) => within(screen.getByRole('group', { name }));

  it('asks for the discharge current only of a channel that discharges, and says what is missing', async () => {
    open(<Charger />);
    await screen.findByRole('group', { name: 'Channel 1' });
    expect(screen.queryByLabelText('Discharge current')).toBeNull();
    fireEvent.click(screen.getByRole('checkbox', { name: 'Can discharge' }));
    expect(await field('Discharge current')).toBeTruthy();
    for (const [label, text] of [
      ['Current', '10'],
      ['Up to', '30'],
    ] as const)
      fireEvent.change(inChannel('Channel 1').getByLabelText(label), { target: { value: text } });
    fireEvent.change(screen.getAllByLabelText('Name')[0]!, { target: { value: 'Supply C' } });
    fireEvent.change(screen.getAllByLabelText('Name')[1]!, { target: { value: 'C2' } });
    press('Save the charger');
    await screen.findByText('A channel that discharges needs its current or its load resistor.');
    expect(server.writes()).toEqual([]);
  });

  it('begins a further channel as the last one but for its name, and sends both without a meter', async () => {
    server.answers['POST /api/chargers'] = (body) => Response.json({ ...(body as object), id: 'c1', rev: 1 });
    open(<Charger />);
    await screen.findByRole('group', { name: 'Channel 1' });
    fireEvent.change(screen.getAllByLabelText('Name')[0]!, { target: { value: 'Supply B' } });
    fireEvent.change(screen.getAllByLabelText('Name')[1]!, { target: { value: 'B1' } });
    for (const [label, text] of [
      ['Current', '20'],
      ['Up to', '30'],
    ] as const)
      fireEvent.change(inChannel('Channel B1').getByLabelText(label), { target: { value: text } });
    press('Add a channel');
    const second = await screen.findByRole('group', { name: 'Channel 2' });
    expect(within(second).getByLabelText<HTMLInputElement>('Current').value).toBe('20');
    fireEvent.change(within(second).getByLabelText('Name'), { target: { value: 'B2' } });
    press('Save the charger');
    await waitFor(() => expect(router.back).toHaveBeenCalledOnce());
    const body = server.writes()[0]?.body as { meterId: unknown; channels: Record<string, unknown>[] };
    expect(body.meterId).toBeNull();
    expect(body.channels.map(({ name, maxAmps, maxVolts, id }) => ({ name, maxAmps, maxVolts, id }))).toEqual([
      { name: 'B1', maxAmps: 20, maxVolts: 30, id: undefined },
      { name: 'B2', maxAmps: 20, maxVolts: 30, id: undefined },
    ]);
  });

  it('puts the server’s sentence at the channel it is about', async () => {
    const sentence = 'There is a channel called A1 already. Choose another name.';
    server.answers['POST /api/chargers'] = () => problem(409, sentence, { fields: { 'channels.0.name': sentence } });
    open(<Charger />);
    await screen.findByRole('group', { name: 'Channel 1' });
    fireEvent.change(screen.getAllByLabelText('Name')[0]!, { target: { value: 'Supply D' } });
    fireEvent.change(screen.getAllByLabelText('Name')[1]!, { target: { value: 'A1' } });
    for (const [label, text] of [
      ['Current', '20'],
      ['Up to', '30'],
    ] as const)
      fireEvent.change(inChannel('Channel A1').getByLabelText(label), { target: { value: text } });
    press('Save the charger');
    await screen.findByText(sentence);
    expect(inChannel('Channel A1').getByLabelText('Name').getAttribute('aria-invalid')).toBe('true');
    expect(screen.getAllByLabelText('Name')[0]!.getAttribute('aria-invalid')).toBeNull();
  });
});
