import { act, fireEvent, render } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { useAlarmBell } from '@/shared/client/alarm-bell';
import { ClientProvider } from '@/shared/client/client-provider';
import { serverClock } from '@/shared/client/clock';
import { startLive } from '@/shared/client/live';
import { queryClient } from '@/shared/client/query-client';
import { rememberSignedIn } from '@/shared/client/session-state';
import { contours, vibrationOf, type SoundName } from '@/shared/client/sound-contours';
import type { AlertDto } from '@/shared/contract/alert';
import { audioContextThat } from '../../support/audio-context';
import { fakeServer } from '../../app/workshop/server';

/** The socket's two ends: what the page listens to, and the mouth of the server. */
const socket = vi.hoisted(() => {
  const heard = new Map<string, ((event: unknown) => void)[]>();
  return {
    heard,
    on: (name: string, listener: (event: unknown) => void) => heard.set(name, [...(heard.get(name) ?? []), listener]),
    says: (name: string, event?: unknown) => heard.get(name)?.forEach((listener) => listener(event)),
    active: true,
    timeout: () => ({ emitWithAck: () => new Promise(() => {}) }),
    removeAllListeners: () => heard.clear(),
    disconnect() {},
    connect() {},
  };
});
vi.mock('socket.io-client', () => ({ io: () => socket }));

const start = Date.parse('2026-06-09T11:00:00Z');
const minute = 60_000;
const iso = (ms: number) => new Date(ms).toISOString();
const petra = { id: 'p1', name: 'Petra Aldwin' };
const hella = { id: 'p2', name: 'Hella Brandt' };
const alert = (more: Partial<AlertDto> = {}): AlertDto => ({
  id: 'a1',
  kind: 'charge-done',
  level: 'amber',
  chargeId: 'c1',
  title: 'R-2406 at B2',
  for: petra,
  forRole: null,
  turn: 0,
  seen: 'The current has ended.',
  checkFirst: 'Switch it off.',
  raisedAt: iso(start),
  lateByS: 0,
  takenBy: null,
  takenAt: null,
  passedAt: null,
  clearedAt: null,
  ...more,
});
const noticeOf = (id: string) => ({
  type: 'notify',
  notice: {
    ...{ title: 'R-2406 at B2', body: 'The current has ended. Switch it off.', url: '/charges/c1', tag: id },
    ...{ id, turn: 0 },
  },
});

/** The page keeps one for its life. */
const contexts = new Set<{ state: string }>();
let played: number[];
let shaken: number[][];
let told: unknown[];
let listed: AlertDto[];
let visible: DocumentVisibilityState;
let stops: (() => void)[];
let server: ReturnType<typeof fakeServer>;

/** A browser that plays after a tap, shakes, and shows notices by its worker. */
function browser() {
  played = [];
  shaken = [];
  told = [];
  for (const context of contexts) context.state = 'suspended';
  vi.stubGlobal(
    'AudioContext',
    audioContextThat((hertz) => played.push(hertz), contexts),
  );
  vi.stubGlobal(
    'Notification',
    Object.assign(function Notification() {}, { permission: 'granted' }),
  );
  vi.stubGlobal('isSecureContext', true);
  const registration = { active: { postMessage: (message: unknown) => told.push(message) } };
  const worker = { register: async () => registration, ready: Promise.resolve(registration) };
  Object.defineProperty(navigator, 'serviceWorker', { configurable: true, value: worker });
  Object.defineProperty(navigator, 'vibrate', { configurable: true, value: (p: number[]) => shaken.push(p) > 0 });
  Object.defineProperty(document, 'visibilityState', { configurable: true, get: () => visible });
}

const pass = (ms: number) => act(() => vi.advanceTimersByTimeAsync(ms));
const tap = async () => {
  fireEvent.pointerDown(document.body);
  await pass(0);
};
const look = (next: DocumentVisibilityState) => {
  visible = next;
  act(() => void document.dispatchEvent(new Event('visibilitychange')));
};
const tonesOf = (...sounds: SoundName[]) => sounds.flatMap((name) => contours[name].map(({ hertz }) => hertz));
const says = (name: string, event?: unknown) => act(() => socket.says(name, event));

