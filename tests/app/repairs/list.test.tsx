import { fireEvent, screen, waitFor } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import Repairs from '@/app/(workshop)/repairs/index';
import type { RepairCardDto } from '@/shared/contract/repair';
import type { Role } from '@/shared/contract/roles';
import { draw, emptyDevice, press } from '../charges/bench-of';
import { fakeServer, problem } from '../workshop/server';
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
afterEach(() => {
  windowOf(390);
  vi.restoreAllMocks();
  vi.unstubAllGlobals();
});

const open = [
  cardOf('R-2423', {
    step: 'second-source',
    needsSomebody: true,
    block: { code: 'sources-disagree', text: 'The pack says module 17, your meter says 18.', role: 'foreman' },
  }),
  cardOf('R-2418', { step: 'spare', waits: true, failing: '17' }),
  cardOf('R-2425', { vehicle: 'Silver estate', bay: null }),
];
const listOf = (repairs: RepairCardDto[], nextPage: number | null = null) => ({
  repairs,
  counts: { open: 3, needsSomebody: 1, waiting: 1, handedOver: 2 },
  nextPage,
});
function serverOf(role: Role = 'technician') {
  const server = fakeServer(role);
  server.answers['GET /api/repairs'] = () => Response.json(listOf(open));
  return server;
}
const named = /^R-\d/;
const rows = () =>
  screen.getAllByRole('link', { name: named }).map((row) => row.getAttribute('aria-label')?.slice(0, 6));
const windowOf = (width: number) => {
  vi.spyOn(document.documentElement, 'clientWidth', 'get').mockReturnValue(width);
  window.dispatchEvent(new Event('resize'));
};

describe('the list of repairs', () => {
  it('keeps the server’s order, names what each waits for, and opens the one that is pressed', async () => {
    serverOf();
    draw(<Repairs />);
    await waitFor(() => expect(rows()).toEqual(['R-2423', 'R-2418', 'R-2425']));
    expect(screen.getByText('The pack says module 17, your meter says 18.')).toBeTruthy();
    expect(screen.getByText('A spare for module 17')).toBeTruthy();
    fireEvent.click(screen.getByRole('link', { name: /^R-2418/ }));
    expect(gone).toHaveBeenCalledWith('/repairs/R-2418');
  });

  it('shows 1 that needs somebody and 1 that waits', async () => {
    serverOf();
    draw(<Repairs />);
    await waitFor(() => expect(rows()).toHaveLength(3));
    fireEvent.click(screen.getByRole('radio', { name: /Needs/ }));
    expect(rows()).toEqual(['R-2423']);
    fireEvent.click(screen.getByRole('radio', { name: /Waiting/ }));
    expect(rows()).toEqual(['R-2418']);
  });

  it('is a table on the desk, whose rows the arrow keys walk and Enter opens', async () => {
    windowOf(1280);
    serverOf();
    draw(<Repairs />);
    const [first, second] = await screen.findAllByRole('row', { name: named });
    first!.focus();
    fireEvent.keyDown(first!, { key: 'ArrowDown' });
    expect(document.activeElement).toBe(second);
    fireEvent.click(second!);
    expect(gone).toHaveBeenCalledWith('/repairs/R-2418');
  });

  it('asks the server for what was typed, once the typing rests', async () => {
    const server = serverOf();
    server.answers['GET /api/repairs?q=silver'] = () => Response.json(listOf([open[2]!]));
    server.answers['GET /api/search?q=silver'] = () => Response.json({ hits: [], more: false });
    draw(<Repairs />);
    await waitFor(() => expect(rows()).toHaveLength(3));
    fireEvent.change(screen.getByLabelText('Repair, vehicle, spare or person'), { target: { value: 'silver' } });
    await waitFor(() => expect(rows()).toEqual(['R-2425']));
    await waitFor(() =>
      expect(server.sent.map(({ path }) => path).filter((path) => path.includes('q='))).toEqual(
        expect.arrayContaining(['/api/repairs?q=silver', '/api/search?q=silver']),
      ),
    );
    expect(server.sent.filter(({ path }) => path.includes('q='))).toHaveLength(2);
  });

  it('brings the next page on demand', async () => {
    const server = serverOf();
    server.answers['GET /api/repairs'] = () => Response.json(listOf(open, 2));
    server.answers['GET /api/repairs?page=2'] = () => Response.json(listOf([cardOf('R-2404')]));
    draw(<Repairs />);
    fireEvent.click(await press('Show more'));
    await waitFor(() => expect(rows()).toHaveLength(4));
    expect(screen.queryByRole('button', { name: 'Show more' })).toBeNull();
  });

  it('shows the archive to everybody and the deleted ones to a manager alone', async () => {
    const server = serverOf('manager');
    server.answers['GET /api/repairs?state=deleted'] = () =>
      Response.json(listOf([cardOf('R-2300', { state: 'deleted' })]));
    const drawn = draw(<Repairs />);
    fireEvent.change(await screen.findByLabelText('Further repairs'), { target: { value: 'deleted' } });
    await waitFor(() => expect(rows()).toEqual(['R-2300']));
    drawn.unmount();

    emptyDevice();
    serverOf('technician');
    draw(<Repairs />);
    const further = await screen.findByLabelText<HTMLSelectElement>('Further repairs');
    expect([...further.options].map(({ text }) => text)).not.toContain('Deleted');
  });

  it('says what failed, and tries again', async () => {
    const server = fakeServer('technician');
    server.answers['GET /api/repairs'] = () => problem(403, 'Not for you.');
    draw(<Repairs />);
    expect(await screen.findByText('The repairs could not be read.')).toBeTruthy();
    server.answers['GET /api/repairs'] = () => Response.json(listOf(open));
    fireEvent.click(await press('Try again'));
    await waitFor(() => expect(rows()).toHaveLength(3));
  });

  it('that is empty offers to start the first', async () => {
    const server = fakeServer('technician');
    server.answers['GET /api/repairs'] = () =>
      Response.json({ repairs: [], counts: { open: 0, needsSomebody: 0, waiting: 0, handedOver: 0 }, nextPage: null });
    draw(<Repairs />);
    expect(await screen.findByText('No repairs yet. Start the first when a pack comes in.')).toBeTruthy();
    fireEvent.click(screen.getAllByRole('button', { name: 'Start a repair' }).at(-1)!);
    expect(gone).toHaveBeenCalledWith('/repairs/new');
  });
});
