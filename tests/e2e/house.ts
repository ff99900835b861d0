/** What the tests in a browser share: a running server with a browser, people at its door, and what must hold of every screen. */
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { DateTime } from 'luxon';
import type { Browser, BrowserContextOptions, Locator, Page } from 'playwright-core';
import { afterEach, expect } from 'vitest';
import { fromRoot } from '@/server/cli/tools.mjs';
import { demoZone } from '@/server/demo/hours';
import type { Role } from '@/shared/contract/roles';
import { openBrowser, seriousFindings, shot, viewports, visit, type Visitor } from '../support/browser';
import { signInAs } from '../support/demo';
import { launch, type Launched, type LaunchOptions } from '../support/launch';

export type ScreenSize = keyof typeof viewports;

/** Waits for the server and for what it does by itself; nothing here is timed more tightly than a slow machine bears. */
export const patience = { timeout: 45_000 };

/** For a test that walks through many screens, ms: a bound against hanging, several times what it takes. */
export const slowTest = 420_000;

export interface House {
  server: Launched;
  browser: Browser;
  /** How far server and pages are ahead of the machine's clock, ms. */
  clockAheadMs: number;
  close: () => Promise<void>;
}

/** The demo's charges stand around the instant of its making: a copy older than this shows another day. */
const demoKeepsMs = 6 * 60_000;

/**
 * A data folder with a fresh demo. Making one is most of a start, and each file has its own server: it is made once
 * and copied for the others.
 */
async function demoData(clockAheadMs: number): Promise<string> {
  // A folder of one's own with a demo in it, while tests are being written.
  if (process.env.BIDEWELL_E2E_DEMO) return copied(process.env.BIDEWELL_E2E_DEMO);
  const day = clockAheadMs === 0 ? '' : `-${new Date(Date.now() + clockAheadMs).toISOString().slice(0, 10)}`;
  const made = fromRoot(`node_modules/.cache/bidewell-e2e-demo${day}`);
  const age = fs.existsSync(made) ? Date.now() - fs.statSync(made).mtimeMs : Infinity;
  const built = fs.statSync(fromRoot('dist-server/main.js')).mtimeMs;
  if (age > demoKeepsMs || Date.now() - age < built) {
    const fresh = fs.mkdtempSync(`${made}-`);
    const server = await launch({ dataDir: fresh, clockAheadMs });
    await server.stop();
    fs.rmSync(made, { recursive: true, force: true });
    fs.renameSync(fresh, made);
    fs.utimesSync(made, new Date(), new Date());
  }
  return copied(made);
}

function copied(folder: string): string {
  const copy = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-e2e-'));
  fs.cpSync(folder, copy, { recursive: true });
  return copy;
}

/**
 * How far the next working morning of the demo is ahead, ms: half past eight of a weekday. What a plan can do depends on
 * who is still there to look in, so that what is tested of it must not hang on the hour of the test.
 */
export function untilMorning(): number {
  const now = DateTime.now().setZone(demoZone());
  let morning = now.set({ hour: 8, minute: 30, second: 0, millisecond: 0 });
  while (morning <= now || morning.weekday > 5) morning = morning.plus({ days: 1 });
  return morning.diff(now).toMillis();
}

/** A server of its own with the browser that looks at it. */
export async function openHouse({ demo = true, clockAheadMs = 0, ...options }: LaunchOptions = {}): Promise<House> {
  const dataDir = demo ? await demoData(clockAheadMs) : undefined;
  const server = await launch({ ...options, demo, dataDir, clockAheadMs });
  try {
    const browser = await openBrowser();
    const house: House = {
      server,
      browser,
      clockAheadMs,
      close: async () => {
        await browser.close();
        // The one that runs now: a test may have ended the first and started another over its data.
        await house.server.stop();
        if (dataDir) fs.rmSync(dataDir, { recursive: true, force: true });
      },
    };
    return house;
  } catch (error) {
    await server.stop({ signal: 'SIGKILL' });
    throw error;
  }
}

/** Who is in: for a picture of what they saw when a test failed. */
const inside = new Set<Visitor>();
afterEach(async ({ task }) => {
  if (task.result?.state !== 'fail') return;
  for (const visitor of inside)
    if (!visitor.page.isClosed()) {
      const { pathname } = new URL(visitor.page.url());
      await shot(visitor.page, `failed-${task.id}-${pathname.replace(/\W+/g, '-')}`).catch(() => undefined);
      if (visitor.problems.length > 0) console.error(pathname, visitor.problems);
    }
});

export interface DoorOptions {
  size?: ScreenSize;
  /** Console errors that the test itself provokes. */
  expected?: RegExp[];
  context?: BrowserContextOptions;
}

/** Somebody who has not signed in. */
export async function stranger(house: House, options: DoorOptions = {}): Promise<Visitor> {
  const { server, browser, clockAheadMs } = house;
  const { size = 'phone', expected, context } = options;
  const visitor = await visit(browser, server.url, { viewport: viewports[size], expected, context, clockAheadMs });
  visitor.page.setDefaultTimeout(patience.timeout);
  visitor.context.setDefaultTimeout(patience.timeout);
  inside.add(visitor);
  visitor.context.on('close', () => inside.delete(visitor));
  return visitor;
}