const Shell = () => {
  useAlarmBell();
  return null;
};
/** The shell is opened, and the socket has come up. */
async function open() {
  const drawn = render(
    <ClientProvider>
      <Shell />
    </ClientProvider>,
  );
  const stop = startLive('member');
  stops.push(stop, drawn.unmount);
  await pass(0);
  await vi.waitFor(() => expect(socket.heard.has('alert:raised')).toBe(true));
  says('connect');
  await pass(1500);
  return () => {
    stop();
    drawn.unmount();
  };
}

beforeEach(() => {
  vi.useFakeTimers();
  vi.setSystemTime(start);
  serverClock.correct(0);
  localStorage.clear();
  rememberSignedIn('p1');
  queryClient.clear();
  visible = 'visible';
  stops = [];
  listed = [];
  browser();
  server = fakeServer('technician');
  server.answers['GET /api/alerts'] = () => Response.json(listed);
  server.answers['GET /api/board'] = () => Response.json({ rev: 1, at: iso(start), charges: [], channels: [] });
});
afterEach(() => {
  for (const stop of stops) stop();
  vi.useRealTimers();
  vi.unstubAllGlobals();
});

describe('an alert that is raised', () => {
  const raise = async (one: AlertDto = alert({ raisedAt: iso(Date.now()) })) => {
    listed = [one];
    says('alert:raised', one);
    await pass(1000);
    return one;
  };

  it('rings and shakes once on a page that is looked at, without a notice', async () => {
    await open();
    await tap();
    await raise();
    expect(played).toEqual(tonesOf('ready'));
    expect(shaken).toEqual([vibrationOf(contours.ready)]);
    await pass(60_000);
    expect(played).toEqual(tonesOf('ready'));
    expect(told).toEqual([]);
  });

  it('is handed to the service worker as one notice while the page is not looked at', async () => {
    await open();
    await tap();
    look('hidden');
    await raise();
    await pass(60_000);
    expect(told).toEqual([noticeOf('a1')]);
  });

  it('rings again after 5 and after 15 min, and no more once somebody has it', async () => {
    await open();
    await tap();
    const one = await raise();
    await pass(5 * minute);
    expect(played).toEqual(tonesOf('ready', 'ready'));
    listed = [{ ...one, takenBy: hella, takenAt: iso(Date.now()) }];
    says('alert:changed', { id: 'a1', at: iso(Date.now()) });
    await pass(30 * minute);
    expect(played).toEqual(tonesOf('ready', 'ready'));
    expect(told).toEqual([]);
  });

  it('waits for the first tap where the browser does not play before it', async () => {
    await open();
    await raise();
    await pass(60_000);
    expect(played).toEqual([]);
    await tap();
    await pass(1000);
    expect(played).toEqual(tonesOf('ready'));
  });

  it('of a colleague stays silent till it is passed on, then rings from that moment on', async () => {
    await open();
    await tap();
    await raise(alert({ for: hella }));
    await pass(7 * minute);
    expect(played).toEqual([]);
    await raise(alert({ passedAt: iso(Date.now()) }));
    expect(played).toEqual(tonesOf('ready'));
    await pass(5 * minute);
    expect(played).toEqual(tonesOf('ready', 'ready'));
  });
});

