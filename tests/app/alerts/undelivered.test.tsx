import { fireEvent, screen, waitFor } from '@testing-library/react';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import Alerts from '@/app/(workshop)/alerts';
import type { UndeliveredDto } from '@/shared/contract/alert-settings';
import type { Role } from '@/shared/contract/roles';
import { draw, emptyDevice, press, problem } from '../charges/bench-of';
import { fakeServer } from '../workshop/server';

const entry = (more: Partial<UndeliveredDto> = {}): UndeliveredDto => ({
  id: 'u1',
  alert: { id: 'a1', kind: 'check-due', level: 'amber', title: 'R-2409 at A1' },
  person: { id: 'p2', name: 'Hella Brandt' },
  way: 'e-mail',
  tries: 12,
  reason: 'Connection timeout.',
  at: '2026-06-09T11:42:00Z',
  open: true,
  ...more,
});

let server: ReturnType<typeof fakeServer>;
let entries: UndeliveredDto[];
function open(role: Role, ...given: UndeliveredDto[]) {
  entries = given;
  server = fakeServer(role);
  server.answers['GET /api/alerts'] = () => Response.json([]);
  server.answers['GET /api/alerts/undelivered'] = () => Response.json(entries);
  server.answers['GET /api/board'] = () => Response.json({ rev: 1, at: entry().at, charges: [], channels: [] });
  server.answers['GET /api/workshop'] = () => Response.json({ id: 'w1', lagLimitMillivolts: 20 });
  draw(<Alerts />);
}

beforeEach(emptyDevice);
afterEach(() => vi.unstubAllGlobals());

it('the manager reads what could not be brought, to whom and why, and sends it again', async () => {
  open('manager', entry());
  expect(await screen.findByText('Check due, R-2409 at A1, to Hella Brandt by e-mail')).toBeTruthy();
  expect(screen.getByText(/after 12 tries\. Connection timeout\.$/)).toBeTruthy();
  server.answers['POST /api/alerts/undelivered/u1/again'] = () => {
    entries = [];
    return new Response(null, { status: 204 });
  };
  fireEvent.click(await press('Send again: Check due, R-2409 at A1, to Hella Brandt'));
  await waitFor(() => expect(screen.queryByText(/could not be brought/)).toBeNull());
});

it('what is settled since can be dropped alone', async () => {
  open('manager', entry({ open: false, tries: 1 }));
  expect(await screen.findByText(/after one try\..*It is settled since, or somebody has it\.$/)).toBeTruthy();
  expect(screen.queryByRole('button', { name: /^Send again/ })).toBeNull();
  server.answers['POST /api/alerts/undelivered/u1/drop'] = () => {
    entries = [];
    return new Response(null, { status: 204 });
  };
  fireEvent.click(await press('Drop: Check due, R-2409 at A1, to Hella Brandt'));
  await waitFor(() => expect(screen.queryByText(/could not be brought/)).toBeNull());
});

it('a refusal is said and the entry stays', async () => {
  open('manager', entry());
  server.answers['POST /api/alerts/undelivered/u1/again'] = () => problem(409, 'Somebody has it, or it is settled.');
  fireEvent.click(await press(/^Send again/));
  expect(await screen.findByText('Somebody has it, or it is settled.')).toBeTruthy();
  expect(await press(/^Drop/)).toBeTruthy();
});

it('a technician is not asked for it, and finds the way to their own settings', async () => {
  open('technician', entry());
  expect((await screen.findByRole('link', { name: 'Where your alerts go' })).getAttribute('href')).toBe('/me/alerts');
  expect(server.sent.some(({ path }) => path.includes('undelivered'))).toBe(false);
});
