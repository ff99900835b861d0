/**
 * The socket: loaded after the first paint, announces what changed, never carries a write. Reconnects by itself with
 * jitter and asks for everything after a gap; the server's own recovery is not relied on.
 */
import type { Socket } from 'socket.io-client';
import type { AlertDto } from '@/shared/contract/alert';
import type { BoardDto, WallChangeDto } from '@/shared/contract/board';
import type { ChargeDto } from '@/shared/contract/charge';
import type { ClientToServerEvents, ServerToClientEvents } from '@/shared/contract/live';
import { api, orNull } from './api';
import { serverClock } from './clock';
import { keepClock } from './clock-sync';
import { connected, heard, linkIdle, lost } from './link';
import { makeLiveRules, type LiveEventName } from './live-rules';
import { queryClient, waitBefore } from './query-client';
import { roots, type Root } from './query-keys';
import { sessionLost } from './session';
import { withWallChange } from './wall-change';

type LiveSocket = Socket<ServerToClientEvents, ClientToServerEvents>;

/** A record, so that an announcement left out does not compile. */
const heardOf: Record<LiveEventName, true> = {
  'board:changed': true,
  'wall:changed': true,
  'charge:changed': true,
  'repair:changed': true,
  'stock:changed': true,
  'equipment:changed': true,
  'bench:changed': true,
  'people:changed': true,
  'workshop:changed': true,
  'walls:changed': true,
  'alert:raised': true,
  'alert:changed': true,
  heartbeat: true,
  'session:ended': true,
};
const names = Object.keys(heardOf) as LiveEventName[];

const alertListeners = new Set<(alert: AlertDto) => void>();
/** Hears of every alert the moment it is raised. */
export function onAlert(listener: (alert: AlertDto) => void): () => void {
  alertListeners.add(listener);
  return () => alertListeners.delete(listener);
}

/** Announcements of one moment are answered by one question each. */
function makeOld(): (root: Root, id?: string) => void {
  const waiting = new Map<string, [Root, string?]>();
  let timer: ReturnType<typeof setTimeout> | null = null;
  return (root, id) => {
    waiting.set(`${root} ${id ?? ''}`, id ? [root, id] : [root]);
    timer ??= setTimeout(() => {
      timer = null;
      const keys = [...waiting.values()];
      waiting.clear();
      for (const key of keys) void queryClient.invalidateQueries({ queryKey: key });
    }, 40);
  };
}

const cachedBoardRev = (): number | null => {
  const boards = queryClient.getQueriesData<BoardDto>({ queryKey: [roots.board] });
  const revs = boards.flatMap(([, board]) => (board ? [board.rev] : []));
  return revs.length > 0 ? Math.max(...revs) : null;
};

const wallKey = [roots.board, 'wall'];
/** The board on this wall; null while another is on its way, which may be from before what is told now. */
const boardOnWall = (): BoardDto | null =>
  queryClient.isFetching({ queryKey: wallKey }) === 0 ? (queryClient.getQueryData<BoardDto>(wallKey) ?? null) : null;
function putOnWall(change: WallChangeDto): boolean {
  const board = boardOnWall();
  const next = board && withWallChange(board, change);
  if (next) queryClient.setQueryData(wallKey, next);
  return next !== null;
}

/** Asks the server for its time over the socket, with the four time-stamps. */
const askOver = (socket: LiveSocket) => async () => {
  const sentAt = Date.now();
  const reply = await socket.timeout(4000).emitWithAck('clock:ask', sentAt);
  return { sentAt, receivedAt: reply.receivedAt, answeredAt: reply.sentAt, heardAt: Date.now() };
};

function listen(socket: LiveSocket, as: 'member' | 'wall', ended: () => void): () => void {
  const rules = makeLiveRules({
    old: makeOld(),
    boardRev: cachedBoardRev,
    chargeRev: (id) => queryClient.getQueryData<ChargeDto>([roots.charge, id])?.rev ?? null,
    ...(as === 'wall' ? { wall: { shown: () => boardOnWall()?.rev ?? null, put: putOnWall } } : {}),
  });
  let before = false;
  let failures = 0;
  let over = false;
  let stopClock: (() => void) | undefined;
  let again: ReturnType<typeof setTimeout> | undefined;

  /** The server refused the handshake or closed the socket: the library does not come back by itself. */
  const comeBack = () => {
    if (over) return;
    clearTimeout(again);
    again = setTimeout(() => {
      // Renews an access token that has run out; a session that is over ends here.
      const renewed = as === 'member' ? api.get('/session') : orNull(api.get('/wall/me', { open: true }), [401]);
      renewed.then(
        (answer) => {
          if (answer === null) ended();
          else if (!over) socket.connect();
        },
        () => comeBack(),
      );
    }, waitBefore(failures++));
  };

  socket.on('connect', () => {
    failures = 0;
    connected();
    if (before) rules.reconnected();
    before = true;
    stopClock?.();
    stopClock = keepClock(askOver(socket), serverClock.correct);
  });
  socket.on('disconnect', (reason) => {
    stopClock?.();
    stopClock = undefined;
    lost();
    if (reason === 'io server disconnect') comeBack();
  });
  socket.on('connect_error', () => {
    lost();
    if (!socket.active) comeBack();
  });
  for (const name of names) {
    // One handler for all names; the rules know each payload.
    socket.on(name, ((event: never) => {
      heard(true);
      rules.on(name, event);
    }) as never);
  }
  socket.on('alert:raised', (alert) => alertListeners.forEach((listener) => listener(alert)));
  socket.on('session:ended', ({ reason }) => {
    if (reason === 'role-changed') {
      void queryClient.invalidateQueries();
      return;
    }
    over = true;
    ended();
    if (as === 'member') sessionLost(reason);
  });
  return () => {
    over = true;
    clearTimeout(again);
    stopClock?.();
    socket.removeAllListeners();
    socket.disconnect();
  };
}

/**
 * Connects for a person or a wall. Call it after the first paint.
 * @param ended the wall's right was taken back, or the session is over
 * @returns disconnects
 */
export function startLive(as: 'member' | 'wall', ended: () => void = () => {}): () => void {
  let stop: (() => void) | null = null;
  let stopped = false;
  // What was not heard before this person or wall was here says nothing of their link.
  linkIdle();
  const open = async (attempt: number): Promise<void> => {
    try {
      const { io } = await import('socket.io-client');
      if (stopped) return;
      const socket: LiveSocket = io({
        transports: ['websocket', 'polling'],
        tryAllTransports: true,
        auth: { as },
        reconnectionDelay: 500,
        reconnectionDelayMax: 10_000,
        randomizationFactor: 0.5,
        timeout: 8000,
      });
      stop = listen(socket, as, ended);
    } catch {
      // The script could not be fetched: no connection yet.
      lost();
      if (!stopped) setTimeout(() => void open(attempt + 1), waitBefore(attempt));
    }
  };
  const first = setTimeout(() => void open(0), 0);
  return () => {
    stopped = true;
    clearTimeout(first);
    stop?.();
    linkIdle();
  };
}
