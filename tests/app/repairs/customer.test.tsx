import { fireEvent, screen, waitFor, within } from '@testing-library/react';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import Repair from '@/app/(workshop)/repairs/[id]/index';
import type { RepairPageDto } from '@/shared/contract/repair';
import type { Role } from '@/shared/contract/roles';
import { draw, emptyDevice, press } from '../charges/bench-of';
import { fakeServer } from '../workshop/server';
import { repairOf } from './repair-of';

const saveFile = vi.hoisted(() => vi.fn());
vi.mock('@/shared/client/save-file', () => ({ saveFile }));
vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => ({ id: 'r1' }),
  useRouter: () => ({ push: vi.fn(), replace: vi.fn(), back: vi.fn(), canGoBack: () => false }),
}));

beforeEach(() => {
  emptyDevice();
  saveFile.mockClear();
});
afterEach(() => vi.unstubAllGlobals());

const named = { customerName: 'Quay Bakery', customerContact: 'desk@quay.example.com' };
function drawn(present: RepairPageDto, role: Role) {
  const server = fakeServer(role);
  server.answers['GET /api/repairs/r1'] = () => Response.json(present);
  draw(<Repair />);
  return server;
}
const heading = { name: 'Customer’s data' };

it('a manager saves what is kept of the customer as a file', async () => {
  const server = drawn(repairOf('read', named), 'manager');
  server.answers['GET /api/repairs/r1/customer.json'] = () => Response.json({ name: 'Quay Bakery' });
  fireEvent.click(await press('Save as a file'));
  await waitFor(() => expect(saveFile).toHaveBeenCalledWith(expect.anything(), 'customer-data.json'));
});

it('a manager erases it with a reason and not without one; then it says who did and why', async () => {
  const server = drawn(repairOf('read', named), 'manager');
  const by = { id: 'p1', name: 'Petra Aldwin' };
  const after = repairOf('read', {
    rev: 9,
    erased: { at: '2026-06-09T08:00:00.000Z', by, reason: 'Asked in writing.' },
  });
  server.answers['POST /api/repairs/r1/customer/erase'] = () => {
    server.answers['GET /api/repairs/r1'] = () => Response.json(after);
    return Response.json(after);
  };
  fireEvent.click(await press('Erase it'));
  const sheet = within(await screen.findByRole('dialog'));
  expect(sheet.getByText('Say why first.')).toBeTruthy();
  fireEvent.change(sheet.getByLabelText('Reason'), { target: { value: 'Asked in writing.' } });
  fireEvent.click(sheet.getByRole('button', { name: 'Erase name and contact' }));
  expect(await screen.findByText('Erased Tuesday 9 June, Petra Aldwin: Asked in writing.')).toBeTruthy();
  expect(server.writes().map(({ path, body }) => [path, body])).toEqual([
    ['/api/repairs/r1/customer/erase', { reason: 'Asked in writing.' }],
  ]);
  expect(screen.queryByRole('button', { name: 'Erase it' })).toBeNull();
});

it('others see none of it, and nobody does where no customer is named', async () => {
  drawn(repairOf('read', named), 'foreman');
  expect(await screen.findByText('Quay Bakery')).toBeTruthy();
  expect(screen.queryByRole('heading', heading)).toBeNull();
});

it('where no customer is named there is nothing to erase', async () => {
  drawn(repairOf('read'), 'manager');
  expect(await screen.findByText('Facts')).toBeTruthy();
  expect(screen.queryByRole('heading', heading)).toBeNull();
});
