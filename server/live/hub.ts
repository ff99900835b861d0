import type { ServerToClientEvents } from '@/shared/contract/live';

export type LiveEvent = keyof ServerToClientEvents;
export type LivePayload<E extends LiveEvent> = Parameters<ServerToClientEvents[E]>[0];

/** Announces to the sockets of a workshop (people and walls). Called after commit, never inside a transaction. */
export interface LiveHub {
  toWorkshop<E extends LiveEvent>(workshopId: string, event: E, payload: LivePayload<E>): void;
  toPerson<E extends LiveEvent>(workshopId: string, personId: string, event: E, payload: LivePayload<E>): void;
  /** Sockets of the workshop's people and walls that are connected now; null: of all workshops. */
  connected(workshopId: string | null): number;
  /** Closes the sockets of a session, of all sessions of a person, or of a wall. */
  end(
    target: { sessionId: string } | { personId: string } | { wallId: string },
    reason: LivePayload<'session:ended'>['reason'],
  ): void;
}
