/** Walls as their page behaves, and bare sockets, all in one process apart from the servers. */
import { createRequire } from 'node:module';
import type { WebSocket } from 'ws';
import { openWall, type WallClient } from '../../support/wall-client';
import { answerQuestions, preciseNow } from './processes';
import { wallCookie } from './world';

/** Nothing has come for this long, ms: what came before is put on the walls. */
const quietMs = 15;

interface Wall extends WallClient {
  /** Boards it has shown: when the first one of a revision was there. */
  had: [rev: number, at: number][];
}
const walls: Wall[] = [];
let port = 0;
/** What was told last, as it was on the wire. */
let wire = '';

/** What has come, and when it was there, read. */
const waiting: { at: number; act: () => void }[] = [];
let timer: NodeJS.Timeout | null = null;
/** The instant of what is being put on a wall: when it came, and what the wall itself has taken for it since. */
let instant: (() => number) | null = null;

/**
 * Every wall is a device of its own, and here they share a core: what one takes to put a change on its board must not
 * hold up the hearing of the next. So all hear first; then each acts, and what it took counts for it alone.
 */
function take(at: number, act: () => void): void {
  waiting.push({ at, act });
  if (timer) clearTimeout(timer);
  timer = setTimeout(actAll, quietMs);
}
function actAll(): void {
  timer = null;
  for (const { at, act } of waiting.splice(0)) {
    const begun = preciseNow();
    instant = () => at + (preciseNow() - begun);
    act();
    instant = null;
  }
}

function addWall(number: number): Promise<void> {
  const had: Wall['had'] = [];
  const client = openWall({
    ...{ port, cookie: wallCookie(number) },
    shown: ({ rev }) => {
      if (had.at(-1)?.[0] !== rev) had.push([rev, instant?.() ?? preciseNow()]);
    },
    take: (event, payload, act) => {
      if (number === 1 && event === 'wall:changed') wire = `42${JSON.stringify([event, payload])}`;
      take(preciseNow(), act);
    },
  });
  walls.push({ ...client, had });
  return new Promise((resolve) => client.socket.once('heartbeat', () => resolve()));
}

const bare: { socket: WebSocket; heard: number[] }[] = [];
const requireFrom = createRequire(createRequire(import.meta.url).resolve('engine.io-client'));
const { WebSocket: Bare } = requireFrom('ws') as { WebSocket: typeof WebSocket };

answerQuestions({
  walls: async ({ port: at, count }: { port: number; count: number }) => {
    port = at;
    // In handfuls, as screens come on; the server bears all at once too, which the restart shows.
    while (walls.length < count)
      await Promise.all(Array.from({ length: Math.min(25, count - walls.length) }, () => addWall(walls.length + 1)));
  },
  bare: async ({ port: at, count }: { port: number; count: number }) => {
    while (bare.length < count) {
      const socket = new Bare(`ws://127.0.0.1:${at}`);
      const one = { socket, heard: [] as number[] };
      bare.push(one);
      socket.on('message', (text) => {
        // Read as the other side reads it: by the letter.
        JSON.parse(String(text).slice(2));
        one.heard.push(preciseNow());
      });
      await new Promise((resolve) => socket.once('open', resolve));
    }
  },
  /** What they had since the last time, and where they stand. */
  seen: () => walls.map(({ had, board, counts }) => ({ had: had.splice(0), rev: board()?.rev ?? 0, ...counts })),
  wire: () => wire,
  bareSeen: () => bare.map(({ heard }) => heard.splice(0)),
  /** Pulls the plug of every n-th wall; it comes back by itself. */
  cut: (every: number) => {
    const cut = walls.filter((_, at) => at % every === 0);
    for (const { socket } of cut) socket.io.engine.close();
    return cut.length;
  },
  connected: () => walls.filter(({ socket }) => socket.connected).length,
  busy: () => waiting.length + walls.filter((wall) => wall.busy()).length,
  cpuMs: () => {
    const { user, system } = process.cpuUsage();
    return (user + system) / 1000;
  },
});
