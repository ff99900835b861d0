import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import vm from 'node:vm';
import { afterEach, describe, expect, test } from 'vitest';
import { fromRoot } from '@/server/cli/tools.mjs';
import { shellOf, writeServiceWorker } from '@/server/cli/web/app-shell.mjs';

const origin = 'https://bench.example.com';
const source = fs.readFileSync(fromRoot('assets/web/sw-shell.js'), 'utf8');
const hash = (letter: string) => letter.repeat(32);
const entry = (letter: string) => `/_expo/static/js/web/entry-${hash(letter)}.js`;
const icon = '/icon-192.png';
const build = (letter: string) => ({
  build: letter,
  scripts: [entry(letter)],
  files: ['/', entry(letter), `/_expo/static/js/web/[id]-${hash('c')}.js`, icon],
});

/** One browser: its caches outlive a worker. */
class FakeCaches {
  stored = new Map<string, Map<string, Response>>();
  async open(name: string) {
    const files = this.stored.get(name) ?? new Map<string, Response>();
    this.stored.set(name, files);
    return {
      put: async (file: string, answer: Response) => void files.set(file, answer),
      match: async (file: string) => files.get(file)?.clone(),
    };
  }
  keys = async () => [...this.stored.keys()];
  delete = async (name: string) => this.stored.delete(name);
  match = async (file: string) =>
    [...this.stored.values()].map((files) => files.get(file)?.clone()).find((answer) => answer !== undefined);
}

/** A server that can be away, slow, or have another build; what it was asked is noted. */
function world(serves = 'a') {
  const server = {
    serves,
    away: false,
    status: 200,
    slow: false,
    asked: [] as string[],
  };
  const fetchOf = async (input: string | { url: string }) => {
    const file = typeof input === 'string' ? input : new URL(input.url).pathname;
    server.asked.push(file);
    if (server.away) throw new TypeError('Failed to fetch');
    if (server.slow) await new Promise((resolve) => setTimeout(resolve, 60_000).unref());
    const body = file === '/' || !file.includes('.') ? `<script src="${entry(server.serves)}">` : `file ${file}`;
    return new Response(body, { status: server.status });
  };
  const caches = new FakeCaches();
  const start = (letter: string | null, pages = 1) => {
    const listeners = new Map<string, ((event: unknown) => void)[]>();
    let tookOver = false;
    const self = {
      ...(letter === null ? {} : { bidewellShell: build(letter) }),
      location: { origin },
      clients: { matchAll: async () => Array.from({ length: pages }, () => ({})) },
      skipWaiting: async () => void (tookOver = true),
      addEventListener: (name: string, listener: (event: unknown) => void) =>
        listeners.set(name, [...(listeners.get(name) ?? []), listener]),
    };
    // The wait for a slow page is cut short; nothing else of the worker is timed.
    const quick = (work: () => void) => setTimeout(work, 20);
    vm.runInNewContext(source, { self, caches, fetch: fetchOf, URL, Response, setTimeout: quick, clearTimeout });
    async function fire(name: string, event: object = {}): Promise<Response | undefined> {
      const waits: Promise<unknown>[] = [];
      let answer: Promise<Response> | undefined;
      for (const listener of listeners.get(name) ?? [])
        listener({
          ...event,
          waitUntil: (work: Promise<unknown>) => waits.push(work),
          respondWith: (given: Promise<Response>) => (answer = given),
        });
      await Promise.all(waits);
      return answer;
    }
    const ask = (address: string, mode = 'cors', method = 'GET') =>
      fire('fetch', { request: { url: address.startsWith('http') ? address : origin + address, mode, method } });
    return { fire, ask, open: (address: string) => ask(address, 'navigate'), tookOver: () => tookOver };
  };
  return { server, caches, start };
}

const textOf = async (answer: Response | undefined) => (answer ? answer.text() : null);

