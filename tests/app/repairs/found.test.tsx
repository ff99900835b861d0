import { fireEvent, screen, waitFor } from '@testing-library/react';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import Repairs from '@/app/(workshop)/repairs/index';
import type { SearchDto } from '@/shared/contract/search';
import { draw, emptyDevice } from '../charges/bench-of';
import { fakeServer } from '../workshop/server';
import { cardOf } from './repair-of';

const gone = vi.hoisted(() => vi.fn());
vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useRouter: () => ({ push: gone, replace: gone }),
}));

beforeEach(() => {
  emptyDevice();
  gone.mockClear();
});
afterEach(() => vi.unstubAllGlobals());

const listed = cardOf('R-2418');
const answer: SearchDto = {
  hits: [
    {
      ...{ kind: 'repair', id: listed.id, number: 'R-2418' },
      ...{ vehicle: 'Grey van', bay: null },
      customerName: null,
      state: 'open',
    },
    {
      kind: 'repair',
      id: 'r9',
      number: 'R-1802',
      vehicle: 'Grey bus',
      bay: null,
      customerName: null,
      state: 'archived',
    },
    { kind: 'spare', id: 's1', label: 'S-0398', typeName: '2-series 66 Ah', shelfPlace: 'B4', where: 'shelf' },
    {
      ...{ kind: 'charge', id: 'c1', title: 'R-2418', number: 'C-0147' },
      ...{ spareLabel: 'S-0398', stage: 'resting' },
      at: '2026-06-09T08:00:00.000Z',
    },
  ],
  more: true,
};
const drawn = () => {
  const server = fakeServer('technician');
  const list = { repairs: [listed], counts: { open: 1, needsSomebody: 0, waiting: 0, handedOver: 1 }, nextPage: null };
  server.answers['GET /api/repairs'] = () => Response.json(list);
  server.answers['GET /api/repairs?q=grey'] = () => Response.json(list);
  draw(<Repairs />);
  return server;
};
const type = async (text: string) =>
  fireEvent.change(await screen.findByLabelText('Repair, vehicle, spare or person'), { target: { value: text } });

it('names what else is found by what it is, leads there as a link, and leaves out what is listed', async () => {
  drawn().answers['GET /api/search?q=grey'] = () => Response.json(answer);
  await type('grey');
  const list = await screen.findByRole('list', { name: 'Found elsewhere' }, { timeout: 4000 });
  const links = [...list.querySelectorAll('a')];
  expect(links.map((link) => [link.getAttribute('aria-label'), link.getAttribute('href')])).toEqual([
    ['Repair R-1802, Grey bus, in the archive', '/repairs/r9'],
    ['Spare S-0398, 2-series 66 Ah, B4, on the shelf', '/spares/s1'],
    ['Charge C-0147, for R-2418, S-0398, resting', '/charges/c1'],
  ]);
  expect(links.every((link) => link.tabIndex === 0)).toBe(true);
  expect(screen.getByText('There is more. Type another letter to find it.')).toBeTruthy();
  fireEvent.click(links[1]!);
  expect(gone).toHaveBeenCalledWith('/spares/s1');
});

it('asks for nothing while nothing is typed, and says so where it could not look', async () => {
  const server = drawn();
  await screen.findByRole('link', { name: /^R-2418/ });
  expect(server.sent.some(({ path }) => path.startsWith('/api/search'))).toBe(false);
  server.answers['GET /api/search?q=grey'] = () => new Response('{}', { status: 400 });
  await type('grey');
  await waitFor(() => expect(screen.getByText(/^Spares and charges could not be looked through/)).toBeTruthy(), {
    timeout: 4000,
  });
  expect(screen.getByRole('link', { name: /^R-2418/ })).toBeTruthy();
});
