import type { Deps } from '../deps';
import { asOnTheWall, readBoard, readCards, type WholeBoard } from '../services/board.service';
import { toInstant } from '../services/instants';
import type { LiveEvent, LivePayload } from './hub';
import { toldBoard, wallChange, type ToldBoard } from './wall-change';

/** What time alone has changed is looked for with the first change after this, ms. */
const WHOLE_AFTER_MS = 60_000;

export interface WallTeller {
  /** Hears what a workshop is told, and tells its walls what they show otherwise. */
  hear<E extends LiveEvent>(workshopId: string, event: E, payload: LivePayload<E>): void;
  /** A wall has come: what it shows is read once, so that the next change has something to differ from. */
  watch(workshopId: string): void;
  /** Ends when all that was heard is told. */
  idle(): Promise<void>;
}

interface Listeners {
  /** Walls of a workshop that listen now. */
  count(workshopId: string): number;
  tell(workshopId: string, change: LivePayload<'wall:changed'>): void;
}

interface Workshop {
  whole: WholeBoard;
  told: ToldBoard;
  /** When all of it was read, epoch ms. */
  readAt: number;
}
interface Heard {
  charges: Set<string>;
  /** Announcements of the board, and the newest revision of them. */
  revs: number;
  rev: number;
  whole: boolean;
}

/** Events after which other things than one charge may look otherwise. */
const wholeEvents: ReadonlySet<LiveEvent> = new Set<LiveEvent>([
  'equipment:changed',
  'workshop:changed',
  'people:changed',
]);

/**
 * Tells walls what changed on their board instead of that it changed: it is worked out once for all of them, and only
 * the charge that was changed is read for it. What is kept here can always be thrown away: a wall that is told of
 * another revision than its own reads its board anew.
 */
export function makeWallTeller(deps: Pick<Deps, 'dataSource' | 'clock' | 'log'>, walls: Listeners): WallTeller {
  const kept = new Map<string, Workshop>();
  const heard = new Map<string, Heard>();
  const running = new Map<string, Promise<void>>();

  /** @param changed something was, so that walls whose board is not known have to read it */
  function show(workshopId: string, whole: WholeBoard, readAt: number, now: number, changed = true): void {
    const before = kept.get(workshopId);
    const told = toldBoard(asOnTheWall(whole.board, now));
    kept.set(workshopId, { whole, told, readAt });
    const change = before ? wallChange(before.told, told) : changed ? { from: null, rev: whole.board.rev } : null;
    if (change) walls.tell(workshopId, change);
  }

  async function one(
    workshopId: string,
    { charges, ...news }: Heard,
    { whole: { board, bench }, readAt }: Workshop,
  ): Promise<void> {
    const now = deps.clock.now();
    const cards = await readCards(deps.dataSource.manager, workshopId, [...charges], bench, now);
    const rev = Math.max(news.rev, board.rev);
    const others = board.charges.filter(({ id }) => !charges.has(id));
    const changed = { ...board, rev, at: toInstant(now), charges: [...others, ...cards] };
    show(workshopId, { board: changed, bench }, readAt, now);
  }

  async function all(workshopId: string, changed: boolean): Promise<void> {
    const now = deps.clock.now();
    show(workshopId, await readBoard(deps.dataSource.manager, workshopId, now), now, now, changed);
  }

  async function round(workshopId: string, news: Heard): Promise<void> {
    if (walls.count(workshopId) === 0) {
      kept.delete(workshopId);
      return;
    }
    const present = kept.get(workshopId);
    // A gap: somebody counted the board up and did not say which charge it was.
    const known = present && news.rev <= present.whole.board.rev + news.revs;
    if (known && news.charges.size > 0) await one(workshopId, news, present);
    // Also where nothing is known yet.
    const old = Math.abs(deps.clock.now() - (present?.readAt ?? -Infinity)) >= WHOLE_AFTER_MS;
    if (news.whole || old || (news.revs > 0 && !known)) await all(workshopId, news.whole || news.revs > 0);
  }

  async function run(workshopId: string): Promise<void> {
    for (let news = heard.get(workshopId); news; news = heard.get(workshopId)) {
      heard.delete(workshopId);
      try {
        await round(workshopId, news);
      } catch (error) {
        deps.log.error({ err: error, workshopId }, 'walls were not told what changed and read their board anew');
        kept.delete(workshopId);
        walls.tell(workshopId, { from: null, rev: news.rev });
      }
    }
    running.delete(workshopId);
  }

  function newsOf(workshopId: string): Heard {
    const news = heard.get(workshopId) ?? { charges: new Set(), revs: 0, rev: 0, whole: false };
    heard.set(workshopId, news);
    // What is announced of one commit comes together.
    if (!running.has(workshopId))
      running.set(
        workshopId,
        Promise.resolve().then(() => run(workshopId)),
      );
    return news;
  }

  return {
    watch(workshopId) {
      if (!kept.has(workshopId)) newsOf(workshopId);
    },
    hear(workshopId, event, payload) {
      const whole = wholeEvents.has(event);
      if (!whole && event !== 'board:changed') return;
      const news = newsOf(workshopId);
      if (whole) news.whole = true;
      else {
        const { chargeId, rev } = payload as LivePayload<'board:changed'>;
        news.revs += 1;
        news.rev = Math.max(news.rev, rev);
        if (chargeId === null) news.whole = true;
        else news.charges.add(chargeId);
      }
    },
    async idle() {
      while (running.size > 0) await Promise.all(running.values());
    },
  };
}
