import type { Socket } from 'socket.io';
import type { ClientToServerEvents, ServerToClientEvents } from '@/shared/contract/live';
import type { Clock } from '../clock';
import type { Member } from '../deps';

/** Who is at the other end of a socket. */
export type SocketAsker =
  { kind: 'member'; member: Member } | { kind: 'wall'; wall: { id: string; workshopId: string } };
export type LiveSocket = Socket<
  ClientToServerEvents,
  ServerToClientEvents,
  Record<string, never>,
  { asker: SocketAsker }
>;

/** One event a client may send, with who may send it. */
export interface SocketHandler<E extends keyof ClientToServerEvents = keyof ClientToServerEvents> {
  event: E;
  policy: readonly SocketAsker['kind'][];
  handle: (deps: { clock: Clock }) => ClientToServerEvents[E];
}

/**
 * Every event the server listens to. Sockets announce and never carry a write, so there is little here; a test walks the
 * list and the running sockets against each other.
 */
export const socketHandlers: readonly SocketHandler[] = [
  {
    event: 'clock:ask',
    policy: ['member', 'wall'],
    handle:
      ({ clock }) =>
      (_sentAt, answer) => {
        const receivedAt = clock.now();
        // A client may send anything at all, a missing answer included.
        if (typeof answer === 'function') answer({ receivedAt, sentAt: clock.now() });
      },
  },
];

/** Lets a socket send what its kind may, and nothing else. */
export function listen(socket: LiveSocket, deps: { clock: Clock }): void {
  const { asker } = socket.data;
  const allowed = socketHandlers.filter((handler) => handler.policy.includes(asker.kind));
  socket.use(([event], next) => {
    if (allowed.some((handler) => handler.event === event)) next();
    else next(new Error('not allowed'));
  });
  for (const handler of allowed) socket.on(handler.event, handler.handle(deps));
  // What is refused above comes out here; without a listener it would end the process.
  socket.on('error', () => socket.disconnect(true));
}
