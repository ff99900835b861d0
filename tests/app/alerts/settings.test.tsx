import { fireEvent, screen, waitFor, within } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import AlertSettings from '@/app/(workshop)/me/alerts';
import { alertCauses, defaultWays, type AlertSettingsDto } from '@/shared/contract/alert-settings';
import { draw, emptyDevice, input, press, problem } from '../charges/bench-of';
import { fakeServer } from '../workshop/server';

let server: ReturnType<typeof fakeServer>;
let settings: AlertSettingsDto;

/** The page registers its worker once and keeps it. */
const registration = { active: {}, pushManager: {} };

/** A browser with a push service, whose subscription the tests see. */
function browser({ permission = 'granted' as NotificationPermission, fails = false } = {}) {
  let subscription: { options: object; unsubscribe: () => Promise<boolean> } | null = null;
  const asked: unknown[] = [];
  const key = new Uint8Array([4, ...Array.from({ length: 64 }, (_, index) => index)]);
  registration.pushManager = {
    getSubscription: async () => subscription,
    subscribe: async (options: { applicationServerKey: Uint8Array }) => {
      asked.push(options);
      if (fails) throw new DOMException('Registration failed - push service error', 'AbortError');
      subscription = {
        endpoint: 'https://push.example.com/v1/abc',
        getKey: (name: string) => (name === 'p256dh' ? key.buffer : new Uint8Array(16).fill(255).buffer),
        options: { applicationServerKey: options.applicationServerKey.buffer },
        unsubscribe: async () => {
          subscription = null;
          return true;
        },
      } as never;
      return subscription;
    },
  };
  vi.stubGlobal('isSecureContext', true);
  vi.stubGlobal('PushManager', class {});
  vi.stubGlobal(
    'Notification',
    Object.assign(function Notification() {}, { permission, requestPermission: async () => permission }),
  );
  Object.defineProperty(navigator, 'serviceWorker', {
    configurable: true,
    value: {
      getRegistration: async () => registration,
      register: async () => registration,
      ready: Promise.resolve(registration),
    },
  });
  return { asked, subscribed: () => subscription !== null };
}

function open(more: Partial<AlertSettingsDto> = {}) {
  settings = {
    ways: alertCauses.map((cause) => ({ ...cause, ways: defaultWays(cause) })),
    quiet: null,
    alarmsBreakThrough: true,
    eMail: { address: 'petra@example.com', on: true },
    devices: [],
    ...more,
  };
  server = fakeServer('technician');
  server.answers['GET /api/me/alert-settings'] = () => Response.json(settings);
  server.answers['PATCH /api/me/alert-settings'] = (body) => {
    const change = body as Partial<AlertSettingsDto>;
    const ways = settings.ways.map(
      (cause) => change.ways?.find(({ kind, level }) => kind === cause.kind && level === cause.level) ?? cause,
    );
    settings = { ...settings, ...change, ways };
    return Response.json(settings);
  };
  server.answers['GET /api/push-key'] = () => Response.json({ key: 'BAECAwQ', demo: null });
  draw(<AlertSettings />);
}
const row = (name: RegExp) => screen.findByRole('button', { name });

beforeEach(() => {
  emptyDevice();
  browser();
});
afterEach(() => vi.unstubAllGlobals());