/** Somebody who came in by the demo's one tap, on the bench. */
export async function enter(house: House, role: Role, options: DoorOptions = {}): Promise<Visitor> {
  const visitor = await stranger(house, options);
  await visitor.page.goto('/');
  await visitor.page.getByRole('button', { name: `Enter the demo as ${role}` }).click();
  await visitor.page.waitForURL('**/bench');
  await heading(visitor.page, 'Bench').waitFor();
  return visitor;
}

/** Somebody of the demo who has signed in, without walking through the sign-in page; at `address`. */
export async function member(
  house: House,
  role: Role,
  address = '/bench',
  options: DoorOptions = {},
): Promise<Visitor> {
  const visitor = await stranger(house, options);
  await signInAs(visitor.context, house.server.url, role);
  await visitor.page.goto(address);
  return visitor;
}

/** Somebody who joined with a password, on the bench. */
export async function signIn(
  house: House,
  person: { email: string; password: string },
  options: DoorOptions = {},
): Promise<Visitor> {
  const visitor = await stranger(house, options);
  await visitor.page.goto('/sign-in');
  await visitor.page.getByLabel('E-mail').fill(person.email);
  await visitor.page.getByLabel('Password', { exact: true }).fill(person.password);
  await visitor.page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await visitor.page.waitForURL('**/bench');
  return visitor;
}

export const heading = (page: Page | Locator, name: string | RegExp): Locator =>
  page
    .getByRole('heading', { name, exact: typeof name === 'string' })
    .locator('visible=true')
    .first();

/** The part of the tab that is looked at: the stack keeps the screens behind it, hidden. */
export const button = (page: Page | Locator, name: string | RegExp): Locator =>
  page
    .getByRole('button', { name, exact: typeof name === 'string' })
    .locator('visible=true')
    .first();

export const link = (page: Page | Locator, name: string | RegExp): Locator =>
  page
    .getByRole('link', { name, exact: typeof name === 'string' })
    .locator('visible=true')
    .first();

/** A field by its label; of several screens in the stack, the one that is seen. */
export const field = (page: Page | Locator, name: string | RegExp): Locator =>
  page
    .getByLabel(name, { exact: typeof name === 'string' })
    .locator('visible=true')
    .first();

export const words = (page: Page | Locator, text: string | RegExp): Locator =>
  page.getByText(text).locator('visible=true').first();

/** The sentence that describes a field: what is wrong with it; '' where there is none. */
export async function sentenceAt(input: Locator): Promise<string> {
  const ids = (await input.getAttribute('aria-describedby'))?.split(' ') ?? [];
  const id = ids.find((one) => one.endsWith('-note')) ?? '';
  return id === '' ? '' : input.page().locator(`[id="${id}"]`).first().innerText();
}

/** Waits until a heading stands there, nothing says that it is still coming, and the fonts are in. */
export async function drawn(page: Page): Promise<void> {
  await page.waitForFunction(() => {
    const seen = (part: Element) => part.getClientRects().length > 0;
    const headed = [...document.querySelectorAll('h1, h2, h3, [role="heading"]')].some(seen);
    const busy = [...document.querySelectorAll('[aria-busy="true"]')].some(seen);
    return headed && !busy && document.fonts.status === 'loaded';
  });
}

/** How far the page reaches beyond the right edge, px. */
export const overflow = (page: Page): Promise<number> =>
  page.evaluate(() => Math.max(0, document.documentElement.scrollWidth - window.innerWidth));

/** What must hold of every screen: drawn, no error, nothing beyond its edge, nothing serious for axe. Keeps a picture. */
export async function judge(visitor: Visitor, name: string): Promise<void> {
  await drawn(visitor.page);
  await shot(visitor.page, name);
  const found = await seriousFindings(visitor.page);
  expect({ name, found, overflow: await overflow(visitor.page), problems: visitor.problems }).toEqual({
    name,
    found: [],
    overflow: 0,
    problems: [],
  });
}

/** Opens a charge from the bench, wherever it stands there: as a row or in a call-out. */
export async function openRow(page: Page, title: string): Promise<void> {
  const row = page.getByRole('link', { name: new RegExp(`^${title}, `) });
  const open = page.getByRole('button', { name: `Open ${title}`, exact: true });
  const step = page.getByRole('button', { name: new RegExp(`, ${title}$`) });
  const way = row.or(open).or(step).locator('visible=true').first();
  await way.click();
  await page.waitForURL(/\/charges\//);
  await heading(page, title).waitFor();
}

/** Answers all checks before clipping on with yes, one after the other as they open. */
export async function answerChecks(page: Page): Promise<void> {
  const list = page.getByRole('list', { name: 'Checks before clipping on' });
  const open = list.getByRole('listitem').filter({ has: page.getByRole('heading') });
  const start = button(page, 'Clip on and start the timer');
  await start.waitFor();
  while ((await start.getAttribute('aria-disabled')) === 'true') {
    const question = await open.getByRole('heading').innerText();
    await open.getByRole('button').first().click();
    // The next one opens, or the list is through.
    await expect
      .poll(async () => ((await open.count()) === 0 ? '' : await open.getByRole('heading').innerText()), patience)
      .not.toBe(question);
    if ((await open.count()) === 0)
      await expect.poll(() => start.getAttribute('aria-disabled'), patience).not.toBe('true');
  }
}
