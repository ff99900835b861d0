import type { AlertDto } from './alert';
import type { WallChangeDto } from './board';
import type { Instant } from './common';

/** Sockets announce; they never carry a write. Every event says the board revision it belongs to. */
export interface ServerToClientEvents {
  'board:changed': (event: { rev: number; at: Instant; chargeId: string | null }) => void;
  /** To walls, in place of all that is said of charges and channels: every wall would read the same board for it. */
  'wall:changed': (event: WallChangeDto | { from: null; rev: number }) => void;
  'charge:changed': (event: { id: string; rev: number; at: Instant }) => void;
  'repair:changed': (event: { id: string; rev: number; at: Instant }) => void;
  'stock:changed': (event: { at: Instant }) => void;
  'equipment:changed': (event: { at: Instant }) => void;
  /** Other work, what is taken of it, hours, places, or the plan itself. */
  'bench:changed': (event: { at: Instant }) => void;
  'people:changed': (event: { at: Instant }) => void;
  'workshop:changed': (event: { at: Instant }) => void;
  'walls:changed': (event: { at: Instant }) => void;
  'alert:raised': (event: AlertDto) => void;
  'alert:changed': (event: { id: string; at: Instant }) => void;
  /** Every 10 s, so that a screen knows that it is heard. */
  heartbeat: (event: { at: Instant; rev: number }) => void;
  /** The session or the wall was ended; the socket is closed next. */
  'session:ended': (event: { reason: 'sign-out' | 'disabled' | 'role-changed' | 'revoked' | 'expired' }) => void;
}

export interface ClientToServerEvents {
  /** Four time-stamps: the client sends its own, the answer carries the server's receive and send instants (epoch ms). */
  'clock:ask': (sentAt: number, answer: (reply: { receivedAt: number; sentAt: number }) => void) => void;
}

export const heartbeatMs = 10_000;
/** Not heard for this long: the wall says so; for `deadMs`: its header becomes the amber band. */
export const quietMs = 30_000;
export const deadMs = 120_000;
