import fs from 'node:fs';
import path from 'node:path';
import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { fromRoot } from '@/server/cli/tools.mjs';
import { leftOutOfIndex } from '@/server/cli/web/leave-out.cjs';
import { firstLoadBudgetKib, measureFirstLoads, type FirstLoad } from '../bench/first-load';
import { describeInBrowser, openBrowser, viewports, visit } from '../support/browser';
import { launch, type Launched } from '../support/launch';

describeInBrowser('the built web app', () => {
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

  // The production build drops unused code, and the danger of that is a blank page: every first screen must draw.
  test.each([
    ['/', 'phone'],
    ['/estimate', 'phone'],
    ['/estimate', 'wide'],
    ['/wall', 'wall'],
    ['/sign-in', 'phone'],
    ['/bench-plan', 'wide'],
    ['/no/such/page', 'phone'],
  ] as const)(
    '%s opened directly on a %s screen draws words, without an error or a request to elsewhere',
    async (address, screen) => {
      const visitor = await visit(browser, server.url, { viewport: viewports[screen] });
      await visitor.page.goto(server.url + address);
      await expect.poll(() => visitor.page.locator('#root').innerText(), { timeout: 20_000 }).toMatch(/\p{L}{3,}/u);
      expect(visitor.problems).toEqual([]);
      await visitor.close();
    },
  );

  test('scripts and styles come compressed and may be kept for a year; the page itself may not', async () => {
    const page = await fetch(server.url, { headers: { 'accept-encoding': 'gzip' } });
    expect(page.headers.get('cache-control')).toMatch(/no-cache|no-store|max-age=0/);
    const script = /src="(\/_expo\/[^"]*entry-[^"]*\.js)"/.exec(await page.text())?.[1] ?? '';
    expect(script).not.toBe('');
    for (const encoding of ['br', 'gzip']) {
      const answer = await fetch(server.url + script, { headers: { 'accept-encoding': encoding } });
      expect(answer.headers.get('content-encoding')).toBe(encoding);
      expect(answer.headers.get('cache-control')).toMatch(/immutable/);
      const built = fs.readFileSync(path.join(fromRoot('dist'), script));
      expect(built.equals(Buffer.from(await answer.arrayBuffer()))).toBe(true);
    }
  });

  test('a file that does not exist is a 404 and not the page', async () => {
    for (const address of ['/_expo/static/js/web/no.js', '/assets/no.png', '/api/no-such-route', '/no.css']) {
      expect((await fetch(server.url + address)).status, address).toBe(404);
    }
    // The list of modules beside the build is not for visitors.
    expect((await fetch(`${server.url}/.chunks.json`)).status).toBe(404);
  });
});

describe('what is left out of the framework', () => {
  test('is asked for by no module of the build through the index it is left out of', () => {
    const lists = JSON.parse(fs.readFileSync(fromRoot('dist/.chunks.json'), 'utf8')) as Record<string, string[]>;
    const modules = [...new Set(Object.values(lists).flat())].filter((module) =>
      /^node_modules\/.*\.[jt]sx?$/.test(module),
    );
    expect(modules.length).toBeGreaterThan(500);
    // CommonJS reads a part off the index when it is called: react_native_1.Switch, require("react-native").Switch.
    const asks = new RegExp(
      `(?:\\b\\w*react_native\\w*|require\\(["']react-native["']\\))\\.(${leftOutOfIndex.join('|')})\\b`,
    );
    const asking = modules.flatMap((module) => {
      const found = asks.exec(fs.readFileSync(fromRoot(module), 'utf8'));
      return found ? [`${module}: ${found[0]}`] : [];
    });
    expect(asking).toEqual([]);
  });
});

describeInBrowser('the first load', () => {
  let loads: FirstLoad[];
  beforeAll(async () => {
    loads = await measureFirstLoads();
  });

  test('of /, /wall and /estimate holds no mathjs, no whole zod, no pdfkit and nothing of the server', () => {
    expect(loads.map(({ name, forbidden }) => ({ name, forbidden }))).toEqual(
      loads.map(({ name }) => ({ name, forbidden: [] })),
    );
  });

  test(`of /, /wall and /estimate is at most ${firstLoadBudgetKib} KiB gzip of scripts before the first interaction`, () => {
    for (const { name, gzipBytes } of loads) expect(gzipBytes / 1024, name).toBeLessThanOrEqual(firstLoadBudgetKib);
  });
});
