import type { BrowserContext, Page } from 'playwright-core';
import { afterAll, beforeAll, expect, test } from 'vitest';
import type { ChargeDto } from '@/shared/contract/charge';
import { describeInBrowser, type Visitor } from '../support/browser';
import { launch } from '../support/launch';
import {
  button,
  enter,
  field,
  heading,
  judge,
  openHouse,
  openRow,
  patience,
  slowTest,
  stranger,
  words,
  type House,
} from './house';

/** What the browser itself says of calls that find nobody. */
const expected = [/Failed to load resource/, /WebSocket connection to/, /net::ERR_/];

/** The phone's clock is 7 min ahead, and nobody has noticed. */
const phoneAheadMs = 7 * 60_000;
async function wrongClock(context: BrowserContext): Promise<void> {
  await context.addInitScript((ahead) => {
    const real = Date;
    const shifted = class extends real {
      constructor(...given: [] | [number | string | Date]) {
        if (given.length === 0) super(real.now() + ahead);
        else super(...given);
      }
      static override now = () => real.now() + ahead;
    };
    globalThis.Date = shifted as DateConstructor;
  }, phoneAheadMs);
}

/** The app is kept, and this worker answers for the page. */
async function untilShellKept(page: Page): Promise<void> {
  await expect
    .poll(
      () =>
        page.evaluate(async () => {
          const names = await caches.keys();
          return Boolean(navigator.serviceWorker.controller) && names.length === 1;
        }),
      patience,
    )
    .toBe(true);
}

/** Keys of the answers that are written down on this device. */
const keptKeys = (page: Page): Promise<string[]> =>
  page.evaluate(async () => {
    // Opened before the app has made it, the database would be there without its store.
    if (!(await indexedDB.databases()).some(({ name }) => name === 'bidewell-answers')) return [];
    return new Promise<string[]>((resolve, reject) => {
      const open = indexedDB.open('bidewell-answers');
      open.onerror = () => reject(open.error);
      open.onsuccess = () => {
        const keys = open.result.transaction('answers').objectStore('answers').getAllKeys();
        keys.onsuccess = () => {
          open.result.close();
          resolve(keys.result.map(String));
        };
      };
    });
  });

/** Waits until the answer with this key is written down, whoever it was given to. */
const untilKept = (page: Page, key: string[]): Promise<void> =>
  expect
    .poll(async () => (await keptKeys(page)).some((one) => one.endsWith(` ${JSON.stringify(key)}`)), patience)
    .toBe(true);

