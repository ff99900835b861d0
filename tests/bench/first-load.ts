import fs from 'node:fs';
import path from 'node:path';
import zlib from 'node:zlib';
import type { Browser } from 'playwright-core';
import { fromRoot } from '@/server/cli/tools.mjs';
import { launch } from '../support/launch';
import { openBrowser, viewports, visit, type Visitor } from '../support/browser';
import { pairAsWall, signInAs } from '../support/demo';

/** What scripts may weigh before the first interaction, KiB gzip. */
export const firstLoadBudgetKib = 350;

/** Packages that have no business in the page: they belong to the server, or a lean part of them is used instead. */
const forbidden: [what: string, modules: RegExp][] = [
  ['mathjs', /node_modules\/mathjs\//],
  ['zod as a whole', /node_modules\/zod\//],
  ['pdfkit', /node_modules\/pdfkit\//],
  ['the server', /^server\/(?!cli\/web\/)/],
  [
    'packages of the server',
    /node_modules\/(express|typeorm|better-sqlite3|socket\.io|pino|jsonwebtoken|bcryptjs|helmet)\//,
  ],
];

export interface FirstLoad {
  /** The address as typed, with the name of who opens it. */
  name: string;
  /** Gzip bytes of every script fetched until the page has come to rest, nobody having touched it. */
  gzipBytes: number;
  /** The part of it that had arrived when the content was there to be used. */
  gzipBytesAtContent: number;
  /** File name → gzip bytes, largest first. */
  files: [file: string, gzipBytes: number][];
  /** Which forbidden packages were in it, with one module of each. */
  forbidden: string[];
}

/** The modules of each script, as the web build wrote them down. */
function modulesByFile(): Record<string, string[]> {
  return JSON.parse(fs.readFileSync(fromRoot('dist/.chunks.json'), 'utf8')) as Record<string, string[]>;
}

const gzipSize = (content: Buffer) => zlib.gzipSync(content, { level: 9 }).length;

const firstScreens = [
  { address: '/', name: '/ (nobody signed in)', viewport: viewports.phone, as: null, arrivesAt: '/sign-in' },
  { address: '/', name: '/ (technician)', viewport: viewports.phone, as: 'technician', arrivesAt: '/bench' },
  { address: '/wall', name: '/wall (pairing)', viewport: viewports.wall, as: null, arrivesAt: '/wall' },
  { address: '/wall', name: '/wall (paired)', viewport: viewports.wall, as: 'wall', arrivesAt: '/wall' },
  { address: '/estimate', name: '/estimate', viewport: viewports.phone, as: null, arrivesAt: '/estimate' },
] as const;

async function load(visitor: Visitor, url: string, address: string, name: string): Promise<FirstLoad> {
  const { page } = visitor;
  const sizes = new Map<string, number>();
  const reading: Promise<void>[] = [];
  page.on('response', (response) => {
    const file = new URL(response.url()).pathname;
    if (!file.endsWith('.js') || file === '/sw.js' || sizes.has(file)) return;
    sizes.set(file, 0);
    reading.push(response.body().then((body) => void sizes.set(file, gzipSize(body))));
  });
  await page.goto(url + address);
  await page.locator('[role="main"]:not(:empty)').first().waitFor({ timeout: 30_000 });
  const atContent = new Set(sizes.keys());
  await page.waitForLoadState('networkidle');
  await page.waitForTimeout(3000);
  await Promise.all(reading);

  const sum = (files: Iterable<string>) => [...files].reduce((total, file) => total + (sizes.get(file) ?? 0), 0);
  const lists = modulesByFile();
  const modules = [...sizes.keys()].flatMap((file) => lists[file.slice(1)] ?? []);
  return {
    name,
    gzipBytes: sum(sizes.keys()),
    gzipBytesAtContent: sum(atContent),
    files: [...sizes].map(([file, size]): [string, number] => [path.basename(file), size]).sort((a, b) => b[1] - a[1]),
    forbidden: forbidden.flatMap(([what, pattern]) => {
      const found = modules.find((module) => pattern.test(module));
      return found ? [`${what} (${found})`] : [];
    }),
  };
}

/**
 * Opens the first screens in Chromium against the built server with demo data, each with an empty cache, and adds up
 * the scripts they fetch before anybody touches them.
 */
export async function measureFirstLoads(): Promise<FirstLoad[]> {
  const server = await launch({ demo: true });
  let browser: Browser | null = null;
  try {
    browser = await openBrowser();
    const results: FirstLoad[] = [];
    const approver = await visit(browser, server.url);
    await signInAs(approver.context, server.url, 'foreman');
    for (const { address, name, viewport, as, arrivesAt } of firstScreens) {
      // As a browser comes: with motion, whose part loads by itself where something moves.
      const visitor = await visit(browser, server.url, { viewport, context: { reducedMotion: 'no-preference' } });
      if (as === 'technician') await signInAs(visitor.context, server.url, as);
      if (as === 'wall') await pairAsWall(visitor.context, approver.context, server.url);
      const result = await load(visitor, server.url, address, name);
      const at = new URL(visitor.page.url()).pathname;
      if (at !== arrivesAt) throw new Error(`${name} ended at ${at} instead of ${arrivesAt}`);
      results.push(result);
      await visitor.close();
    }
    return results;
  } finally {
    await browser?.close();
    await server.stop();
  }
}

const kib = (bytes: number) => `${(bytes / 1024).toFixed(1)} KiB`;

/** Lines to print: the first loads with their largest files, and what must not be in them. */
export async function benchFirstLoad(): Promise<string[]> {
  const lines = [`scripts before the first interaction, gzip (aim: at most ${firstLoadBudgetKib} KiB)`];
  for (const result of await measureFirstLoads()) {
    const over = result.gzipBytes > firstLoadBudgetKib * 1024 ? '  OVER' : '';
    lines.push(
      `  ${result.name}: ${kib(result.gzipBytes)}, of it until the content is there ${kib(result.gzipBytesAtContent)}${over}`,
    );
    for (const [file, size] of result.files.slice(0, 5)) lines.push(`    ${kib(size).padStart(10)}  ${file}`);
    for (const what of result.forbidden) lines.push(`    FORBIDDEN  ${what}`);
  }
  return lines;
}
