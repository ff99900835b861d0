import type { Server as HttpServer } from 'node:http';
import { Server } from 'socket.io';
import { heartbeatMs, type ClientToServerEvents, type ServerToClientEvents } from '@/shared/contract/live';
import type { Deps } from '../deps';
import { boardRevsOf } from '../repositories/workshops.repository';
import { touchWalls } from '../repositories/walls.repository';
import { toInstant } from '../services/instants';
import { inTransaction } from '../services/unit-of-work';
import { endReasonsOf, heardStepMs } from '../services/who-asks';
import { askerOf, handshakeFromOwnPage } from './handshake';
import type { LiveEvent, LiveHub, LivePayload } from './hub';
import { makeWallTeller } from './wall-teller';
import { listen, type LiveSocket, type SocketAsker } from './socket-handlers';

export interface SocketHub extends LiveHub {
  attach(server: HttpServer): void;
  /** One round of the heartbeat, as the timer does it. */
  beat(): Promise<void>;
  /** The events that the sockets connected now listen to, by the kind of who asks; for the test of their policies. */
  listenedEvents(): Partial<Record<SocketAsker['kind'], string[]>>;
  /** Closes all sockets; clients come back by themselves when a server answers again. Closes the attached server too. */
  close(): Promise<void>;
}

type HubDeps = Pick<Deps, 'config' | 'dataSource' | 'secrets' | 'clock' | 'log' | 'wallBoards'>;

/** What the library itself tells a socket; no client can send these. */
const ownEvents: ReadonlySet<string> = new Set(['disconnect', 'error']);

const rooms = {
  members: (workshopId: string) => `members ${workshopId}`,
  walls: (workshopId: string) => `walls ${workshopId}`,
  person: (id: string) => `person ${id}`,
  session: (id: string) => `session ${id}`,
  wall: (id: string) => `wall ${id}`,
};

/** Where one is reached who has to go. */
const ownRooms = (asker: SocketAsker): string[] =>
  asker.kind === 'wall'
    ? [rooms.wall(asker.wall.id)]
    : [rooms.person(asker.member.personId), rooms.session(asker.member.sessionId)];
/** Where their workshop is heard. */
const workshopRoom = (asker: SocketAsker): string =>
  asker.kind === 'wall' ? rooms.walls(asker.wall.workshopId) : rooms.members(asker.member.workshopId);

const workshopOf = (asker: SocketAsker): string =>
  asker.kind === 'wall' ? asker.wall.workshopId : asker.member.workshopId;