describe('where each cause goes', () => {
  it('says it of every cause by its level, the alarms first', async () => {
    open();
    await row(/^Overdue/);
    const titles = screen.getAllByRole('heading', { level: 2 }).map((title) => title.textContent);
    expect(titles).toEqual(['Alarms', 'Needs a hand', 'Only tells', 'Devices', 'Quiet hours']);
    expect((await row(/^Too warm/)).textContent).toContain('Sound, browser, phone, e-mail');
    expect((await row(/^Taper begun/)).textContent).toContain('Nowhere');
    // Over and settle needs a hand, on the mark only tells.
    expect(screen.getAllByRole('button', { name: /^Current is over/ })).toHaveLength(2);
  });

  it('is chosen in a sheet and sent for that cause alone', async () => {
    open();
    fireEvent.click(await row(/^Check due/));
    const sheet = within(await screen.findByRole('dialog'));
    fireEvent.click(sheet.getByRole('checkbox', { name: /^Push to your phones/ }));
    fireEvent.click(sheet.getByRole('checkbox', { name: /^E-mail/ }));
    fireEvent.click(sheet.getByRole('button', { name: 'Save where it goes' }));
    await waitFor(() => expect(screen.queryByRole('dialog')).toBeNull());
    expect(server.writes().map(({ body }) => body)).toEqual([
      { ways: [{ kind: 'check-due', level: 'amber', ways: ['app', 'browser-push', 'e-mail'] }] },
    ]);
    expect((await row(/^Check due/)).textContent).toContain('Sound, browser, e-mail');
  });

  it('refused, it says why and keeps what was ticked', async () => {
    open();
    server.answers['PATCH /api/me/alert-settings'] = () => problem(400, 'This cannot be kept.');
    fireEvent.click(await row(/^Check due/));
    const sheet = within(await screen.findByRole('dialog'));
    fireEvent.click(sheet.getByRole('checkbox', { name: /^E-mail/ }));
    fireEvent.click(sheet.getByRole('button', { name: 'Save where it goes' }));
    expect(await sheet.findByText('This cannot be kept.')).toBeTruthy();
    expect(sheet.getByRole('checkbox', { name: /^E-mail/ }).getAttribute('aria-checked')).toBe('true');
  });

  it('says what stands in its way: no e-mail on this server, no device yet', async () => {
    open({ eMail: { address: 'petra@example.com', on: false } });
    fireEvent.click(await row(/^Overdue/));
    const sheet = within(await screen.findByRole('dialog'));
    expect(sheet.getByText('This server sends no e-mail.')).toBeTruthy();
    expect(sheet.getByText('No browser yet: switch push on under Devices.')).toBeTruthy();
  });

  it('that could not be read is said, with a way to try again', async () => {
    server = fakeServer('technician');
    server.answers['GET /api/me/alert-settings'] = () => problem(400, 'Not now.');
    draw(<AlertSettings />);
    expect(await screen.findByText('Where your alerts go could not be read.')).toBeTruthy();
    expect(await press('Try again')).toBeTruthy();
  });
});

describe('quiet hours', () => {
  it('typed as 2200 and 6:00 are sent as times; an hour that is none stays at its field and is not sent', async () => {
    open();
    fireEvent.change(await input('From'), { target: { value: '2200' } });
    fireEvent.blur(await input('From'));
    fireEvent.change(await input('To'), { target: { value: '25:00' } });
    fireEvent.click(await press('Save the quiet hours'));
    expect(await screen.findByText('Type the time like 08:00.')).toBeTruthy();
    expect(server.writes()).toEqual([]);
    fireEvent.change(await input('To'), { target: { value: '6:00' } });
    fireEvent.blur(await input('To'));
    fireEvent.click(await press('Save the quiet hours'));
    await waitFor(() =>
      expect(server.writes().map(({ body }) => body)).toEqual([
        { quiet: { from: '22:00', to: '06:00' }, alarmsBreakThrough: true },
      ]),
    );
    expect(await screen.findByText(/^From 22:00 to 06:00 on the clock of the workshop/)).toBeTruthy();
  });

  it('are taken off by one press', async () => {
    open({ quiet: { from: '22:00', to: '06:00' } });
    fireEvent.click(await press('No quiet hours'));
    expect(await screen.findByText(/^None: every alert comes at once/)).toBeTruthy();
    expect(server.writes().map(({ body }) => body)).toEqual([{ quiet: null }]);
    expect((await input('From')).value).toBe('');
  });
});

