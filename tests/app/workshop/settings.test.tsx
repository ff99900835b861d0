import { fireEvent, screen, waitFor, within } from '@testing-library/react';
import { router } from 'expo-router';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import Workshop from '@/app/(workshop)/workshop/index';
import { roles, type Role } from '@/shared/contract/roles';
import type { UndeliveredDto } from '@/shared/contract/alert-settings';
import type { StatusDto } from '@/shared/contract/status';
import { pressFrom } from '../../support/press';
import { draw, emptyDevice } from '../charges/bench-of';
import { fakeServer, problem } from './server';

const state = vi.hoisted(() => ({ params: {} as Record<string, string>, width: 'phone' }));
vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => state.params,
}));
vi.mock('@/shared/ui/theme/use-breakpoint', async (original) => ({
  ...(await original<object>()),
  useBreakpoint: () => state.width,
}));

const status: StatusDto = {
  version: '0.1.0',
  startedAt: new Date(Date.now() - 3 * 3600_000).toISOString(),
  at: new Date().toISOString(),
  databaseBytes: 12.4 * 1024 ** 2,
  freeBytes: 80 * 1024 ** 3,
  backups: {
    everyHours: 1,
    latest: [
      {
        name: 'bidewell-clock-2026-06-09T08-00-00Z.sqlite',
        at: new Date(Date.now() - 20 * 60_000).toISOString(),
        bytes: 11.9 * 1024 ** 2,
        byClock: true,
      },
    ],
    count: 17,
    bytes: 150 * 1024 ** 2,
    failed: null,
  },
  sockets: 4,
  overdueLooks: 0,
  outbox: { waiting: 0, dead: 0 },
};

const undelivered: UndeliveredDto = {
  id: 'u1',
  alert: { id: 'a1', kind: 'check-due', level: 'amber', title: 'R-2409 at A1' },
  person: { id: 'p2', name: 'Hella Brandt' },
  way: 'e-mail',
  tries: 12,
  reason: 'Connection timeout.',
  at: '2026-06-09T11:42:00Z',
  open: true,
};

let server: ReturnType<typeof fakeServer>;
function open(role: Role, width: 'phone' | 'wide', section?: string, answers: typeof server.answers = {}) {
  state.params = section ? { section } : {};
  state.width = width;
  server = fakeServer(role);
  for (const path of ['chargers', 'meters', 'module-types', 'pack-types', 'resistors', 'walls', 'invitations'])
    server.answers[`GET /api/${path}`] = () => Response.json([]);
  server.answers['GET /api/status'] = () => Response.json(status);
  server.answers['GET /api/staffing'] = () => Response.json({ people: [], skills: [], places: [] });
  Object.assign(server.answers, answers);
  draw(<Workshop />);
}
const parts = () => screen.getAllByRole('region').map((part) => part.getAttribute('aria-label'));

// jsdom lays nothing out, so it cannot scroll.
Element.prototype.scrollIntoView = () => {};

beforeEach(() => {
  emptyDevice();
  vi.mocked(router.push).mockClear();
});
afterEach(() => vi.unstubAllGlobals());

describe('the settings of the workshop', () => {
  it('are thirteen rows on the phone, each a way to its part', async () => {
    open('manager', 'phone');
    fireEvent.click(await screen.findByText('Levelling resistors'));
    expect(router.push).toHaveBeenCalledWith('/workshop?section=resistors');
    expect(screen.queryByRole('region')).toBeNull();
  });

  it('are thirteen parts on the desk; the walls stand last, at the side of those who approve them', async () => {
    open('manager', 'wide');
    await waitFor(() => expect(parts()).toHaveLength(13));
    expect(parts()).toEqual([
      'People and roles',
      'Hours of people',
      'Skills',
      'Places',
      'Chargers and channels',
      'Module types',
      'Pack types',
      'Meters',
      'Levelling resistors',
      'Limits',
      'Name and hours',
      'Server',
      'Walls',
    ]);
    expect(screen.getByRole('button', { name: 'Make the invitation' })).toBeTruthy();
    expect(await screen.findByText('add a charger')).toBeTruthy();
  });

  it('can be read by a technician, with who may change them in place of the ways to do so', async () => {
    open('technician', 'wide');
    await waitFor(() => expect(parts()).toHaveLength(13));
    expect(await screen.findByText('No charger yet. Nothing can be planned without one.')).toBeTruthy();
    expect(screen.queryByText('add a charger')).toBeNull();
    expect(screen.queryByRole('button', { name: 'Make the invitation' })).toBeNull();
    expect((await screen.findAllByText(/Hella Brandt\.$/)).length).toBeGreaterThan(0);
  });

  it('say of one part that it could not be read, and read it again, while the others stand', async () => {
    open('manager', 'wide', undefined, {
      'GET /api/meters': () => problem(400, 'This cannot be asked so.'),
    });
    const meters = () => within(screen.getByRole('region', { name: 'Meters' }));
    await waitFor(() => expect(meters().getByText('The meters could not be read.')).toBeTruthy(), { timeout: 10_000 });
    expect(screen.getByText('No module type yet. Every spare is of one.')).toBeTruthy();
    server.answers['GET /api/meters'] = () => Response.json([]);
    fireEvent.click(meters().getByRole('button', { name: 'Try again' }));
    await waitFor(() => expect(meters().getByText(/^No meter yet/)).toBeTruthy());
  });
});

