import fs from 'node:fs';
import vm from 'node:vm';
import { beforeEach, describe, expect, test } from 'vitest';
import { fromRoot } from '@/server/cli/tools.mjs';

const origin = 'https://bench.example.com';
const source = fs.readFileSync(fromRoot('assets/web/sw.js'), 'utf8');

interface FakeWindow {
  url: string;
  /** Whether the page answers the worker's question to route by itself. */
  answers: boolean;
  focused: boolean;
  asked: unknown[];
  navigatedTo: string | null;
}

/** The worker's own script in a world of fakes: what it shows, opens and focuses is written down. */
function startWorker(windows: FakeWindow[]) {
  const listeners = new Map<string, (event: unknown) => void>();
  const shown: {
    title: string;
    options: { body: string; tag?: string; renotify: boolean; data: { url: string; turn?: number } };
  }[] = [];
  const opened: string[] = [];
  let tookOver = false;
  const clients = windows.map((window) => ({
    get url() {
      return window.url;
    },
    focus() {
      window.focused = true;
      return Promise.resolve(this);
    },
    postMessage(message: unknown, [port]: MessagePort[]) {
      window.asked.push(message);
      if (window.answers) port?.postMessage(true);
    },
    navigate(url: string) {
      window.navigatedTo = url;
      return Promise.resolve(this);
    },
  }));
  const self = {
    location: { origin },
    addEventListener: (name: string, listener: (event: unknown) => void) => listeners.set(name, listener),
    skipWaiting: () => {
      tookOver = true;
      return Promise.resolve();
    },
    registration: {
      showNotification: (title: string, options: (typeof shown)[number]['options']) => {
        shown.push({ title, options });
        return Promise.resolve();
      },
      getNotifications: ({ tag }: { tag: string }) =>
        Promise.resolve(
          shown.filter(({ options }) => options.tag === tag).map(({ options }) => ({ data: options.data })),
        ),
    },
    clients: {
      claim: () => Promise.resolve(),
      matchAll: () => Promise.resolve(clients),
      openWindow: (url: string) => {
        opened.push(url);
        return Promise.resolve(null);
      },
    },
  };
  vm.runInNewContext(source, { self, URL, MessageChannel, setTimeout, clearTimeout, Promise });

  /** Fires an event and waits for everything the worker asked to be waited for. */
  async function fire(name: string, event: object): Promise<void> {
    const waits: Promise<unknown>[] = [];
    listeners.get(name)?.({ ...event, waitUntil: (work: Promise<unknown>) => waits.push(work) });
    await Promise.all(waits);
  }
  const click = (url?: string) =>
    fire('notificationclick', { notification: { close: () => undefined, data: { url } } });
  return { fire, click, shown, opened, tookOver: () => tookOver };
}

const page = (address: string, answers = true): FakeWindow => ({
  url: origin + address,
  answers,
  focused: false,
  asked: [],
  navigatedTo: null,
});

describe('a notice', () => {
  let worker: ReturnType<typeof startWorker>;
  beforeEach(() => (worker = startWorker([])));

  test('posted by a page is shown with its cause as tag, so that a second one of the same cause replaces it', async () => {
    const notice = {
      title: 'R-214 is due for its check',
      body: 'Rested since 13:40',
      url: '/charges/c1',
      tag: 'alert-7',
    };
    await worker.fire('message', { data: { type: 'notify', notice } });
    expect(worker.shown).toHaveLength(1);
    expect(worker.shown[0]).toMatchObject({
      title: notice.title,
      options: { body: notice.body, tag: 'alert-7', data: { url: `${origin}/charges/c1` } },
    });
  });

  test('pushed as JSON is shown; pushed as bare text is shown as its words', async () => {
    await worker.fire('push', { data: { json: () => ({ title: 'Done', body: 'S-0391', tag: 'a' }) } });
    const text = { json: () => JSON.parse('not json') as unknown, text: () => 'not json' };
    await worker.fire('push', { data: text });
    expect(worker.shown.map(({ title, options }) => [title, options.body])).toEqual([
      ['Done', 'S-0391'],
      ['Bidewell', 'not json'],
    ]);
  });

  test('pushed twice for one turn of an alert is heard once; its next turn is heard again', async () => {
    const push = (turn: number) =>
      worker.fire('push', { data: { json: () => ({ title: 'Check due', tag: 'a7', id: 'a7', turn }) } });
    await push(0);
    await push(0);
    await push(1);
    await Promise.all([push(1), push(1)]);
    expect(worker.shown.map(({ options }) => [options.tag, options.renotify])).toEqual([
      ['a7', true],
      ['a7', false],
      ['a7', true],
      ['a7', false],
      ['a7', false],
    ]);
  });

  test('told once more by the open page is heard again', async () => {
    const notice = { title: 'Check due', tag: 'a7', id: 'a7', turn: 0 };
    await worker.fire('message', { data: { type: 'notify', notice } });
    await worker.fire('message', { data: { type: 'notify', notice: { title: 'Check due', tag: 'a7' } } });
    expect(worker.shown.map(({ options }) => options.renotify)).toEqual([true, true]);
  });

  test.each(['https://elsewhere.example.org/x', '//elsewhere.example.org', 'javascript:alert(1)', 'http://['])(
    'leading to %s leads to our own start instead',
    async (url) => {
      await worker.fire('message', { data: { type: 'notify', notice: { title: 'x', url } } });
      expect(worker.shown[0]?.options.data.url).toBe(`${origin}/`);
    },
  );
});

describe('a tap on a notice', () => {
  test('focuses the page that already shows the charge and moves no other', async () => {
    const windows = [page('/bench'), page('/charges/c1')];
    const worker = startWorker(windows);
    await worker.click('/charges/c1');
    expect(windows.map(({ focused }) => focused)).toEqual([false, true]);
    expect(windows.flatMap(({ asked }) => asked)).toEqual([]);
    expect(worker.opened).toEqual([]);
  });

  test('asks an open page to go there by itself, so that nothing typed is lost', async () => {
    const windows = [page('/bench')];
    const worker = startWorker(windows);
    await worker.click('/charges/c1');
    expect(windows[0]).toMatchObject({
      focused: true,
      asked: [{ type: 'open', url: `${origin}/charges/c1` }],
      navigatedTo: null,
    });
  });

  test('takes a page there that does not answer within a second', async () => {
    const windows = [page('/bench', false)];
    await startWorker(windows).click('/charges/c1');
    expect(windows[0]?.navigatedTo).toBe(`${origin}/charges/c1`);
  });

  test('leaves the wall on its board and opens a window of its own', async () => {
    const windows = [page('/wall')];
    const worker = startWorker(windows);
    await worker.click('/charges/c1');
    expect(windows[0]).toMatchObject({ focused: false, asked: [] });
    expect(worker.opened).toEqual([`${origin}/charges/c1`]);
  });

  test('opens a window where there is none', async () => {
    const worker = startWorker([]);
    await worker.click('/charges/c1');
    expect(worker.opened).toEqual([`${origin}/charges/c1`]);
  });
});

test('a new worker takes over when it is told to, and never by itself', async () => {
  const worker = startWorker([]);
  await worker.fire('install', {});
  await worker.fire('activate', {});
  expect(worker.tookOver()).toBe(false);
  await worker.fire('message', { data: { type: 'take-over' } });
  expect(worker.tookOver()).toBe(true);
});
