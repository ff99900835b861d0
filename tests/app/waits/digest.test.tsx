import { fireEvent, screen, waitFor } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import WeeklyDigest from '@/app/(workshop)/me/weekly-digest';
import { draw, emptyDevice, problem } from '../charges/bench-of';
import { fakeServer } from '../workshop/server';

beforeEach(() => emptyDevice());
afterEach(() => vi.unstubAllGlobals());

const path = '/api/me/weekly-digest';
const digest = { on: false, eMail: { address: 'petra@example.com', on: true } };

describe('the weekly letter', () => {
  it('comes once its tick is set, to the manager’s own address', async () => {
    const server = fakeServer('manager');
    server.answers[`GET ${path}`] = () => Response.json(digest);
    server.answers[`PATCH ${path}`] = () => Response.json({ ...digest, on: true });
    draw(<WeeklyDigest />);
    const tick = await screen.findByRole('checkbox', { name: /^Send me the waits of each week/ });
    expect(tick.getAttribute('aria-checked')).toBe('false');
    expect(screen.getByText(/by e-mail to petra@example\.com\./)).toBeTruthy();
    fireEvent.click(tick);
    await waitFor(() => expect(server.writes().map(({ body }) => body)).toEqual([{ on: true }]));
    await waitFor(() => expect(screen.getByRole('checkbox').getAttribute('aria-checked')).toBe('true'));
  });

  it('stays as it was where it could not be saved, and says so; and says where the server cannot send', async () => {
    const server = fakeServer('manager');
    server.answers[`GET ${path}`] = () => Response.json({ ...digest, eMail: { ...digest.eMail, on: false } });
    server.answers[`PATCH ${path}`] = () => problem(403, 'Only a manager may.');
    draw(<WeeklyDigest />);
    expect(await screen.findByText(/^This server cannot send e-mail yet/)).toBeTruthy();
    fireEvent.click(screen.getByRole('checkbox'));
    expect((await screen.findByRole('alert')).textContent).toMatch(/^It stays as it was\./);
    expect(screen.getByRole('checkbox').getAttribute('aria-checked')).toBe('false');
  });

  it('is not for a foreman: nothing is asked', async () => {
    const server = fakeServer('foreman');
    draw(<WeeklyDigest />);
    expect(await screen.findByText('The weekly letter is read by a manager.')).toBeTruthy();
    expect(server.sent.filter(({ path: asked }) => asked === path)).toEqual([]);
  });
});
