import { fireEvent, screen, waitFor } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import SecondSource from '@/app/(workshop)/repairs/[id]/second-source';
import type { Role } from '@/shared/contract/roles';
import type { RepairPageDto } from '@/shared/contract/repair';
import { draw, emptyDevice, meters, press } from '../charges/bench-of';
import { fakeServer } from '../workshop/server';
import { reading, repairOf, source } from './read-repair-of';

const gone = vi.fn();
const replaced = vi.fn();
vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => ({ id: 'r1' }),
  useRouter: () => ({ canGoBack: () => false, replace: replaced, dismissTo: gone, push: vi.fn(), back: vi.fn() }),
}));

let server: ReturnType<typeof fakeServer>;
let present: RepairPageDto;
const begin = (role: Role, repair: RepairPageDto) => {
  present = repair;
  server = fakeServer(role);
  server.answers['GET /api/repairs/r1'] = () => Response.json(present);
  server.answers['GET /api/meters'] = () => Response.json(meters);
  server.answers['GET /api/chargers'] = () => Response.json([{ id: 'c1', meterId: 'm1' }]);
  draw(<SecondSource />);
};
beforeEach(() => {
  emptyDevice();
  gone.mockClear();
});
afterEach(() => vi.unstubAllGlobals());

const type = async (label: string, text: string) =>
  fireEvent.change(await screen.findByLabelText(label), { target: { value: text } });

describe('measuring the suspected module', () => {
  it('agrees at 2 mV, disagrees at 80 mV, and sends what the meter shows', async () => {
    begin('technician', repairOf({ readings: [reading()] }));
    await type('G3', '3,872');
    await type('G4', '3,951');
    expect(await screen.findByText('The meter agrees with the pack at module 2.')).toBeTruthy();
    await type('G3', '3,950');
    expect(await screen.findByText(/^The meter disagrees with the pack: G3 by 80.mV\.$/)).toBeTruthy();
    // m1 is the display of a charger: it cannot read a module in the pack.
    const offered = [...screen.getByLabelText<HTMLSelectElement>('Read with').options].map(({ value }) => value);
    expect(offered).toContain('m2');
    expect(offered).not.toContain('m1');
    fireEvent.change(screen.getByLabelText('Read with'), { target: { value: 'm2' } });
    server.answers['POST /api/repairs/r1/second-source'] = () => {
      present = repairOf({ readings: [reading()], sources: [source({ pointsTo: null })], rev: 4 });
      return Response.json(present);
    };
    fireEvent.click(await press('Save the second source'));
    expect(await screen.findByText(/Someone must decide before it goes on/)).toBeTruthy();
    expect(server.writes()[0]!.body).toMatchObject({
      ...{ readingId: 'read1', modulePosition: '2', groupVolts: [3.95, 3.951] },
      ...{ meterId: 'm2', healthyGroup: null, pointsTo: null },
    });
  });

  it('takes a meter’s offset of 30 mV out by one healthy group', async () => {
    begin('technician', repairOf({ readings: [reading()] }));
    await type('G3', '3.900');
    await type('G4', '3.980');
    expect(await screen.findByText(/^The meter disagrees/)).toBeTruthy();
    await type('Healthy group', '1');
    await type('Its volts', '3.980');
    expect(await screen.findByText('The meter agrees with the pack at module 2.')).toBeTruthy();
  });

  it('names the group that nobody measured and sends nothing', async () => {
    begin('technician', repairOf({ readings: [reading()] }));
    await type('G3', '3,872');
    fireEvent.click(await press('Save the second source'));
    expect((await screen.findByRole('alert')).textContent).toBe('Type what the meter shows at G4.');
    expect(server.writes()).toEqual([]);
  });
});

describe('where the two disagree', () => {
  const torn = () => repairOf({ readings: [reading()], sources: [source()] });

  it('a foreman decides with a reason; nothing is preselected', async () => {
    begin('foreman', torn());
    expect(await screen.findByText(/The pack says module 2, your meter says 1\./)).toBeTruthy();
    expect(screen.getAllByRole('radio').every((one) => one.getAttribute('aria-checked') === 'false')).toBe(true);
    fireEvent.click(screen.getByRole('radio', { name: /Module 1, as metered/ }));
    fireEvent.click(await press('Decide: module 1'));
    expect((await screen.findByRole('alert')).textContent).toBe('Say why: it is kept with your name.');
    expect(server.writes()).toEqual([]);
    await type('Why', 'Harness relabelled');
    server.answers['POST /api/repairs/r1/second-source/so1/decision'] = () => Response.json(torn());
    fireEvent.click(await press('Decide: module 1'));
    await waitFor(() => expect(gone).toHaveBeenCalledWith('/repairs/r1'));
    expect(server.writes()[0]!.body).toEqual({
      ...{ decision: 'module', modulePosition: '1', reason: 'Harness relabelled' },
    });
  });

  it('a technician is told who decides, and has no button for it', async () => {
    begin('technician', torn());
    expect(await screen.findByText('A foreman or a manager decides. Ask Hella Brandt.')).toBeTruthy();
    expect(screen.queryByRole('button', { name: /^Decide/ })).toBeNull();
  });
});

it('asks for the pack’s reading first where there is none', async () => {
  begin('technician', repairOf());
  fireEvent.click(await press('Enter the group voltages'));
  expect(replaced).toHaveBeenCalledWith('/repairs/r1/reading');
});
