import type { Logger } from 'pino';
import type { Clock } from '../clock';

/** However long nothing is due, the clock is looked at again after this: it may have been set, or the machine slept, ms. */
export const LONGEST_SLEEP_MS = 30_000;
/** Never sooner than this after a round, so that nothing can spin, ms. */
const SHORTEST_SLEEP_MS = 50;

export interface DueLoop {
  /** What is due may have moved: look again. */
  poke(): void;
  /** Does everything that is due at the clock's now; what was due while the server was off comes first of all. */
  runDue(): Promise<number>;
  /** Catches up, then sleeps from due instant to due instant until it is stopped. */
  start(): Promise<void>;
  /** Ends the sleep and waits for the round under way. */
  stop(): Promise<void>;
}

interface LoopParts {
  clock: Clock;
  log: Logger;
  /** For the log: 'the sleeper'. */
  name: string;
  /** One round. @returns how much was done */
  work(): Promise<number>;
  /** The next due instant in the database, epoch ms; null: nothing waits. */
  nextDueAt(): Promise<number | null>;
}

/** One timer to the next due instant of a table. Rounds do not overlap; whoever asks during one gets a further round. */
export function makeDueLoop({ clock, log, name, work, nextDueAt }: LoopParts): DueLoop {
  let timer: NodeJS.Timeout | null = null;
  let running = false;
  let awake = false;
  let round: Promise<number> | null = null;

  async function runDue(): Promise<number> {
    while (round) await round.catch(() => 0);
    round = work();
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
      log.error({ error }, `${name} could not look for what is due`);
    } finally {
      awake = false;
    }
    await arm();
  }

  async function arm(): Promise<void> {
    if (!running) return;
    let wait = LONGEST_SLEEP_MS;
    try {
      const dueAt = await nextDueAt();
      if (dueAt !== null) wait = dueAt - clock.now();
    } catch (error) {
      log.error({ error }, `${name} could not read the next due instant`);
    }
    if (!running) return;
    if (timer) clearTimeout(timer);
    timer = setTimeout(() => void wake(), Math.min(LONGEST_SLEEP_MS, Math.max(SHORTEST_SLEEP_MS, wait)));
    // The server's own sockets keep the process alive; a sleeping timer must not.
    timer.unref();
  }

  return {
    poke(): void {
      if (running && !awake) void arm();
    },
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
