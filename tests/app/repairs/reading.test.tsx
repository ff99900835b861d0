import { fireEvent, screen, waitFor } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import PackReading from '@/app/(workshop)/repairs/[id]/reading';
import { draw, emptyDevice, meters, press } from '../charges/bench-of';
import { fakeServer, problem } from '../workshop/server';
import { repairOf } from './read-repair-of';

const gone = vi.fn();
vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => ({ id: 'r1' }),
  useRouter: () => ({ canGoBack: () => false, replace: vi.fn(), dismissTo: gone, push: vi.fn(), back: vi.fn() }),
}));

let server: ReturnType<typeof fakeServer>;
beforeEach(() => {
  emptyDevice();
  gone.mockClear();
  server = fakeServer('technician');
  server.answers['GET /api/repairs/r1'] = () => Response.json(repairOf());
  server.answers['GET /api/meters'] = () => Response.json(meters);
  server.answers['POST /api/repairs/r1/readings'] = () => Response.json(repairOf({ rev: 4 }));
});
afterEach(() => vi.unstubAllGlobals());

const field = (group: number) => screen.findByLabelText<HTMLInputElement>(`Group ${group}, volts`);
const type = async (group: number, text: string) => fireEvent.change(await field(group), { target: { value: text } });
const save = async () => fireEvent.click(await press('Save the reading'));

describe('typing the groups', () => {
  it('walks them by the next key, names a skipped one before saving, and sends all four in their order', async () => {
    draw(<PackReading />);
    await type(1, '3,950');
    fireEvent.click(await press('On to G2'));
    fireEvent.click(await press('Skip G2'));
    await type(3, '3,870');
    fireEvent.click(await press('On to G4'));
    await type(4, '3,950');
    await save();
    expect((await screen.findByRole('alert')).textContent).toBe('G2 is open. Type it before you save.');
    expect(server.writes()).toEqual([]);
    await type(2, '3,951');
    await save();
    await waitFor(() => expect(gone).toHaveBeenCalledWith('/repairs/r1'));
    expect(server.writes()[0]!.body).toMatchObject({
      groupVolts: [3.95, 3.951, 3.87, 3.95],
      stage: 'arrival',
      balanceCount: null,
      source: 'typed',
    });
  });

  it('types with its own keys and rubs out', async () => {
    draw(<PackReading />);
    for (const key of ['3', 'Decimal mark', '9', '4', '4', 'Rub out', '9']) fireEvent.click(await press(key));
    expect((await field(1)).value).toBe('3.949');
  });

  it('keeps what was typed over a reload', async () => {
    const first = draw(<PackReading />);
    await type(1, '3.955');
    first.unmount();
    draw(<PackReading />);
    expect((await field(1)).value).toBe('3.955');
  });

  it('keeps everything where the server refuses, and says its sentence', async () => {
    server.answers['POST /api/repairs/r1/readings'] = () =>
      problem(400, 'No.', { fields: { 'groupVolts.2': 'G3: 3.87 V is under the type’s 3.90 V.' } });
    draw(<PackReading />);
    for (const [group, text] of ['3.95', '3.951', '3.87', '3.95'].entries()) {
      await type(group + 1, text);
      if (group < 3) fireEvent.click(await press(`On to G${group + 2}`));
    }
    await save();
    expect((await screen.findByRole('alert')).textContent).toBe('G3: 3.87 V is under the type’s 3.90 V.');
    expect((await field(4)).value).toBe('3.95');
  });
});

describe('pasting a table', () => {
  const paste = async (text: string) => {
    draw(<PackReading />);
    fireEvent.click(await screen.findByRole('radio', { name: 'Paste' }));
    fireEvent.change(await screen.findByLabelText('Paste the table'), { target: { value: text } });
  };

  it('says what was understood and sends it only on Save', async () => {
    await paste('group;mV\n1;3950\n2;3951\n3;3870\n4;3950');
    expect(
      await screen.findByText('4 groups understood, in millivolts, one header line skipped. Right?', undefined, {
        timeout: 20_000,
      }),
    ).toBeTruthy();
    expect(screen.getByText('header, skipped')).toBeTruthy();
    expect(server.writes()).toEqual([]);
    await save();
    await waitFor(() => expect(gone).toHaveBeenCalled());
    expect(server.writes()[0]!.body).toMatchObject({ groupVolts: [3.95, 3.951, 3.87, 3.95], source: 'pasted' });
  });

  it('names the line that was not understood and sends nothing', async () => {
    await paste('group;mV\n1;3950\n2;?\n3;3870\n4;3950');
    expect(await screen.findByText('Line 3:', { exact: false }, { timeout: 20_000 })).toBeTruthy();
    await save();
    expect(server.writes()).toEqual([]);
    expect((await screen.findByLabelText<HTMLTextAreaElement>('Paste the table')).value).toContain('2;?');
  });
});

it('says that the repair could not be read, and reads it again', async () => {
  server.answers['GET /api/repairs/r1'] = () => problem(404, 'This repair is not here.');
  draw(<PackReading />);
  expect(await screen.findByText('The repair could not be read.')).toBeTruthy();
});
