import { act, fireEvent, screen, waitFor, within } from '@testing-library/react';
import type { ReactElement } from 'react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import Live from '@/app/(workshop)/charges/[id]/index';
import Log from '@/app/(workshop)/charges/[id]/log';
import SignIn from '@/app/sign-in';
import { sessionLost, useSession } from '@/shared/client/session';
import { endedStore, returnTo } from '@/shared/client/session-state';
import type { ChargeDto } from '@/shared/contract/charge';
import { charge } from '../../shared/ui/charge/charges';
import { draw, emptyDevice, input, press, problem, serverWith } from '../charges/bench-of';

vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => ({ id: 'c1' }),
}));

/** As the shell's guard: the screen for who is signed in, else the sign-in. */
function House({ children }: { children: ReactElement }) {
  return useSession().data ? children : <SignIn />;
}

const signedOut = () =>
  problem(401, 'You are not signed in, or your session is over. Sign in.', { code: 'signed_out' });
const person = { id: 'p1', name: 'Petra Aldwin' };
let server: ReturnType<typeof serverWith>;
let known: (typeof server)['answers'];

/** A server that knows the person, until `forgets`; signing in makes it know her again. */
function arrive(present: ChargeDto = charge('charging', { person })) {
  server = serverWith(present);
  const frontDoor = { demo: false, empty: false, workshopName: null, version: '0.1.0' };
  server.answers['GET /api/front-door'] = () => Response.json(frontDoor);
  known = { ...server.answers };
}
function forgets() {
  for (const name of Object.keys(known)) if (name !== 'GET /api/front-door') server.answers[name] = signedOut;
  for (const name of ['POST /api/session/refresh', 'POST /api/charges/c1/readings', 'POST /api/charges/c1/hold'])
    server.answers[name] = signedOut;
  server.answers['POST /api/session'] = (body) => {
    Object.assign(server.answers, known);
    return known['GET /api/session']!(body);
  };
}
async function signInAgain() {
  fireEvent.change(await input('E-mail'), { target: { value: 'petra@example.com' } });
  fireEvent.change(await input('Password'), { target: { value: 'seven lamps over the slipway' } });
  fireEvent.click(await press('Sign in'));
}

beforeEach(() => {
  emptyDevice();
  endedStore.set(null);
  history.replaceState(null, '', '/charges/c1/log');
});
afterEach(() => {
  vi.unstubAllGlobals();
  history.replaceState(null, '', '/');
});

describe('a session that ends in the middle of typing', () => {
  it('asks to sign in again with the reason; afterwards every typed number stands where it stood, and is sent', async () => {
    arrive();
    draw(
      <House>
        <Log />
      </House>,
    );
    fireEvent.change(await input('At the clips'), { target: { value: '11,68' } });
    fireEvent.change(await input('Module'), { target: { value: '24' } });
    forgets();
    fireEvent.click(await press('Log it'));
    expect(await screen.findByText('Your session has ended. Sign in again; what you typed is kept.')).toBeTruthy();
    await signInAgain();
    expect((await input('At the clips')).value).toBe('11,68');
    expect((await input('Module')).value).toBe('24');
    expect(returnTo.take()).toBe('/charges/c1/log');
    server.answers['POST /api/charges/c1/readings'] = () => Response.json(charge('charging', { person, rev: 2 }));
    fireEvent.click(await press('Log it'));
    await waitFor(() => expect(server.writes().at(-1)!.path).toBe('/api/charges/c1/readings'));
    expect(server.writes().at(-1)!.body).toMatchObject({ terminalVolts: 11.68, celsius: 24 });
  });

  it.each([
    ['sign-out', 'You were signed out from another device. What you typed is kept.'],
    ['revoked', 'This session was ended, as after a new password. Sign in again; what you typed is kept.'],
    ['expired', 'Your session has ended. Sign in again; what you typed is kept.'],
  ] as const)('told by the server as %s, says so and keeps what stood in the fields', async (reason, sentence) => {
    arrive();
    draw(
      <House>
        <Log />
      </House>,
    );
    fireEvent.change(await input('Current'), { target: { value: '9.8' } });
    forgets();
    act(() => sessionLost(reason));
    expect(await screen.findByText(sentence)).toBeTruthy();
    await signInAgain();
    expect((await input('Current')).value).toBe('9.8');
  });

  it('keeps a reason typed into a sheet', async () => {
    arrive();
    draw(
      <House>
        <Live />
      </House>,
    );
    fireEvent.click(await press('Hold'));
    fireEvent.click(await screen.findByRole('radio', { name: 'Something else' }));
    fireEvent.change(await input('The reason'), { target: { value: 'The hall is cleared' } });
    forgets();
    fireEvent.click(await press('It is off: hold the charge'));
    await screen.findByText('Your session has ended. Sign in again; what you typed is kept.');
    await signInAgain();
    fireEvent.click(await press('Hold'));
    expect((await input('The reason')).value).toBe('The hall is cleared');
  });

  it('keeps a note typed into a sheet, and only for its own sheet', async () => {
    arrive(charge('ready', { person }));
    draw(
      <House>
        <Live />
      </House>,
    );
    fireEvent.click(await press('It is fitted'));
    fireEvent.change(await input('Note'), { target: { value: 'Bolts at 9 Nm' } });
    forgets();
    act(() => sessionLost('expired'));
    await signInAgain();
    fireEvent.click(await press('Shelve'));
    expect((await input('Shelf place')).value).not.toBe('Bolts at 9 Nm');
    fireEvent.click(await press('Keep it here'));
    fireEvent.click(await press('It is fitted'));
    expect((await input('Note')).value).toBe('Bolts at 9 Nm');
  });

  it('forgets the reason of a hold once it was taken: the next one has its own', async () => {
    arrive();
    const held = charge('held', { person, rev: 2, heldFrom: 'charging' });
    server.answers['POST /api/charges/c1/hold'] = () => {
      server.becomes(held);
      return Response.json(held);
    };
    draw(<Live />);
    fireEvent.click(await press('Hold'));
    fireEvent.click(await screen.findByRole('radio', { name: 'Nobody is there to look in' }));
    fireEvent.click(await press('It is off: hold the charge'));
    await waitFor(() => expect(screen.queryByRole('dialog')).toBeNull());
    fireEvent.click(await press('Stop'));
    const sheet = within(await screen.findByRole('dialog'));
    expect(sheet.queryAllByRole('radio', { checked: true })).toEqual([]);
  });
});