describe('push to this device', () => {
  it('is switched on: the browser subscribes with the key of the server, which is told where to send', async () => {
    const { asked } = browser();
    open();
    server.answers['POST /api/me/push-devices'] = () => {
      const device = {
        id: 'd1',
        kind: 'browser',
        name: 'Chrome on Linux',
        addedAt: '2026-06-09T08:00:00Z',
        here: true,
      };
      settings = { ...settings, devices: [device as AlertSettingsDto['devices'][number]] };
      return Response.json(device, { status: 201 });
    };
    fireEvent.click(await press('Send pushes here'));
    await press('Stop pushes here');
    expect(asked).toEqual([{ userVisibleOnly: true, applicationServerKey: new Uint8Array([4, 1, 2, 3, 4]) }]);
    const [sent] = server.writes();
    expect(sent).toMatchObject({
      path: '/api/me/push-devices',
      body: { kind: 'browser', endpoint: 'https://push.example.com/v1/abc', keys: { auth: '_____________________w' } },
    });
    // 65 bytes without the padding, in the letters of addresses.
    expect((sent!.body as { keys: { p256dh: string } }).keys.p256dh).toMatch(/^[\w-]{87}$/);
  });

  it('is switched off: the server forgets it, then the browser', async () => {
    const { subscribed } = browser();
    open({ devices: [{ id: 'd1', kind: 'browser', name: 'Here', addedAt: '2026-06-09T08:00:00Z', here: true }] });
    const worker = await navigator.serviceWorker.getRegistration();
    await worker!.pushManager.subscribe({ applicationServerKey: new Uint8Array(5), userVisibleOnly: true });
    server.answers['DELETE /api/me/push-devices/d1'] = () => {
      settings = { ...settings, devices: [] };
      return new Response(null, { status: 204 });
    };
    fireEvent.click(await press('Stop pushes here'));
    await press('Send pushes here');
    expect(subscribed()).toBe(false);
  });

  it('in the demo is one of the demo’s own service: that of the browser’s maker is neither asked nor told', async () => {
    const { asked, subscribed } = browser();
    open();
    const demo = { endpoint: 'https://push.example.com/demo', keys: { p256dh: 'B'.repeat(87), auth: 'a'.repeat(22) } };
    server.answers['GET /api/push-key'] = () => Response.json({ key: 'BAECAwQ', demo });
    server.answers['POST /api/me/push-devices'] = () => {
      const device = { id: 'd1', kind: 'browser', name: 'Here', addedAt: '2026-06-09T08:00:00Z', here: true } as const;
      settings = { ...settings, devices: [device] };
      return Response.json(device, { status: 201 });
    };
    server.answers['DELETE /api/me/push-devices/d1'] = () => {
      settings = { ...settings, devices: [] };
      return new Response(null, { status: 204 });
    };
    fireEvent.click(await press('Send pushes here'));
    fireEvent.click(await press('Stop pushes here'));
    await press('Send pushes here');
    expect([asked, subscribed()]).toEqual([[], false]);
    expect(server.writes()).toMatchObject([
      { path: '/api/me/push-devices', body: { kind: 'browser', ...demo } },
      { method: 'DELETE', path: '/api/me/push-devices/d1' },
    ]);
  });

  it('that the browser’s service refuses says so, and nothing is sent to the server', async () => {
    browser({ fails: true });
    open();
    fireEvent.click(await press('Send pushes here'));
    expect(
      await screen.findByText('The push service of this browser did not answer. Try again in a while.'),
    ).toBeTruthy();
    expect(server.writes()).toEqual([]);
  });

  it.each([
    ['denied', { permission: 'denied' as const }, /^Refused on this device/],
    ['without push', null, /^Not to be had in this browser/],
  ])('%s says what can be done, without a button', async (_name, given, words) => {
    if (given) browser(given);
    else vi.stubGlobal('isSecureContext', false);
    open();
    expect(await screen.findByText(words)).toBeTruthy();
    expect(screen.queryByRole('button', { name: /pushes here$/ })).toBeNull();
  });

  it('another device of the person is removed by its name', async () => {
    open({ devices: [{ id: 'd2', kind: 'phone', name: 'Phone', addedAt: '2026-06-09T08:00:00Z', here: false }] });
    server.answers['DELETE /api/me/push-devices/d2'] = () => {
      settings = { ...settings, devices: [] };
      return new Response(null, { status: 204 });
    };
    fireEvent.click(await press('Remove Phone'));
    await waitFor(() => expect(screen.queryByRole('button', { name: 'Remove Phone' })).toBeNull());
  });
});
