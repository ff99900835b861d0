import fs from 'node:fs';
import path from 'node:path';
import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { describeInBrowser, openBrowser, visit, type Visitor } from '../support/browser';
import { launch, type Launched } from '../support/launch';
import { watchNotices } from '../support/notices';

describeInBrowser('the service worker in Chromium', () => {
  let server: Launched;
  let browser: Browser;
  let visitor: Visitor;

  beforeAll(async () => {
    server = await launch({ demo: false });
    browser = await openBrowser();
    visitor = await visit(browser, server.url, { context: { permissions: ['notifications'] } });
    await visitor.page.goto(`${server.url}/estimate`);
    await visitor.page.evaluate(async () => {
      await navigator.serviceWorker.register('/sw.js');
      await navigator.serviceWorker.ready;
    });
  });
  afterAll(async () => {
    await browser?.close();
    await server?.stop();
  });

  test('shows a posted notice, and a second one of the same cause in its place', async () => {
    const post = (title: string) =>
      visitor.page.evaluate(async (text) => {
        const registration = await navigator.serviceWorker.ready;
        registration.active?.postMessage({
          type: 'notify',
          notice: { title: text, body: 'Check it', url: '/bench', tag: 'cause-1' },
        });
      }, title);
    const shown = () =>
      visitor.page.evaluate(async () => {
        const registration = await navigator.serviceWorker.ready;
        return (await registration.getNotifications()).map(({ title, tag, data }) => ({
          title,
          tag,
          data: data as unknown,
        }));
      });
    const titles = await watchNotices(visitor.page);
    await post('Resting has ended');
    await expect.poll(titles).toEqual(['Resting has ended']);
    expect((await shown()).map(({ title }) => title)).toEqual(['Resting has ended']);
    await post('Resting has ended, 10 min late');
    await expect.poll(titles).toHaveLength(2);
    expect(await shown()).toEqual([
      { title: 'Resting has ended, 10 min late', tag: 'cause-1', data: { url: `${server.url}/bench` } },
    ]);
  });

  test('keeps the files of one build and no number: without the server the app opens, and no call is answered', async () => {
    const kept = await visitor.page.evaluate(async () => {
      const names = await caches.keys();
      const files = await Promise.all(names.map(async (name) => (await caches.open(name)).keys()));
      return { names, files: files.flat().map(({ url }) => new URL(url).pathname) };
    });
    expect(kept.names).toEqual([expect.stringMatching(/^bidewell-shell-[0-9a-f]{16}$/)]);
    expect(kept.files).toContain('/');
    expect(kept.files.filter((file) => file.startsWith('/api'))).toEqual([]);
    await visitor.context.setOffline(true);
    await visitor.page.goto(`${server.url}/estimate`);
    await expect.poll(() => visitor.page.locator('#root').innerText()).toMatch(/\p{L}{3,}/u);
    const call = await visitor.page.evaluate(() =>
      fetch('/api/front-door').then(
        (answer) => `answered ${answer.status}`,
        () => 'not reached',
      ),
    );
    expect(call).toBe('not reached');
    await visitor.context.setOffline(false);
    await visitor.page.goto(`${server.url}/estimate`);
  });

  test('opens parts of screens that nobody has opened yet: every script of the build is answered without a connection', async () => {
    const folder = path.join(process.cwd(), 'dist/_expo/static');
    const scripts = fs
      .readdirSync(folder, { recursive: true })
      .map((name) => `/_expo/static/${String(name).split(path.sep).join('/')}`)
      .filter((name) => name.endsWith('.js'));
    expect(scripts.length).toBeGreaterThan(20);
    await visitor.context.setOffline(true);
    const unanswered = await visitor.page.evaluate(async (files) => {
      const answers = await Promise.all(files.map((file) => fetch(file).catch(() => null)));
      return files.filter((_, at) => !answers[at]?.ok);
    }, scripts);
    await visitor.context.setOffline(false);
    expect(unanswered).toEqual([]);
  });

  test('waits with a new version while a page of the old one is open', async () => {
    const states = await visitor.page.evaluate(async () => {
      // Another address of the same script counts as a new version.
      const registration = await navigator.serviceWorker.register('/sw.js?next');
      const next = registration.installing ?? registration.waiting;
      if (next?.state === 'installing')
        await new Promise((resolve) => next.addEventListener('statechange', resolve, { once: true }));
      const before = { waiting: registration.waiting?.scriptURL, active: registration.active?.scriptURL };
      const taken = new Promise((resolve) =>
        navigator.serviceWorker.addEventListener('controllerchange', resolve, { once: true }),
      );
      registration.waiting?.postMessage({ type: 'take-over' });
      await taken;
      return { ...before, after: registration.active?.scriptURL };
    });
    expect(states).toEqual({
      waiting: `${server.url}/sw.js?next`,
      active: `${server.url}/sw.js`,
      after: `${server.url}/sw.js?next`,
    });
  });
});