describe('the server', () => {
  const part = () => within(screen.getByRole('region', { name: 'Server' }));

  it('tells the manager its version, the size of its data and the newest copy, and makes another at a press', async () => {
    open('manager', 'wide');
    await waitFor(() => expect(part().getByText('0.1.0')).toBeTruthy());
    expect(part().getByText('12.4 MiB')).toBeTruthy();
    expect(part().getByText('150 MiB')).toBeTruthy();
    server.answers['POST /api/status/backup'] = () => Response.json(status);
    fireEvent.click(part().getByRole('button', { name: 'Make a copy now' }));
    await waitFor(() => expect(server.writes().map(({ path }) => path)).toEqual(['/api/status/backup']));
    // What is shown is asked for again.
    await waitFor(() => expect(server.sent.filter(({ path }) => path === '/api/status')).toHaveLength(2));
  });

  it('counts what waits and what could not be brought, and tells of each whom, why, and sends it again', async () => {
    let dead = 1;
    open('manager', 'phone', 'server', {
      'GET /api/status': () => Response.json({ ...status, outbox: { waiting: 3, dead } }),
      'GET /api/alerts/undelivered': () => Response.json(dead === 0 ? [] : [undelivered]),
      'POST /api/alerts/undelivered/u1/again': () => {
        dead = 0;
        return new Response(null, { status: 204 });
      },
    });
    const fact = (name: string) => screen.getByText(name).closest('[role="listitem"]')?.textContent;
    expect(await screen.findByText('Check due, R-2409 at A1, to Hella Brandt by e-mail')).toBeTruthy();
    expect(screen.getByText(/after 12 tries\. Connection timeout\.$/)).toBeTruthy();
    expect(fact('Alerts on their way out')).toBe('Alerts on their way out3');
    expect(fact('Alerts that could not be brought')).toBe('Alerts that could not be brought1');
    fireEvent.click(screen.getByRole('button', { name: 'Send again: Check due, R-2409 at A1, to Hella Brandt' }));
    await waitFor(() => expect(fact('Alerts that could not be brought')).toBe('Alerts that could not be brought0'));
    expect(screen.queryByText(/to Hella Brandt by e-mail/)).toBeNull();
  });

  it('says why a copy could not be made, and keeps saying that the last one was not', async () => {
    open('manager', 'phone', 'server', {
      'GET /api/status': () =>
        Response.json({
          ...status,
          backups: { ...status.backups, failed: { at: status.at, reason: 'No space left on the disk.' } },
        }),
      'POST /api/status/backup': () => problem(400, 'No copy could be made: no space left on the disk.'),
    });
    expect(await screen.findByText('The last copy could not be made: No space left on the disk.')).toBeTruthy();
    fireEvent.click(screen.getByRole('button', { name: 'Make a copy now' }));
    expect(await screen.findByText('No copy could be made: no space left on the disk.')).toBeTruthy();
  });

  it('exports only after saying that customers are in it', async () => {
    open('manager', 'phone', 'server');
    fireEvent.click(await screen.findByRole('button', { name: 'Export everything' }));
    expect(await screen.findByText(/Names and contacts of customers are in it/)).toBeTruthy();
    expect(server.sent.some(({ path }) => path === '/api/export.zip')).toBe(false);
    server.answers['GET /api/export.zip'] = () => problem(400, 'The export was refused.');
    fireEvent.click(screen.getByRole('button', { name: 'Export' }));
    expect(await screen.findByText('The export was refused.')).toBeTruthy();
  });

  it.each(roles.filter((role) => role !== 'manager'))('is not shown to a %s, who reads whom to ask', async (role) => {
    open(role, 'phone', 'server');
    expect(await screen.findByText(/Hella Brandt/)).toBeTruthy();
    expect(server.sent.some(({ path }) => path === '/api/status')).toBe(false);
  });
});

describe('inviting a person', () => {
  const email = () => screen.getByLabelText<HTMLInputElement>('E-mail');
  const make = () => screen.getByRole('button', { name: 'Make the invitation' });

  it('pressed straight from a wrong address moves nothing before the click, keeps it, and sends nothing', async () => {
    open('manager', 'phone', 'people');
    await screen.findByText('Hella Brandt');
    fireEvent.change(email(), { target: { value: 'bram at example.com' } });
    const { down, click } = await pressFrom(email(), make, 'touch');
    expect(click).toBe(down);
    await waitFor(() => expect(email().getAttribute('aria-invalid')).toBe('true'));
    expect(email().value).toBe('bram at example.com');
    expect(server.writes()).toEqual([]);
  });

  it('shows the link once and empties the form', async () => {
    open('manager', 'phone', 'people', {
      'POST /api/invitations': () =>
        Response.json({ url: 'https://bench.example.com/join?token=t', expiresAt: '2036-07-12T00:00:00.000Z' }),
    });
    await screen.findByText('Hella Brandt');
    fireEvent.change(email(), { target: { value: 'bram@example.com' } });
    fireEvent.blur(email());
    fireEvent.click(make());
    await waitFor(() => expect(document.body.innerHTML).toContain('https://bench.example.com/join?token=t'));
    expect(server.writes()[0]!.body).toEqual({ email: 'bram@example.com', role: roles[0] });
    expect(email().value).toBe('');
    expect(email().getAttribute('aria-invalid')).toBeNull();
  });
});
