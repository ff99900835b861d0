import type { Deps } from '../deps';
import { earliestPassDueAt } from '../repositories/alerts.repository';
import { earliestDueAt } from '../repositories/charges.repository';
import { afterClockSetBack, passUntaken } from '../alerts/pass-untaken';
import { tellSilentWalls } from '../alerts/wall-silence';
import { bringDueCharges } from '../services/due-charges.service';
import { makeDueLoop, type DueLoop } from './due-loop';

export { LONGEST_SLEEP_MS } from './due-loop';
/** A charge that failed is tried again after this, ms. */
const TRY_AGAIN_MS = 60_000;
/** A clock that went back by more than this was set, ms. */
const SET_BACK_MS = 60_000;

export type SleeperLoop = DueLoop;

type LoopDeps = Pick<Deps, 'dataSource' | 'clock' | 'log' | 'hub' | 'outbox'>;

/**
 * One timer to the earliest due instant in the database: of charges, and of alerts that nobody has taken. Nothing is kept
 * in memory that a restart could lose: each round asks the database what is due, so it does not matter whether a timer
 * came early, late, twice or not at all.
 */
export function makeSleeper(deps: LoopDeps): SleeperLoop {
  const failedUntil = new Map<string, number>();
  // The first round looks too: the clock may have been set back while the server was off.
  let lastNow = Infinity;

  async function work(): Promise<number> {
    let done = 0;
    const begun = deps.clock.now();
    if (begun < lastNow - SET_BACK_MS) await afterClockSetBack(deps, begun);
    lastNow = begun;
    // A round may make others due; what stays due after a round has failed and waits for its next try.
    for (let pass = 0; pass < 20; pass += 1) {
      const now = deps.clock.now();
      for (const [id, until] of failedUntil) if (until <= now || until > now + TRY_AGAIN_MS) failedUntil.delete(id);
      const work = await bringDueCharges(sleepers, now, new Set(failedUntil.keys()));
      for (const id of work.failed) failedUntil.set(id, now + TRY_AGAIN_MS);
      done += work.done;
      if (work.done === 0) break;
    }
    done += await tellSilentWalls(deps, deps.clock.now());
    done += await passUntaken(deps, deps.clock.now());
    return done;
  }

  const loop = makeDueLoop({
    clock: deps.clock,
    log: deps.log,
    name: 'the sleeper',
    work,
    async nextDueAt() {
      const { manager } = deps.dataSource;
      const instants = [await earliestDueAt(manager, [...failedUntil.keys()]), await earliestPassDueAt(manager)];
      const due = instants.filter((at) => at !== null);
      return due.length === 0 ? null : Math.min(...due);
    },
  });
  const sleepers = { ...deps, sleeper: loop };
  return loop;
}