describe('the shell of the app', () => {
  test('keeps all files of one build when it is laid, and serves them without asking the server again', async () => {
    const { server, caches, start } = world();
    const worker = start('a');
    await worker.fire('install');
    expect(await caches.keys()).toEqual(['bidewell-shell-a']);
    server.asked.length = 0;
    server.away = true;
    expect(await textOf(await worker.ask(entry('a')))).toBe(`file ${entry('a')}`);
    // A bracket in a route's file may come escaped.
    expect(await textOf(await worker.ask(`/_expo/static/js/web/%5Bid%5D-${hash('c')}.js`))).toContain('[id]');
    expect(server.asked).toEqual([]);
  });

  test('opens any screen without a connection, and after 4 s where the server does not answer', async () => {
    const { server, start } = world();
    const worker = start('a');
    await worker.fire('install');
    server.away = true;
    expect(await textOf(await worker.open('/charges/c1/log'))).toContain(entry('a'));
    Object.assign(server, { away: false, slow: true });
    expect(await textOf(await worker.open('/bench'))).toContain(entry('a'));
    Object.assign(server, { slow: false, status: 502 });
    expect(await textOf(await worker.open('/bench'))).toContain(entry('a'));
  });

  test('with a connection the page is the server’s own: a new build shows at the next load', async () => {
    const { server, start } = world();
    const worker = start('a');
    await worker.fire('install');
    server.serves = 'b';
    expect(await textOf(await worker.open('/bench'))).toContain(entry('b'));
  });

  test.each([
    ['/api/board', 'cors'],
    ['/api/charges/c1/label.pdf', 'navigate'],
    ['/socket.io/?EIO=4', 'cors'],
    ['/sw.js', 'cors'],
    ['https://elsewhere.example.org/icon-192.png', 'cors'],
  ])('leaves %s (%s) to the server', async (address, mode) => {
    const worker = world().start('a');
    await worker.fire('install');
    expect(await worker.ask(address, mode)).toBeUndefined();
    expect(await worker.ask('/bench', 'navigate', 'POST')).toBeUndefined();
  });

  test('is kept whole or not at all: a file that fails, or a page of another build, lays nothing', async () => {
    for (const fault of [{ status: 404 }, { away: true }, { serves: 'b' }]) {
      const { server, caches, start } = world();
      Object.assign(server, fault);
      await expect(start('a').fire('install')).rejects.toThrow();
      expect(await caches.keys()).toEqual([]);
    }
  });

  test('a new build is laid beside the old one, takes over its unchanged files, and drops it when it is active', async () => {
    const { server, caches, start } = world();
    await start('a').fire('install');
    await caches.open('somebody-elses');
    Object.assign(server, { serves: 'b', asked: [] });
    const next = start('b');
    await next.fire('install');
    expect((await caches.keys()).sort()).toEqual(['bidewell-shell-a', 'bidewell-shell-b', 'somebody-elses']);
    expect(server.asked.sort()).toEqual(['/', entry('b'), icon].sort());
    await next.fire('activate');
    expect((await caches.keys()).sort()).toEqual(['bidewell-shell-b', 'somebody-elses']);
  });

  test('takes over for a page that is of its build already only where no second page is open', async () => {
    for (const [pages, over] of [
      [1, true],
      [2, false],
    ] as const) {
      const worker = world().start('a', pages);
      await worker.fire('install');
      await worker.fire('message', { data: { type: 'notify' } });
      expect(worker.tookOver()).toBe(false);
      await worker.fire('message', { data: { type: 'take-over-alone' } });
      expect(worker.tookOver()).toBe(over);
    }
  });

  test('without a build (development) nothing is kept and nothing answered', async () => {
    const { caches, start } = world();
    const worker = start(null);
    await worker.fire('install');
    expect(await worker.open('/bench')).toBeUndefined();
    expect(await caches.keys()).toEqual([]);
  });
});

describe('the build of the worker', () => {
  const folders: string[] = [];
  afterEach(() => folders.splice(0).forEach((folder) => fs.rmSync(folder, { recursive: true })));
  function exported(change: Record<string, string> = {}) {
    const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-shell-'));
    folders.push(folder);
    const files = {
      'index.html': `<html><script src="${entry('a')}" defer></script></html>`,
      [`_expo/static/js/web/entry-${hash('a')}.js`]: 'entry',
      'fonts/num-600.woff2': 'font',
      'fonts/OFL.txt': 'licence',
      'icon-192.png': 'icon',
      'manifest.webmanifest': '{}',
      'assets/node_modules/x/back.png': 'picture',
      'sw.js': 'self.notices = true;',
      'sw-shell.js': 'self.laid = self.bidewellShell.build;',
      ...change,
    };
    for (const [name, text] of Object.entries(files)) {
      fs.mkdirSync(path.dirname(path.join(folder, name)), { recursive: true });
      fs.writeFileSync(path.join(folder, name), text);
    }
    return folder;
  }

  test('names the page, its scripts, fonts, icons and manifest, and neither licences nor itself', () => {
    expect(shellOf(exported())).toMatchObject({
      scripts: [entry('a')],
      files: ['/', entry('a'), '/fonts/num-600.woff2', '/icon-192.png', '/manifest.webmanifest'],
    });
  });

  test('is another with any byte of any of its files, and the same for the same', () => {
    const first = shellOf(exported()).build;
    expect(shellOf(exported()).build).toBe(first);
    expect(shellOf(exported({ 'icon-192.png': 'icon!' })).build).not.toBe(first);
    expect(shellOf(exported({ 'index.html': `<script src="${entry('a')}"></script> ` })).build).not.toBe(first);
  });

  test('is one script: the build, the shell and the notices', () => {
    const folder = exported();
    writeServiceWorker(folder);
    const self: Record<string, unknown> = {};
    vm.runInNewContext(fs.readFileSync(path.join(folder, 'sw.js'), 'utf8'), { self });
    expect(self).toMatchObject({ laid: shellOf(folder).build, notices: true });
    expect(fs.existsSync(path.join(folder, 'sw-shell.js'))).toBe(false);
  });
});
