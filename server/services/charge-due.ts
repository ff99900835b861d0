/** When something happens next to a charge, and since when it is late. */
import { latestStartAt, silenceOf } from './charge-causes';
import type { ChargeFile } from './charge-file';
import { chargeNow, instantOf, secondsOf } from './charge-clock';
import { dueLookIn, nextLookIn, nextMissedAt } from './charge-look-ins';
import { isRunning, isUnderWay, swapWait } from './charge-stages';

/** A check or a swap that waits is told again after these, ms (look: two rising tones, again after 5 and 15 min). */
export const TOLD_AGAIN_MS = [5 * 60_000, 15 * 60_000];
/** A check that came in time and that nobody has entered for this long makes the charge overdue, ms. */
export const CHECK_OVERDUE_MS = 15 * 60_000;
/** A ready charge stands on the wall for this long, ms. */
export const READY_ON_WALL_MS = 30 * 60_000;
/** A stopped one stands on the board for this long, ms. */
export const STOPPED_ON_BOARD_MS = 10 * 60_000;
/** A running charge is reckoned anew at least this often, so that its levels on the board stay true, ms. */
export const REFRESH_MS = 5 * 60_000;

/** An end that has come by the numbers while the stage has not: looked at again after this, ms. */
const SOON_MS = 60_000;

/** Latest instant at which the charge still keeps its word: the planned 90 %, or the wished time where that is earlier. */
export const promisedAt = ({ charge }: Pick<ChargeFile, 'charge'>): number =>
  Math.min(charge.plannedLateAt, charge.readyBy ?? Infinity);

/** A person has judged the groups since the check fell due. */
export const isChecked = ({ charge }: Pick<ChargeFile, 'charge'>): boolean =>
  charge.checkedAt !== null && charge.checkDueAt !== null && charge.checkedAt >= charge.checkDueAt;

/**
 * Since when a charge is late; null: it is not.
 *
 * Late is what is not ready when its promise has passed. A check that fell due in time is not late while somebody can
 * still come for it: it counts as *check due* for a quarter of an hour, and as late from then on.
 */
export function overdueSince(file: ChargeFile, now: number): number | null {
  const { charge } = file;
  if (charge.stage !== 'queued' && !isUnderWay(charge.stage)) return null;
  const promised = promisedAt(file);
  if (charge.stage === 'check-due' && charge.checkDueAt !== null && charge.checkDueAt <= promised && !isChecked(file)) {
    const since = charge.checkDueAt + CHECK_OVERDUE_MS;
    return since <= now ? since : null;
  }
  return promised <= now ? promised : null;
}

/** Next instant after `now` at which the server has to look at this charge; null: never by itself. */
export function nextDueAt(file: ChargeFile, now: number): number | null {
  const { charge } = file;
  const at = chargeNow(charge, now);
  const instants: (number | null)[] = [];
  const inTime = overdueSince(file, now) === null;
  if (charge.stage === 'planned') {
    instants.push(latestStartAt(file));
  } else if (charge.stage === 'queued') {
    instants.push(promisedAt(file), latestStartAt(file));
  } else if (isUnderWay(charge.stage)) {
    if (inTime) instants.push(promisedAt(file));
    if (charge.stage !== 'held') instants.push(...runInstants(file, at));
    if (charge.stage === 'check-due' && charge.checkDueAt !== null && !isChecked(file)) {
      instants.push(...TOLD_AGAIN_MS.map((wait) => charge.checkDueAt! + wait));
      if (inTime) instants.push(charge.checkDueAt + CHECK_OVERDUE_MS);
    }
  } else if (charge.stage === 'ready' && charge.readyAt !== null) {
    instants.push(charge.readyAt + READY_ON_WALL_MS);
  } else if (charge.stage === 'stopped' && charge.stoppedAt !== null) {
    instants.push(charge.stoppedAt + STOPPED_ON_BOARD_MS);
  }
  const ahead = instants.filter((instant) => instant !== null).filter((instant) => instant > at);
  return ahead.length === 0 ? null : Math.min(...ahead);
}

function runInstants(file: ChargeFile, at: number): (number | null)[] {
  const { charge } = file;
  const instants: (number | null)[] = [];
  if (isRunning(charge.stage)) {
    const reckoning = charge.reckoning?.reckoning;
    const swap = swapWait(file);
    if (swap !== null) instants.push(...TOLD_AGAIN_MS.map((wait) => swap.since + wait));
    else if (reckoning) {
      instants.push(charge.taperAt);
      // By seconds: as an instant what ends now lies a digit ahead, again and again while a reading says that it flows.
      const nowS = secondsOf(charge, at);
      for (const endS of [reckoning.stepEndS, reckoning.currentEndS])
        instants.push(endS > nowS ? instantOf(charge, endS) : at + SOON_MS);
    }
    instants.push(at + REFRESH_MS, silenceOf(file)?.dueAt ?? null);
  }
  if (charge.stage === 'resting') {
    const due = charge.checkDueAt ?? at;
    instants.push(due > at ? due : at + SOON_MS, at + REFRESH_MS);
  }
  if (charge.stage !== 'check-due') {
    const lookIn = dueLookIn(file, at) === null ? nextLookIn(file, at) : upcoming(file, at);
    instants.push(lookIn?.dueAt ?? null, nextMissedAt(file, at));
  }
  return instants;
}

const upcoming = (file: ChargeFile, at: number) =>
  file.lookIns.find((one) => one.doneAt === null && one.dueAt > at) ?? null;
