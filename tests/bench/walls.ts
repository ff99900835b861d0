import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { freePort } from '../support/launch';
import { percentile, slope, spread } from './walls/figures';
import { preciseNow, startHelper, type Helper } from './walls/processes';
import { fillFolder } from './walls/world';

const charges = 200;
const changes = 15;
/** Between two changes, ms: none waits for the one before. */
const pauseMs = 700;
/** Waited for at most, ms. */
const patienceMs = 120_000;
const hourMs = 3_600_000;
/** Steps of the fast clock, ms: the heartbeat's own. */
const stepMs = 10_000;
const changeMs = 120_000;
/**
 * Most that the heap may grow in the hour, MiB. Wide: 200 charges go through their stages in it. What would be kept for
 * each of 180,000 heartbeats or 15,000 told changes would be more, at 100 bytes each.
 */
const slopeLimitMebibytes = 5;

interface Seen {
  had: [rev: number, at: number][];
  rev: number;
  read: number;
  failed: number;
}
interface Bench {
  server: Helper;
  clients: Helper;
  bare: Helper;
  port: number;
  folder: string;
  ids: string[];
}

const pause = (ms: number): Promise<void> => new Promise((resolve) => setTimeout(resolve, ms));
const sum = (values: readonly number[]): number => values.reduce((total, value) => total + value, 0);

/**
 * How soon a change is on all walls, beside a bare `ws` that sends the same text to as many; what is lost where walls or
 * the server were away; and whether memory grows over an hour of fast clock.
 */
export async function* benchWalls(): AsyncIterable<string> {
  yield `walls: ${charges} charges that run, on one server. The server, its clients and whoever makes the changes are three processes, and the bare server a fourth: they share the cores.`;
  const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-walls-'));
  const helpers: Helper[] = [];
  try {
    const ids = await fillFolder(folder, charges, 500, Date.now());
    const port = await freePort();
    const start = async (file: string, args: (string | number)[] = []): Promise<Helper> => {
      const helper = await startHelper(file, args);
      helpers.push(helper);
      return helper;
    };
    const bench: Bench = {
      ...{ folder, ids, port },
      server: await start('server-process.ts', [folder, port]),
      clients: await start('clients-process.ts'),
      bare: await start('bare-process.ts'),
    };
    for (const count of [200, 500]) yield* changesOn(bench, count);
    yield await cutWalls(bench);
    await bench.server.stop('SIGKILL');
    bench.server = await start('server-process.ts', [folder, port]);
    yield await comeBack(bench);
    yield await memory(bench);
  } finally {
    await Promise.all(helpers.map((helper) => helper.stop('SIGKILL')));
    fs.rmSync(folder, { recursive: true, force: true });
  }
}

let keys = 0;
/** Somebody looks at a charge and logs what it shows. */
async function change({ server, port, ids }: Bench, at: number): Promise<void> {
  const cookie = await server.ask<string>('cookie');
  const answer = await fetch(`http://127.0.0.1:${port}/api/charges/${ids[at % ids.length]}/readings`, {
    method: 'POST',
    headers: {
      cookie,
      'content-type': 'application/json',
      'idempotency-key': `walls-change-${process.pid}-${(keys += 1)}`,
    },
    body: JSON.stringify({ terminalVolts: null, amps: null, celsius: String(21 + (at % 3)) }),
  });
  if (!answer.ok) throw new Error(`A change was refused: ${answer.status} ${await answer.text()}`);
}

/** Until every wall has this board, or patience ends; gathers into `walls` what each had. @returns walls without it */
async function untilAll({ clients }: Bench, rev: number, walls: Seen[]): Promise<number> {
  const until = Date.now() + patienceMs;
  for (;;) {
    (await clients.ask<Seen[]>('seen')).forEach((wall, at) => {
      walls[at] = { ...wall, had: [...(walls[at]?.had ?? []), ...wall.had] };
    });
    const without = walls.filter((wall) => wall.rev !== rev).length;
    if ((walls.length > 0 && without === 0) || Date.now() > until) return without;
    await pause(100);
  }
}

/** For each change and wall, ms from the commit until the wall showed it or a later one; never: Infinity. */
const waits = (told: readonly (readonly [number, number])[], walls: readonly Seen[]): number[] =>
  walls.flatMap(({ had }) =>
    told.map(([rev, at]) => Math.min(...had.filter(([of]) => of >= rev).map(([, when]) => when), Infinity) - at),
  );

const newest = async ({ server }: Bench): Promise<number> => (await server.ask<[number, number][]>('told')).at(-1)![0];

