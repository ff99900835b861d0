import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { describeInBrowser, openBrowser, visit } from '../support/browser';
import { signInAs } from '../support/demo';
import { launch, type Launched } from '../support/launch';
import { watchNotices } from '../support/notices';

describeInBrowser('notices on this device', () => {
  let server: Launched;
  let browser: Browser;
  beforeAll(async () => {
    server = await launch({ demo: true });
    browser = await openBrowser();
  });
  afterAll(async () => {
    await browser?.close();
    await server?.stop();
  });

  test('a technician allows them under More, tries one, and it is shown by the browser', async () => {
    const visitor = await visit(browser, server.url, { context: { permissions: ['notifications'] } });
    await signInAs(visitor.context, server.url, 'technician');
    const { page } = visitor;
    // The browser of the test grants at once; the page must still ask, so it is told that nobody was asked yet.
    await page.addInitScript(() => {
      let asked = false;
      const answer = () => (asked ? 'granted' : 'default');
      Object.defineProperty(Notification, 'permission', { get: answer });
      Notification.requestPermission = () => {
        asked = true;
        return Promise.resolve('granted');
      };
    });
    await page.goto(`${server.url}/more`);
    const allow = page.getByRole('button', { name: 'Allow notices' });
    await allow.waitFor();
    const titles = await watchNotices(visitor.page);
    await allow.click();
    await page.getByRole('button', { name: 'Show one now' }).click();
    await expect.poll(titles, { timeout: 20_000 }).toContain('Bidewell tells you here');
    // Beside it what this device has missed before it was allowed to: the demo's open alerts, each once.
    await expect.poll(titles, { timeout: 20_000 }).toContain('R-2409 at A1');
    const shown = await titles();
    expect(new Set(shown).size).toBe(shown.length);
    expect(visitor.problems).toEqual([]);
    await visitor.close();
  });
});
