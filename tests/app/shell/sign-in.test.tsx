import { fireEvent, render, screen, waitFor } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import SignIn from '@/app/sign-in';
import { ClientProvider } from '@/shared/client/client-provider';
import { queryClient } from '@/shared/client/query-client';
import { endedStore, signedInBefore } from '@/shared/client/session-state';
import { sessionQuery } from '@/shared/client/session';
import { router } from '../../mocks/expo-router';

const session = {
  person: { id: 'p1', name: 'Petra Aldwin', email: 'petra@example.com', role: 'manager' },
  workshop: { id: 'w1', name: 'Harbour Lane Traction', zone: 'UTC' },
  capabilities: [],
  expiresAt: '2026-07-09T00:00:00.000Z',
};
const frontDoor = { demo: false, empty: false, workshopName: null, version: '0.1.0' };

/** Answers of the server by path; a function is asked with the sent body. */
let answers: Record<string, (body: unknown) => Response>;
let sent: { path: string; body: unknown }[];

const refusal = (status: number, detail: string, fields?: Record<string, string>) =>
  Response.json({ type: 'about:blank', title: detail, status, detail, code: 'refused', fields }, { status });

beforeEach(() => {
  queryClient.clear();
  localStorage.clear();
  sessionStorage.clear();
  endedStore.set(null);
  sent = [];
  answers = { '/api/front-door': () => Response.json(frontDoor), '/api/session': () => Response.json(session) };
  vi.stubGlobal('fetch', async (path: string, init: RequestInit) => {
    const body: unknown = init.body ? JSON.parse(init.body as string) : undefined;
    sent.push({ path, body });
    const answer = answers[path];
    if (!answer) throw new TypeError('Failed to fetch');
    return answer(body);
  });
});
afterEach(() => vi.unstubAllGlobals());

const open = () => render(<SignIn />, { wrapper: ClientProvider });
const type = (label: string, text: string) =>
  fireEvent.change(screen.getByLabelText(label), { target: { value: text } });
const press = () => fireEvent.click(screen.getByRole('button', { name: 'Sign in' }));
const posts = () => sent.filter(({ path }) => path === '/api/session');

describe('signing in', () => {
  it('asks for what is missing at its field, goes to the first, and sends nothing', () => {
    open();
    press();
    expect(screen.getByText('Type your e-mail.')).toBeTruthy();
    expect(screen.getByText('Type your password.')).toBeTruthy();
    expect(document.activeElement).toBe(screen.getByLabelText('E-mail'));
    expect(posts()).toEqual([]);
  });

  it('says what the server says of a wrong password, keeps what was typed and goes to the password', async () => {
    answers['/api/session'] = () => refusal(401, 'E-mail address and password do not belong together.');
    open();
    type('E-mail', 'petra@example.com');
    type('Password', 'not this one');
    press();
    await screen.findByText('E-mail address and password do not belong together.');
    expect((screen.getByLabelText('E-mail') as HTMLInputElement).value).toBe('petra@example.com');
    expect((screen.getByLabelText('Password') as HTMLInputElement).value).toBe('not this one');
    expect(document.activeElement).toBe(screen.getByLabelText('Password'));
    expect(sent.some(({ path }) => path.includes('refresh'))).toBe(false);
  });

  it('puts the server’s sentence at the field it names', async () => {
    answers['/api/session'] = () => refusal(400, 'No.', { email: 'This is no e-mail address.' });
    open();
    type('E-mail', 'petra@');
    type('Password', 'anything at all');
    press();
    await screen.findByText('This is no e-mail address.');
    expect(screen.getByLabelText('E-mail').getAttribute('aria-invalid')).toBe('true');
  });

  it('says that there is no connection, and loses nothing', async () => {
    delete answers['/api/session'];
    open();
    type('E-mail', 'petra@example.com');
    type('Password', 'rusty-lampposts');
    press();
    await screen.findByText(/^No connection to the server/);
    expect((screen.getByLabelText('Password') as HTMLInputElement).value).toBe('rusty-lampposts');
  });

  it('sends the password as it was typed and remembers who is signed in, never the password', async () => {
    open();
    type('E-mail', ' petra@example.com');
    type('Password', '  spaces stay ');
    press();
    await waitFor(() => expect(queryClient.getQueryData(sessionQuery().queryKey)).toEqual(session));
    expect(posts()[0]!.body).toMatchObject({ password: '  spaces stay ' });
    expect(signedInBefore()).toBe(true);
    expect(JSON.stringify({ ...localStorage, ...sessionStorage })).not.toContain('spaces stay');
  });

  it('says why one has to sign in again, with the address filled in', () => {
    localStorage.setItem('bw.email', 'petra@example.com');
    endedStore.set('expired');
    open();
    expect(screen.getByText('Your session has ended. Sign in again; what you typed is kept.')).toBeTruthy();
    expect((screen.getByLabelText('E-mail') as HTMLInputElement).value).toBe('petra@example.com');
  });

  it('shows a typed password only on request', () => {
    open();
    type('Password', 'rusty-lampposts');
    const field = () => screen.getByLabelText('Password') as HTMLInputElement;
    expect(field().type).toBe('password');
    fireEvent.click(screen.getByRole('button', { name: 'Show the password' }));
    expect([field().type, field().value]).toEqual(['text', 'rusty-lampposts']);
  });
});

describe('the other ways in', () => {
  it('of a demo are one tap for each role, and none without the demo', async () => {
    const first = open();
    await waitFor(() => expect(sent.length).toBeGreaterThan(0));
    expect(screen.queryByRole('button', { name: /^Enter the demo/ })).toBeNull();
    first.unmount();
    queryClient.clear();

    answers['/api/front-door'] = () =>
      Response.json({ ...frontDoor, demo: true, workshopName: 'Harbour Lane Traction' });
    answers['/api/demo/sign-in'] = () => Response.json(session);
    open();
    fireEvent.click(await screen.findByRole('button', { name: 'Enter the demo as foreman' }));
    expect(screen.getAllByRole('button', { name: /^Enter the demo as/ })).toHaveLength(3);
    await waitFor(() => expect(sent).toContainEqual({ path: '/api/demo/sign-in', body: { role: 'foreman' } }));
  });

  it('of an empty house is to create the first workshop', async () => {
    answers['/api/front-door'] = () => Response.json({ ...frontDoor, empty: true });
    open();
    fireEvent.click(await screen.findByRole('button', { name: 'Create a workshop' }));
    expect(router.push).toHaveBeenCalledWith('/create');
    expect(screen.queryByLabelText('Password')).toBeNull();
  });
});
