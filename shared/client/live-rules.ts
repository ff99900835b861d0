/** What becomes old by which announcement. Sockets announce at most once, so a gap in the revisions means: ask for all. */
import type { WallChangeDto } from '@/shared/contract/board';
import type { ServerToClientEvents } from '@/shared/contract/live';
import { roots, type Root } from './query-keys';

export type LiveEventName = keyof ServerToClientEvents;
export type LivePayload<E extends LiveEventName> = Parameters<ServerToClientEvents[E]>[0];

export interface LiveRulesEnvironment {
  /** Marks what was asked for under this key as old; active screens ask again. */
  old: (root: Root, id?: string) => void;
  /** Board revision this device has seen by other ways (the board it fetched); null: none. */
  boardRev: () => number | null;
  /** Revision of a charge in the cache. */
  chargeRev: (id: string) => number | null;
  /** Of a wall, which has one board and shows it all day. */
  wall?: {
    /** Revision of the board on it; null: none, or another is on its way. */
    shown: () => number | null;
    /** Puts what changed on its board; false: it has another board, or none. */
    put: (change: WallChangeDto) => boolean;
  };
}

/** Everything that a missed announcement may have changed. */
export const liveRoots: readonly Root[] = [
  roots.board,
  roots.charges,
  roots.charge,
  roots.repairs,
  roots.repair,
  roots.packTypes,
  roots.alerts,
  roots.alertSettings,
  roots.spares,
  roots.spare,
  roots.chargers,
  roots.moduleTypes,
  roots.resistors,
  roots.meters,
  roots.people,
  roots.invitations,
  roots.workshop,
  roots.walls,
  roots.benchPlan,
  roots.work,
  roots.staffing,
];

export function makeLiveRules({ old, boardRev, chargeRev, wall }: LiveRulesEnvironment) {
  let rev: number | null = null;

  const resync = () => liveRoots.forEach((root) => old(root));
  const board = () => {
    old(roots.board);
    old(roots.charges);
    old(roots.chargers);
    // Its time line, its fills and its queue stand on the charges.
    old(roots.benchPlan);
  };

  const rules: { [E in LiveEventName]: (event: LivePayload<E>) => void } = {
    'board:changed': (event) => {
      const last = rev ?? boardRev();
      // A repeated or late announcement: the gap it left was met by asking for all.
      if (rev !== null && event.rev <= rev) return;
      rev = event.rev;
      if (last !== null && event.rev > last + 1) resync();
      else board();
      if (event.chargeId) old(roots.charge, event.chargeId);
    },
    'wall:changed': (event) => {
      rev = event.rev;
      if (event.from === null || !wall?.put(event)) old(roots.board);
    },
    'charge:changed': (event) => {
      const known = chargeRev(event.id);
      if (known === null || known < event.rev) old(roots.charge, event.id);
      old(roots.charges);
    },
    'repair:changed': (event) => {
      old(roots.repairs);
      old(roots.repair, event.id);
    },
    'stock:changed': () => {
      old(roots.spares);
      old(roots.spare);
    },
    'equipment:changed': () => {
      for (const root of [roots.moduleTypes, roots.packTypes, roots.chargers, roots.resistors, roots.meters]) old(root);
      old(roots.board);
      old(roots.spares);
    },
    'bench:changed': () => {
      for (const root of [roots.benchPlan, roots.work, roots.staffing]) old(root);
    },
    'people:changed': () => {
      old(roots.people);
      old(roots.staffing);
      old(roots.benchPlan);
      old(roots.invitations);
      old(roots.session);
    },
    'workshop:changed': () => {
      old(roots.workshop);
      old(roots.session);
      old(roots.board);
      old(roots.staffing);
      old(roots.benchPlan);
    },
    'walls:changed': () => old(roots.walls),
    'alert:raised': () => old(roots.alerts),
    'alert:changed': () => old(roots.alerts),
    heartbeat: (event) => {
      // What a wall was told and what it shows part ways where its board was asked for before the one and came after it.
      const last = wall?.shown() ?? rev ?? boardRev();
      // Lower too: the server went back to a copy of its data.
      if (last !== null && last !== event.rev) resync();
      rev = event.rev;
    },
    'session:ended': () => {},
  };

  return {
    on: <E extends LiveEventName>(name: E, event: LivePayload<E>): void => rules[name](event),
    /** The connection was away: anything may have happened. */
    reconnected: (): void => {
      rev = null;
      resync();
    },
  };
}