async function* changesOn(bench: Bench, count: number): AsyncIterable<string> {
  const { server, clients, bare, port } = bench;
  await clients.ask('walls', { port, count });
  await clients.ask('bare', { port: await bare.ask<number>('port'), count });
  while ((await clients.ask<number>('busy')) > 0) await pause(200);
  // The first ones are read and sent by code that nothing has run yet.
  for (let at = 0; at < 3; at += 1) await change(bench, at + 50);
  await untilAll(bench, await newest(bench), []);
  const before = await clients.ask<Seen[]>('seen');
  const walls: Seen[] = [];
  const told: [number, number][] = [];
  const theirs: number[] = [];
  const cpu = [await server.ask<number>('cpuMs'), await clients.ask<number>('cpuMs')];
  const begun = Date.now();
  let bytes = 0;
  for (let at = 0; at < changes; at += 1) {
    await change(bench, at);
    const now = await server.ask<[number, number][]>('told');
    told.push(...now);
    await pause(pauseMs);
    await untilAll(bench, now.at(-1)![0], walls);
    // The very text that the walls were told.
    const text = await clients.ask<string>('wire');
    bytes = Math.max(bytes, Buffer.byteLength(text));
    const sent = await bare.ask<number>('broadcast', text);
    await pause(pauseMs / 2);
    for (const heard of await clients.ask<number[][]>('bareSeen')) theirs.push(...heard.map((one) => one - sent));
  }
  const lasted = Date.now() - begun;
  const used = [(await server.ask<number>('cpuMs')) - cpu[0]!, (await clients.ask<number>('cpuMs')) - cpu[1]!];
  const ours = waits(told, walls);
  const times = percentile(ours, 0.99) / percentile(theirs, 0.99);
  const read = sum(walls.map((wall) => wall.read)) - sum(before.map((wall) => wall.read));
  yield `walls, ${count}, ${told.length} changes: commit → on the wall ${spread(ours)}; a bare ws of the same text (up to ${(bytes / 1024).toFixed(1)} KiB) ${spread(theirs)}; p99 ${times.toFixed(2)} times`;
  yield `walls, ${count}: ${ours.filter((one) => one === Infinity).length} changes not seen, ${read} boards read whole; the server was busy ${Math.round((100 * used[0]!) / lasted)} % of a core, the clients ${Math.round((100 * used[1]!) / lasted)} %`;
}

async function cutWalls(bench: Bench): Promise<string> {
  const { clients } = bench;
  const cut = await clients.ask<number>('cut', 3);
  const walls: Seen[] = [];
  for (let at = 0; at < 20; at += 1) await change(bench, at * 7);
  while ((await clients.ask<number>('connected')) < 500) await pause(200);
  const without = await untilAll(bench, await newest(bench), walls);
  return `walls, ${cut} of 500 cut off during 20 changes: ${without} lost after they came back`;
}

async function comeBack(bench: Bench): Promise<string> {
  const { clients } = bench;
  const begun = preciseNow();
  await change(bench, 1);
  const rev = await newest(bench);
  const walls: Seen[] = [];
  while ((await clients.ask<number>('connected')) < 500 && preciseNow() - begun < patienceMs) await pause(100);
  const without = await untilAll(bench, rev, walls);
  const took = Math.max(...waits([[rev, begun]], walls));
  return `walls, 500, the server killed and started again: the last had the board ${(took / 1000).toFixed(1)} s after it answered; ${without} lost`;
}

/** An hour of the server's clock in steps: heartbeats to 500 walls, what falls due, and a change every other minute. */
async function memory(bench: Bench): Promise<string> {
  const { server, clients } = bench;
  const points: [number, number][] = [];
  // A quarter of an hour first, in which caches fill and code is compiled.
  for (let ms = -hourMs / 4; ms < hourMs; ms += stepMs) {
    await server.ask('advance', stepMs);
    if (ms % changeMs !== 0) continue;
    await change(bench, ms / changeMs + 100);
    await untilAll(bench, await newest(bench), []);
    while ((await clients.ask<number>('busy')) > 0) await pause(50);
    if (ms >= 0) points.push([ms / hourMs, (await server.ask<number>('heapBytes')) / 2 ** 20]);
  }
  const heap = points.map(([, mebibytes]) => mebibytes);
  const steep = slope(points);
  const range = `${Math.min(...heap).toFixed(1)}–${Math.max(...heap).toFixed(1)}`;
  const line = `walls, 500, an hour of fast clock with a change every other minute: heap after collection ${heap[0]!.toFixed(1)} → ${heap.at(-1)!.toFixed(1)} MiB (${range}), slope ${steep.toFixed(2)} MiB an hour`;
  if (steep > slopeLimitMebibytes) throw new Error(`${line}: more than ${slopeLimitMebibytes}, so something is kept.`);
  return line;
}

if (process.argv[1] === fileURLToPath(import.meta.url)) for await (const line of benchWalls()) console.log(line);
