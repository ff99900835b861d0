/** A wall as its page behaves: the rules of the page's socket over a board of its own, read by HTTP when it is old. */
import http from 'node:http';
import { gunzipSync } from 'node:zlib';
import { io, type Socket } from 'socket.io-client';
import { makeLiveRules, type LiveEventName, type LivePayload } from '@/shared/client/live-rules';
import { roots } from '@/shared/client/query-keys';
import { withWallChange } from '@/shared/client/wall-change';
import type { BoardDto } from '@/shared/contract/board';
import type { ClientToServerEvents, ServerToClientEvents } from '@/shared/contract/live';

/** As `live.ts` gathers announcements of one moment, ms. */
const gatherMs = 40;

export interface WallClientOptions {
  port: number;
  cookie: string;
  /** Between two tries to come back, ms; as the page's where it is left out. */
  comeBackMs?: { first: number; last: number };
  /** Another board is on the wall. */
  shown?: (board: BoardDto) => void;
  /** Does what an announcement asks for; at once where it is left out. */
  take?: (event: LiveEventName, payload: unknown, act: () => void) => void;
}

export interface WallClient {
  socket: Socket<ServerToClientEvents, ClientToServerEvents>;
  /** What it shows. */
  board(): BoardDto | null;
  /** A question is under way or about to be asked. */
  busy(): boolean;
  /** Questions that were answered with a board, and those that were not. */
  counts: { read: number; failed: number };
  /** Status of the last question that was refused; null: none was. */
  refused(): number | null;
  stop(): void;
}

const events: readonly LiveEventName[] = ['wall:changed', 'board:changed', 'equipment:changed', 'heartbeat'];

/** Boards by their bytes: to unpack the same one for every wall would measure the walls. */
const known = new Map<string, BoardDto>();
function boardOf(body: Buffer): BoardDto {
  const text = body.toString('latin1');
  const board = known.get(text) ?? (JSON.parse(gunzipSync(body).toString('utf8')) as BoardDto);
  if (known.size > 20) known.clear();
  known.set(text, board);
  return board;
}

/** Connects, and asks for its board as the page does when it opens. */
export function openWall(options: WallClientOptions): WallClient {
  const { port, cookie, comeBackMs = { first: 500, last: 10_000 } } = options;
  const agent = new http.Agent({ keepAlive: true, maxSockets: 1 });
  const socket: WallClient['socket'] = io(`http://127.0.0.1:${port}`, {
    ...{ transports: ['websocket'], auth: { as: 'wall' }, forceNew: true, extraHeaders: { cookie } },
    ...{ reconnectionDelay: comeBackMs.first, reconnectionDelayMax: comeBackMs.last },
    ...{ randomizationFactor: 0.5, timeout: 8000 },
  });
  const counts = { read: 0, failed: 0 };
  let board: BoardDto | null = null;
  let gather: NodeJS.Timeout | null = null;
  let asking: http.ClientRequest | null = null;
  let refused: number | null = null;
  let over = false;

  function show(next: BoardDto): void {
    board = next;
    options.shown?.(next);
  }

  function read(): void {
    // As the query client does: a question that is old already is not waited for.
    asking?.destroy();
    const request = http.get({
      ...{ host: '127.0.0.1', port, path: '/api/wall/board', agent },
      headers: { cookie, 'accept-encoding': 'gzip' },
    });
    asking = request;
    const again = (): void => {
      if (asking !== request || over) return;
      counts.failed += 1;
      // As the page tries again, for ever.
      setTimeout(() => asking === request && !over && read(), comeBackMs.first * (0.75 + Math.random() / 2));
    };
    request.on('error', again);
    request.on('response', (response) => {
      const parts: Buffer[] = [];
      response.on('data', (part: Buffer) => parts.push(part));
      response.on('error', again);
      response.on('end', () => {
        if (asking !== request) return;
        if (response.statusCode === 200) {
          asking = null;
          counts.read += 1;
          show(boardOf(Buffer.concat(parts)));
          return;
        }
        refused = response.statusCode ?? 0;
        if (refused === 401) asking = null;
        else again();
      });
    });
  }

  const still = (): BoardDto | null => (asking === null ? board : null);
  const rules = makeLiveRules({
    old: (root) => {
      if (root !== roots.board || over) return;
      gather ??= setTimeout(() => {
        gather = null;
        read();
      }, gatherMs);
    },
    boardRev: () => board?.rev ?? null,
    chargeRev: () => null,
    wall: {
      shown: () => still()?.rev ?? null,
      put: (change) => {
        const present = still();
        const next = present && withWallChange(present, change);
        if (next) show(next);
        return next !== null;
      },
    },
  });
  const take = options.take ?? ((_event, _payload, act) => act());
  for (const event of events)
    // One handler for all names; the rules know each payload.
    socket.on(event, ((payload: LivePayload<typeof event>) =>
      take(event, payload, () => rules.on(event, payload))) as never);
  // The first time too: the page asks for its board as it opens.
  socket.on('connect', () => rules.reconnected());
  return {
    ...{ socket, counts },
    board: () => board,
    busy: () => gather !== null || asking !== null,
    refused: () => refused,
    stop: () => {
      over = true;
      if (gather) clearTimeout(gather);
      socket.disconnect();
      asking?.destroy();
      agent.destroy();
    },
  };
}
