import { fireEvent, screen, waitFor } from '@testing-library/react';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import Prove from '@/app/(workshop)/repairs/[id]/prove';
import { paperFor } from '@/shared/client/papers';
import type { AdvisedDto, RepairPageDto } from '@/shared/contract/repair';
import { draw, emptyDevice, press } from '../charges/bench-of';
import { fakeServer, problem } from '../workshop/server';
import { reading, repairOf } from './read-repair-of';

vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => ({ id: 'r1' }),
  useRouter: () => ({ canGoBack: () => false, replace: vi.fn(), push: vi.fn(), back: vi.fn() }),
}));
const saved = vi.hoisted(() => vi.fn());
vi.mock('@/shared/client/save-file', () => ({ saveFile: saved }));

const item: AdvisedDto = {
  ...{ id: 'a1', text: 'Coolant of the pack', outcome: 'open', detail: null, agreedBy: null, agreedAt: null },
  ...{ at: '2026-06-09T10:00:00.000Z', by: { id: 'p1', name: 'Petra Aldwin' } },
};
let server: ReturnType<typeof fakeServer>;
let present: RepairPageDto;
beforeEach(() => {
  emptyDevice();
  saved.mockClear();
  server = fakeServer('technician');
  present = repairOf({ readings: [reading()] });
  server.answers['GET /api/repairs/r1'] = () => Response.json(present);
});
afterEach(() => {
  vi.restoreAllMocks();
  vi.unstubAllGlobals();
});

const taking = (method: string, path: string, advised: AdvisedDto[]) => {
  server.answers[`${method} /api/repairs/r1/${path}`] = () => {
    present = { ...present, advised, rev: present.rev + 1 };
    return Response.json(present);
  };
};
const type = (name: RegExp, text: string) =>
  fireEvent.change(screen.getByRole('textbox', { name }), { target: { value: text } });

it('keeps what was declined only with the customer’s name', async () => {
  taking('POST', 'advised', [
    { ...item, outcome: 'declined', agreedBy: 'T. Varga', agreedAt: '2026-06-09T10:00:00.000Z' },
  ]);
  draw(<Prove />);
  fireEvent.click(await press('Add what is advised'));
  type(/^What is advised/, 'Coolant of the pack');
  fireEvent.click(screen.getByRole('radio', { name: /^Declined by the owner/ }));
  expect(screen.getByText('Type the name of the customer who declined it.')).toBeTruthy();
  fireEvent.click(await press('Keep it'));
  expect(server.writes()).toEqual([]);
  type(/^The customer’s name/, 'T. Varga');
  fireEvent.click(await press('Keep it'));
  expect(await screen.findByText('Coolant of the pack: declined by the owner')).toBeTruthy();
  expect(screen.getByText(/^agreed by T\. Varga/)).toBeTruthy();
  expect(server.writes()).toMatchObject([
    { body: { text: 'Coolant of the pack', outcome: 'declined', detail: null, agreedBy: 'T. Varga' } },
  ]);
});

it('changes what was advised at the revision that was seen, and takes it back', async () => {
  present = { ...present, advised: [item], rev: 3 };
  taking('PATCH', 'advised/a1', [{ ...item, outcome: 'booked', detail: '8 September' }]);
  taking('DELETE', 'advised/a1', []);
  draw(<Prove />);
  fireEvent.click(await press('Change Coolant of the pack'));
  fireEvent.click(screen.getByRole('radio', { name: /^Booked/ }));
  type(/^Detail/, '8 September');
  fireEvent.click(await press('Keep it'));
  expect(await screen.findByText('Coolant of the pack: booked, 8 September')).toBeTruthy();
  fireEvent.click(await press('Change Coolant of the pack'));
  fireEvent.click(await press('Take back Coolant of the pack'));
  expect(await screen.findByText('Nothing was advised yet.')).toBeTruthy();
  expect(server.writes().map(({ method, rev }) => [method, rev])).toEqual([
    ['PATCH', '"3"'],
    ['DELETE', '"4"'],
  ]);
});

it('saves the sheet as a PDF named after the repair, and says why where it cannot', async () => {
  const path = 'GET /api/repairs/r1/hand-over.pdf?paper=letter&decimal=point';
  vi.spyOn(navigator, 'language', 'get').mockReturnValue('en-US');
  server.answers[path] = () => problem(429, 'Too many at once. Try again in 20 s.');
  draw(<Prove />);
  fireEvent.click(await press('Hand-over sheet as PDF'));
  expect((await screen.findByRole('alert')).textContent).toBe('Too many at once. Try again in 20 s.');
  server.answers[path] = () => new Response('%PDF-');
  fireEvent.click(await press('Hand-over sheet as PDF'));
  await waitFor(() => expect(saved.mock.calls).toMatchObject([[{ size: 5 }, `hand-over-${present.number}.pdf`]]));
});

it('asks for Letter where it is used, for A4 elsewhere, and for the device’s decimal mark', () => {
  expect(paperFor('en-US', '.')).toEqual({ paper: 'letter', decimal: 'point' });
  expect(paperFor('fr-CA', ',')).toEqual({ paper: 'letter', decimal: 'comma' });
  expect(paperFor('de-DE', ',')).toEqual({ paper: 'a4', decimal: 'comma' });
  expect(paperFor('en', '.')).toEqual({ paper: 'a4', decimal: 'point' });
});
