import { AxeBuilder } from '@axe-core/playwright';
import fs from 'node:fs';
import path from 'node:path';
import { chromium, type Browser, type BrowserContext, type BrowserContextOptions, type Page } from 'playwright-core';
import { describe } from 'vitest';
import { chromiumPath, fromRoot } from '@/server/cli/tools.mjs';

/** The screens the product is drawn for. */
export const viewports = {
  phone: { width: 390, height: 844 },
  wide: { width: 1440, height: 900 },
  wall: { width: 1920, height: 1080 },
} as const;

const executablePath = chromiumPath();

/** `describe` for tests in a browser: skipped where there is no Chromium (`npm test` then lists what did not run). */
export const describeInBrowser = describe.skipIf(!executablePath);

/** @param more further arguments of Chromium, such as a camera to pretend */
export function openBrowser(more: string[] = []): Promise<Browser> {
  if (!executablePath) throw new Error('No Chromium on this machine. Debian: apt-get install chromium');
  return chromium.launch({
    executablePath,
    args: [
      '--no-sandbox',
      '--disable-gpu',
      '--disable-quic',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
      ...more,
    ],
  });
}

export interface Visitor {
  page: Page;
  context: BrowserContext;
  /** Console errors, uncaught errors and requests to another address than the server's, in the order they happened. */
  problems: string[];
  close: () => Promise<void>;
}

export interface VisitOptions {
  viewport?: { width: number; height: number };
  /** Console errors that the test itself provokes, such as the browser's own line about a 404. */
  expected?: RegExp[];
  context?: BrowserContextOptions;
  /** How far the clock of this person's pages goes ahead of the machine's, ms. */
  clockAheadMs?: number;
}

/** Runs in each page before its own code. */
function setClock(aheadMs: number): void {
  const RealDate = Date;
  class SetDate extends RealDate {
    constructor(...parts: unknown[]) {
      if (parts.length === 0) super(SetDate.now());
      else super(...(parts as [number]));
    }
    static override now(): number {
      return RealDate.now() + aheadMs;
    }
  }
  globalThis.Date = SetDate as DateConstructor;
}

/** A person with a browser of their own (cookies apart from every other visitor). */
export async function visit(browser: Browser, url: string, options: VisitOptions = {}): Promise<Visitor> {
  const { viewport = viewports.phone, expected = [], context: more = {}, clockAheadMs = 0 } = options;
  const narrow = viewport.width < 600;
  const context = await browser.newContext({
    baseURL: url,
    viewport,
    hasTouch: narrow,
    isMobile: narrow,
    locale: 'en-GB',
    reducedMotion: 'reduce',
    ...more,
  });
  if (clockAheadMs !== 0) await context.addInitScript(setClock, clockAheadMs);
  const page = await context.newPage();
  const problems: string[] = [];
  const note = (text: string) => {
    if (!expected.some((pattern) => pattern.test(text))) problems.push(text);
  };
  page.on('console', (message) => {
    if (message.type() === 'error') note(`console: ${message.text()} (${message.location().url})`);
  });
  page.on('pageerror', (error) => note(`page error: ${error.message}`));
  page.on('request', (request) => {
    const address = request.url();
    if (!address.startsWith(url) && !/^(data|blob):/.test(address) && !address.startsWith(url.replace(/^http/, 'ws')))
      note(`request to elsewhere: ${address}`);
  });
  return { page, context, problems, close: () => context.close() };
}

/**
 * What axe finds serious or critical on the page as it is drawn now, one line per rule and place; empty is good.
 * Rules: WCAG 2.2 A and AA and axe's best practices.
 */
export async function seriousFindings(page: Page): Promise<string[]> {
  const { violations } = await new AxeBuilder({ page }).analyze();
  return violations
    .filter((violation) => violation.impact === 'serious' || violation.impact === 'critical')
    .flatMap((violation) =>
      violation.nodes.map(
        (node) =>
          `${violation.impact} ${violation.id}: ${violation.help} at ${node.target.join(' ')} ${node.html.slice(0, 160)}`,
      ),
    );
}

/** Keeps a picture of the page under tests/e2e/shots/ (git-ignored); gives its path. */
export async function shot(page: Page, name: string): Promise<string> {
  const file = fromRoot('tests/e2e/shots', `${name}.png`);
  fs.mkdirSync(path.dirname(file), { recursive: true });
  await page.screenshot({ path: file });
  return file;
}
