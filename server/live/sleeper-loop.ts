import type { Deps } from '../deps';
import { earliestDueAt } from '../repositories/charges.repository';
import { bringDueCharges } from '../services/due-charges.service';
import type { Sleeper } from './sleeper';

/** However long nothing is due, the clock is looked at again after this: it may have been set, or the machine slept, ms. */
export const LONGEST_SLEEP_MS = 30_000;
/** A charge that failed is tried again after this, ms. */
const TRY_AGAIN_MS = 60_000;
/** Never sooner than this after a round, so that nothing can spin, ms. */
const SHORTEST_SLEEP_MS = 50;

export interface SleeperLoop extends Sleeper {
  /** Does everything that is due at the clock's now; what was due while the server was off comes first of all. */
  runDue(): Promise<number>;
  /** Catches up, then sleeps from due instant to due instant until it is stopped. */
  start(): Promise<void>;
  /** Ends the sleep and waits for the round under way. */
  stop(): Promise<void>;
}

type LoopDeps = Pick<Deps, 'dataSource' | 'clock' | 'log' | 'hub'>;

/**
 * One timer to the earliest due instant in the database. Nothing is kept in memory that a restart could lose: each round
 * asks the database what is due, so it does not matter whether a timer came early, late, twice or not at all.
 */
export function makeSleeper(deps: LoopDeps): SleeperLoop {
  let timer: NodeJS.Timeout | null = null;
  let running = false;
  let awake = false;
  let round: Promise<number> | null = null;
  const failedUntil = new Map<string, number>();

  const sleepers = { ...deps, sleeper: { poke } };

  async function workOnce(): Promise<number> {
    let done = 0;
    // A round may make others due; what stays due after a round has failed and waits for its next try.
    for (let pass = 0; pass < 20; pass += 1) {
      const now = deps.clock.now();
      for (const [id, until] of failedUntil) if (until <= now || until > now + TRY_AGAIN_MS) failedUntil.delete(id);
      const work = await bringDueCharges(sleepers, now, new Set(failedUntil.keys()));
      for (const id of work.failed) failedUntil.set(id, now + TRY_AGAIN_MS);
      done += work.done;
      if (work.done === 0) break;
    }
    return done;
  }

  /** Rounds do not overlap; whoever asks during one gets a further round after it. */
  async function runDue(): Promise<number> {
    while (round) await round.catch(() => 0);
    round = workOnce();
    try {
      return await round;
    } finally {
      round = null;
    }
  }

  async function wake(): Promise<void> {
    if (!running || awake) return;
    awake = true;
    timer = null;
    try {
      await runDue();
    } catch (error) {
      deps.log.error({ error }, 'the sleeper could not look for due charges');
    } finally {
      awake = false;
    }
    await arm();
  }

  async function arm(): Promise<void> {
    if (!running) return;
    let wait = LONGEST_SLEEP_MS;
    try {
      const dueAt = await earliestDueAt(deps.dataSource.manager, [...failedUntil.keys()]);
      if (dueAt !== null) wait = dueAt - deps.clock.now();
    } catch (error) {
      deps.log.error({ error }, 'the sleeper could not read the next due instant');
    }
    if (!running) return;
    if (timer) clearTimeout(timer);
    timer = setTimeout(() => void wake(), Math.min(LONGEST_SLEEP_MS, Math.max(SHORTEST_SLEEP_MS, wait)));
    // The server's own sockets keep the process alive; a sleeping timer must not.
    timer.unref();
  }

  function poke(): void {
    if (running && !awake) void arm();
  }

  return {
    poke,
    runDue,
    async start() {
      running = true;
      await runDue();
      await arm();
    },
    async stop() {
      running = false;
      if (timer) clearTimeout(timer);
      timer = null;
      await round?.catch(() => 0);
    },
  };
}