describeInBrowser('a phone that loses its connection', () => {
  let house: House;
  let technician: Visitor;
  const ids: Record<string, string> = {};
  const chargeOf = async (title: string): Promise<ChargeDto> => {
    const answer = await technician.context.request.get(`${house.server.url}/api/charges/${ids[title]}`);
    return (await answer.json()) as ChargeDto;
  };
  const goAway = async () => {
    await technician.context.setOffline(true);
    await house.server.stop({ signal: 'SIGKILL', keepData: true });
  };
  const comeBack = async () => {
    const { dataDir, port } = house.server;
    house.server = await launch({ demo: true, dataDir, port });
    await technician.context.setOffline(false);
  };

  beforeAll(async () => {
    house = await openHouse();
    technician = await enter(house, 'technician', { size: 'phone', expected });
    await wrongClock(technician.context);
    const answer = await technician.context.request.get(`${house.server.url}/api/charges?open=1`);
    for (const { id, title } of (await answer.json()) as { id: string; title: string }[]) ids[title] = id;
  });
  afterAll(() => house?.close());

  test('can install the app: nothing is in the way of it for Chromium', async () => {
    const { page, context } = technician;
    await page.goto('/bench');
    await heading(page, 'Bench').waitFor();
    const session = await context.newCDPSession(page);
    const { installabilityErrors } = await session.send('Page.getInstallabilityErrors');
    // Chromium installs nothing from a window without a trace, as each context of these tests is.
    expect(installabilityErrors.map(({ errorId }) => errorId).filter((id) => id !== 'in-incognito')).toEqual([]);
    const { errors, url } = await session.send('Page.getAppManifest');
    expect([errors, new URL(url).pathname]).toEqual([[], '/manifest.webmanifest']);
  });

  test(
    'keeps the board and the charges it has seen, marked old; what is logged waits, over a reload, and is sent once each in order',
    async () => {
      const { page } = technician;
      for (const title of ['R-2411', 'R-2409', 'R-2413']) {
        await page.goto(`/charges/${ids[title]}`);
        await heading(page, title).waitFor();
        await untilKept(page, ['charge', ids[title]!]);
      }
      await page.goto('/bench');
      await words(page, 'R-2411').waitFor();
      await untilShellKept(page);
      await untilKept(page, ['board']);
      await untilKept(page, ['session']);
      const before = { running: await chargeOf('R-2411'), due: await chargeOf('R-2409') };

      await goAway();
      const left = Date.now();
      await words(page, /^No connection since \d\d:\d\d\. Readings you log are kept on this phone/).waitFor();
      await openRow(page, 'R-2411');
      await words(page, /^as known at \d\d:\d\d/).waitFor();
      await judge(technician, 'offline-live');

      await logReading(page, 'R-2411', '23');
      await button(page, 'Looked in').click();
      await words(page, /^Looked in$/).waitFor();

      // Closed and opened again without any connection: the same board, the same charge, what waits.
      await page.goto('/bench');
      await words(page, /^No connection since \d\d:\d\d\. .*: 2 waiting\./).waitFor();
      await words(page, 'R-2411').waitFor();
      await judge(technician, 'offline-bench');
      await openRow(page, 'R-2411');
      await heading(page, 'Waiting on this phone').waitFor();
      await logReading(page, 'R-2411', '24');
      await judge(technician, 'offline-waiting');

      await page.goto(`/charges/${ids['R-2409']}/check`);
      await heading(page, 'Check after rest').waitFor();
      const { targetVolts } = before.due;
      await field(page, 'Group 1').fill((targetVolts + 0.001).toFixed(3));
      await field(page, 'Group 2').fill((targetVolts - 0.001).toFixed(3));
      await field(page, 'At the module').fill('22');
      await judge(technician, 'offline-check');
      await button(page, 'Keep the check on this device').click();
      await words(page, /^Check after rest: /).waitFor();

      // Another, of a charge that is over by the time it arrives.
      await page.goto(`/charges/${ids['R-2413']}`);
      await logReading(page, 'R-2413', '25');
      await page.reload();
      await words(page, /: 5 waiting\./).waitFor();

      const { dataDir, port } = house.server;
      house.server = await launch({ demo: true, dataDir, port });
      await stopOf('R-2413');
      const posts: string[] = [];
      technician.context.on('request', (request) => {
        if (request.method() === 'POST' && request.url().includes('/api/charges/')) posts.push(request.url());
      });
      await technician.context.setOffline(false);
      await expect.poll(() => page.getByText(/No connection since/).count(), { timeout: 60_000 }).toBe(0);
      await words(page, 'One entry of this device was not taken.').waitFor();

      const after = { running: await chargeOf('R-2411'), due: await chargeOf('R-2409') };
      const own = after.running.readings.slice(before.running.readings.length);
      expect(own.map(({ celsius }) => celsius)).toEqual([23, 24]);
      expect(after.running.events.filter(({ kind }) => kind === 'look-in')).toHaveLength(
        before.running.events.filter(({ kind }) => kind === 'look-in').length + 1,
      );
      expect(after.due.restChecks).toHaveLength(before.due.restChecks.length + 1);
      expect(after.due.stage).toBe('ready');
      // When they were done, by the server's clock: not 7 min later, and not when they arrived.
      for (const { at } of own) {
        expect(Date.parse(at)).toBeGreaterThan(left - 60_000);
        expect(Date.parse(at)).toBeLessThan(Date.now());
      }
      expect(Date.parse(own[0]!.at) - left).toBeLessThan(60_000);
      const acts = posts.map((url) => url.split('/').slice(-2).join('/'));
      expect(acts.filter((act) => act.startsWith(`${ids['R-2411']}/`))).toEqual([
        `${ids['R-2411']}/readings`,
        `${ids['R-2411']}/look-ins`,
        `${ids['R-2411']}/readings`,
      ]);

      // What was not taken says why, with what is there now, and can be removed.
      await button(page, 'See why').or(page.getByText('See why')).first().click();
      await heading(page, 'Waiting on this phone').waitFor();
      await words(page, /R-2413 was stopped\. Readings belong to a charge that is under way\./).waitFor();
      await judge(technician, 'offline-not-taken');
      await words(page, 'Remove').click();
      await words(page, /^Nothing waits on this phone\./).waitFor();
      expect(technician.problems).toEqual([]);
    },
    slowTest,
  );

  test('two pages of one browser send what waits once', async () => {
    const { page, context } = technician;
    await page.goto(`/charges/${ids['R-2411']}`);
    await heading(page, 'R-2411').waitFor();
    const second = await context.newPage();
    second.setDefaultTimeout(patience.timeout);
    await second.goto(`/charges/${ids['R-2411']}`);
    await heading(second, 'R-2411').waitFor();
    const before = (await chargeOf('R-2411')).readings.length;
    await goAway();
    await words(second, /^No connection since/).waitFor();
    await words(page, /^No connection since/).waitFor();
    await logReading(page, 'R-2411', '26');
    await words(second, /: 1 waiting\./).waitFor();
    let posts = 0;
    context.on('request', (request) => {
      if (request.method() === 'POST' && request.url().endsWith('/readings')) posts += 1;
    });
    await comeBack();
    await expect.poll(() => second.getByText(/1 waiting/).count(), { timeout: 60_000 }).toBe(0);
    await expect.poll(() => page.getByText(/No connection since/).count(), { timeout: 60_000 }).toBe(0);
    expect((await chargeOf('R-2411')).readings.length - before).toBe(1);
    expect(posts).toBe(1);
    await second.close();
  });

  test('after signing out nothing is shown without a connection, and nothing is left on the device', async () => {
    const { page } = technician;
    await page.goto('/more');
    await button(page, /^Sign out/).click();
    await page.waitForURL('**/sign-in');
    await expect.poll(() => keptKeys(page), patience).toEqual([]);
    await technician.context.setOffline(true);
    await page.goto('/bench');
    await page.waitForURL('**/sign-in');
    expect(await page.getByText('R-2411').count()).toBe(0);
    await technician.context.setOffline(false);
  });

  async function logReading(page: Page, title: string, celsius: string): Promise<void> {
    await button(page, 'Log a reading').click();
    const sheet = page.getByRole('dialog').filter({ hasText: 'Log a reading' });
    await field(sheet, 'Module').fill(celsius);
    await button(sheet, 'Keep it on this device').click();
    // Within its limits it may still be odd for this hour: it reads so.
    const anyway = button(sheet, 'It reads so: log it');
    await Promise.race([anyway.waitFor(), sheet.waitFor({ state: 'detached' })]);
    if (await anyway.isVisible()) await anyway.click();
    await heading(page, title).waitFor();
    await heading(page, 'Waiting on this phone').waitFor();
  }

  async function stopOf(title: string): Promise<void> {
    const foreman = await stranger(house);
    const { request } = foreman.context;
    const origin = house.server.url;
    await request.post(`${origin}/api/demo/sign-in`, { data: { role: 'foreman' }, headers: { origin } });
    const charge = (await (await request.get(`${origin}/api/charges/${ids[title]}`)).json()) as ChargeDto;
    const stopped = await request.post(`${origin}/api/charges/${ids[title]}/stop`, {
      data: { reason: 'The pack was sold meanwhile' },
      headers: { origin, 'if-match': `"${charge.rev}"`, 'idempotency-key': 'stopped-by-the-test' },
    });
    expect(stopped.status()).toBe(200);
    await foreman.close();
  }
});