/** The sockets of all workshops. Announces; keeps nothing for those who are away: they read the board when they come back. */
export function makeSocketHub(deps: HubDeps): SocketHub {
  const io = new Server<ClientToServerEvents, ServerToClientEvents, Record<string, never>, { asker: SocketAsker }>({
    path: '/socket.io',
    serveClient: false,
    // In development Metro's own sockets arrive at the same server.
    destroyUpgrade: deps.config.metroPort === null,
    // A client sends its clock question and nothing else.
    maxHttpBufferSize: 10_000,
    allowRequest: (request, decide) => decide(null, handshakeFromOwnPage(deps, request)),
  });
  let timer: NodeJS.Timeout | null = null;
  let beating: Promise<void> | null = null;
  let wallsHeardAt = 0;

  io.use((socket, next) => {
    askerOf(deps, socket.request, (socket.handshake.auth as { as?: unknown }).as).then(
      (asker) => {
        if (!asker) {
          next(new Error('signed_out'));
          return;
        }
        socket.data.asker = asker;
        next();
      },
      (error: unknown) => {
        deps.log.error({ err: error }, 'a handshake failed');
        next(new Error('failed'));
      },
    );
  });

  io.on('connection', (socket: LiveSocket) => {
    void socket.join(ownRooms(socket.data.asker));
    listen(socket, deps);
    socket.on('disconnect', stopWhenAlone);
    startTimer();
    void greet(socket).catch((error: unknown) => deps.log.error({ err: error }, 'a socket was not greeted'));
  });

  async function greet(socket: LiveSocket): Promise<void> {
    // Between the handshake's look at the database and their own room somebody may have been signed out.
    await endThoseOver([socket], deps.clock.now());
    if (!socket.connected) return;
    const { asker } = socket.data;
    await socket.join(workshopRoom(asker));
    // After that: what is committed from now on is told, what was before is in the revision.
    if (asker.kind === 'wall') teller.watch(asker.wall.workshopId);
    const workshopId = workshopOf(asker);
    const rev = (await boardRevsOf(deps.dataSource.manager, [workshopId])).get(workshopId) ?? 0;
    socket.emit('heartbeat', { at: toInstant(deps.clock.now()), rev });
  }

  /** Ends the sockets whose session or wall is over. */
  async function endThoseOver(sockets: readonly LiveSocket[], now: number): Promise<void> {
    const askers = sockets.map((socket) => socket.data.asker);
    const reasons = await endReasonsOf(deps, askers, now);
    for (const socket of sockets) {
      const reason = reasons.get(socket.data.asker);
      if (!reason) continue;
      socket.emit('session:ended', { reason });
      socket.disconnect(true);
    }
  }

  function startTimer(): void {
    if (timer) return;
    timer = setInterval(() => {
      beating ??= beat()
        .catch((error: unknown) => deps.log.error({ err: error }, 'the heartbeat failed'))
        .finally(() => {
          beating = null;
        });
    }, heartbeatMs);
    timer.unref();
  }

  /** Nobody listens: nothing beats. */
  function stopWhenAlone(): void {
    if (io.sockets.sockets.size > 0 || !timer) return;
    clearInterval(timer);
    timer = null;
  }

  async function beat(): Promise<void> {
    const now = deps.clock.now();
    await endThoseOver([...io.sockets.sockets.values()], now);
    const askers = [...io.sockets.sockets.values()].map((socket) => socket.data.asker);
    const workshops = [...new Set(askers.map(workshopOf))];
    const revs = await boardRevsOf(deps.dataSource.manager, workshops);
    for (const workshopId of workshops)
      hub.toWorkshop(workshopId, 'heartbeat', { at: toInstant(now), rev: revs.get(workshopId) ?? 0 });
    const walls = askers.flatMap((asker) => (asker.kind === 'wall' ? [asker.wall.id] : []));
    if (walls.length > 0 && Math.abs(now - wallsHeardAt) >= heardStepMs) {
      wallsHeardAt = now;
      await inTransaction(deps, (manager) => touchWalls(manager, walls, now));
    }
  }

  function emit<E extends LiveEvent>(to: string[], event: E, payload: LivePayload<E>): void {
    // The map of events is one payload each; the generic of the library cannot follow that through a variable.
    io.to(to).emit(event, ...([payload] as unknown as Parameters<ServerToClientEvents[E]>));
  }

  const sizeOf = (room: string): number => io.sockets.adapter.rooms.get(room)?.size ?? 0;
  const teller = makeWallTeller(deps, {
    count: (workshopId) => sizeOf(rooms.walls(workshopId)),
    tell: (workshopId, change) => emit([rooms.walls(workshopId)], 'wall:changed', change),
  });

  const hub: SocketHub = {
    toWorkshop: (workshopId, event, payload) => {
      // Before anybody hears of it and asks.
      if (event !== 'heartbeat') deps.wallBoards.changed(workshopId);
      // Walls hear that they are heard, and what changes on their board. The rest is people's.
      const beat = event === 'heartbeat';
      emit(beat ? [rooms.members(workshopId), rooms.walls(workshopId)] : [rooms.members(workshopId)], event, payload);
      teller.hear(workshopId, event, payload);
    },
    toPerson: (_workshopId, personId, event, payload) => emit([rooms.person(personId)], event, payload),
    connected: (workshopId) =>
      workshopId === null
        ? io.sockets.sockets.size
        : sizeOf(rooms.members(workshopId)) + sizeOf(rooms.walls(workshopId)),
    end: (target, reason) => {
      const room =
        'sessionId' in target
          ? rooms.session(target.sessionId)
          : 'personId' in target
            ? rooms.person(target.personId)
            : rooms.wall(target.wallId);
      io.to(room).emit('session:ended', { reason });
      io.in(room).disconnectSockets(true);
    },
    attach: (server) => void io.attach(server),
    beat,
    listenedEvents: () => {
      const events: Partial<Record<SocketAsker['kind'], string[]>> = {};
      for (const socket of io.sockets.sockets.values())
        events[socket.data.asker.kind] = socket
          .eventNames()
          .map(String)
          .filter((name) => !ownEvents.has(name));
      return events;
    },
    close: async () => {
      if (timer) clearInterval(timer);
      timer = null;
      await beating;
      await teller.idle();
      await io.close();
    },
  };
  return hub;
}