describe('what its person has set', () => {
  const ownRests = { id: 'c1', stage: 'resting', person: petra };
  const boardOf = (charges: unknown[]) => Response.json({ rev: 1, at: iso(start), charges, channels: [] });
  it.each([
    ['wanted: the low tone when its rest begins', ['app'], null, ['resting']],
    ['not wanted by this page: silence', ['e-mail'], null, []],
    ['in quiet hours: silence', ['app'], { from: '10:30', to: '11:20' }, []],
  ] as const)('the end of current is %s', async (_how, ways, quiet, sounds) => {
    const settings = { ways: [{ kind: 'charge-done', level: 'tell', ways }], quiet, alarmsBreakThrough: true };
    server.answers['GET /api/me/alert-settings'] = () => Response.json(settings);
    server.answers['GET /api/board'] = () => boardOf([{ ...ownRests, stage: 'tapering' }]);
    await open();
    await tap();
    act(() => void queryClient.setQueryData(['board'], { rev: 2, at: iso(start), charges: [ownRests], channels: [] }));
    await pass(1000);
    expect(played).toEqual(tonesOf(...sounds));
  });

  it.each(['visible', 'hidden'] as const)(
    'a cause that is not wanted by this page neither rings nor shows a notice, the page being %s',
    async (state) => {
      const one = alert({ raisedAt: iso(Date.now()) });
      const ways = [{ kind: one.kind, level: one.level, ways: ['browser-push', 'e-mail'] }];
      server.answers['GET /api/me/alert-settings'] = () =>
        Response.json({ ways, quiet: null, alarmsBreakThrough: true });
      await open();
      await tap();
      look(state);
      listed = [one];
      says('alert:raised', one);
      await pass(20 * minute);
      expect([played, shaken, told]).toEqual([[], [], []]);
    },
  );

  it('in quiet hours nothing rings till they are over, then what is open does, once', async () => {
    // 11:00 on the clock of the workshop, which keeps UTC.
    const settings = { ways: [], quiet: { from: '10:30', to: '11:20' }, alarmsBreakThrough: true };
    server.answers['GET /api/me/alert-settings'] = () => Response.json(settings);
    await open();
    await tap();
    listed = [alert({ raisedAt: iso(Date.now()) })];
    says('alert:raised', listed[0]);
    await pass(18 * minute);
    expect(played).toEqual([]);
    await pass(3 * minute);
    expect(played).toEqual(tonesOf('ready'));
  });
});

describe('an alert that was raised while this device was away', () => {
  it('rings once with a notice when the page is opened half an hour later, and not at the next reload', async () => {
    vi.setSystemTime(start + 30 * minute);
    listed = [alert()];
    const close = await open();
    await tap();
    await pass(60_000);
    expect([played, told]).toEqual([tonesOf('ready'), [noticeOf('a1')]]);
    close();
    queryClient.removeQueries({ queryKey: ['alerts'] });
    await open();
    await pass(60_000);
    expect([played, told]).toEqual([tonesOf('ready'), [noticeOf('a1')]]);
  });

  it('is told by a notice once this device may show them, however long it was known here before', async () => {
    const permission = vi.fn(() => 'default');
    Object.defineProperty(Notification, 'permission', { configurable: true, get: permission });
    vi.setSystemTime(start + 30 * minute);
    listed = [alert()];
    await open();
    await pass(10 * minute);
    expect(told).toEqual([]);
    permission.mockReturnValue('granted');
    await pass(60_000);
    expect(told).toEqual([noticeOf('a1')]);
  });

  it('rings once with a notice after the connection comes back', async () => {
    await open();
    await tap();
    says('disconnect', 'transport close');
    await pass(10 * minute);
    listed = [alert({ raisedAt: iso(start + 2 * minute) })];
    says('connect');
    await pass(60_000);
    expect([played, told]).toEqual([tonesOf('ready'), [noticeOf('a1')]]);
  });

  it('is silent where somebody took it before the page was looked at again', async () => {
    await open();
    await tap();
    const one = alert({ raisedAt: iso(Date.now()) });
    listed = [one];
    says('alert:raised', one);
    await pass(2000);
    look('hidden');
    played.length = 0;
    // The page sleeps over the second ring; a colleague takes the alert.
    vi.setSystemTime(start + 6 * minute);
    listed = [{ ...one, takenBy: hella, takenAt: iso(start + 4 * minute) }];
    look('visible');
    await pass(30_000);
    expect(played).toEqual([]);
  });
});
