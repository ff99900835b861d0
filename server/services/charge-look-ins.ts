import type { LookIn } from '../entities/look-in';
import type { ChargeFile } from './charge-file';
import { isRunning } from './charge-stages';

/** A visit this long before a look-in counts for it: the bench shows it as due from then on, ms. */
export const LOOK_IN_WINDOW_MS = 10 * 60_000;

/** A charge asks for look-ins from its first current to the end of the rest, but not while it is held. */
const asksForLookIns = ({ charge }: Pick<ChargeFile, 'charge'>): boolean =>
  isRunning(charge.stage) || charge.stage === 'resting';

/** Instants at which a charge that begins at `from` and is checked at `until` is looked at, epoch ms. */
export function lookInTimes(from: number, until: number, intervalS: number): number[] {
  const times: number[] = [];
  for (let at = from + intervalS * 1000; at < until; at += intervalS * 1000) times.push(at);
  return times;
}

/** The look-ins still to be made, and those that the moved finish has no place for any more. */
export function lookInChanges(file: ChargeFile, now: number): { add: number[]; drop: LookIn[] } {
  const { charge, lookIns } = file;
  const ahead = (lookIn: LookIn): boolean => lookIn.doneAt === null && lookIn.dueAt > now;
  if (charge.startedAt === null || charge.stage === 'held') return { add: [], drop: [] };
  if (!asksForLookIns(file)) return { add: [], drop: lookIns.filter(ahead) };
  const until = charge.checkDueAt ?? charge.startedAt;
  const known = new Set(lookIns.map((lookIn) => lookIn.dueAt));
  const times = lookInTimes(charge.startedAt, until, charge.frozen.workshop.lookInIntervalS);
  return {
    add: times.filter((at) => !known.has(at)),
    drop: lookIns.filter((lookIn) => ahead(lookIn) && lookIn.dueAt >= until),
  };
}

/** The last one that was done; earlier ones that nobody came for stay open and count as missed. */
const lastDone = (lookIns: readonly LookIn[]): number =>
  Math.max(-Infinity, ...lookIns.filter((lookIn) => lookIn.doneAt !== null).map((lookIn) => lookIn.dueAt));

/** The look-in that waits for somebody at `now`; of several missed ones the last. */
export function dueLookIn(file: ChargeFile, now: number): LookIn | null {
  if (!asksForLookIns(file)) return null;
  const done = lastDone(file.lookIns);
  return file.lookIns.filter((one) => one.doneAt === null && one.dueAt <= now && one.dueAt > done).at(-1) ?? null;
}

/** Nobody has come for a look-in when this long has passed, or the interval where that is less, ms. A guess. */
const MISSED_AFTER_MS = 15 * 60_000;
const missedAfterMs = ({ charge }: ChargeFile): number =>
  Math.min(MISSED_AFTER_MS, charge.frozen.workshop.lookInIntervalS * 1000);

/** Open look-ins since the last one that was done; none where the charge asks for none. */
const openSinceDone = (file: ChargeFile): LookIn[] => {
  if (!asksForLookIns(file)) return [];
  const done = lastDone(file.lookIns);
  return file.lookIns.filter((one) => one.doneAt === null && one.dueAt > done);
};

/** The first look-in that nobody has come for in time; it stands until somebody looks in. */
export const missedLookIn = (file: ChargeFile, now: number): LookIn | null =>
  openSinceDone(file).find((one) => one.dueAt + missedAfterMs(file) <= now) ?? null;

/** When the next look-in will have been missed, epoch ms; null: none is to come. */
export const nextMissedAt = (file: ChargeFile, now: number): number | null => {
  const next = openSinceDone(file).find((one) => one.dueAt + missedAfterMs(file) > now);
  return next === undefined ? null : next.dueAt + missedAfterMs(file);
};

/** Since when nobody was at the charge: its last look-in, else its start, epoch ms. */
export const lastVisitAt = ({ charge, lookIns }: ChargeFile): number =>
  Math.max(charge.startedAt ?? 0, ...lookIns.map(({ doneAt }) => doneAt ?? 0));

/** The next look-in to be shown: one that is due already, else the first to come. */
export function nextLookIn(file: ChargeFile, now: number): LookIn | null {
  if (!asksForLookIns(file)) return null;
  const done = lastDone(file.lookIns);
  return (
    dueLookIn(file, now) ?? file.lookIns.find((one) => one.doneAt === null && one.dueAt > Math.max(now, done)) ?? null
  );
}

/** The look-in that a visit at `at` counts for; null: none was due then or is within ten minutes. */
export function lookInOfVisit(file: ChargeFile, at: number): LookIn | null {
  const done = lastDone(file.lookIns);
  return (
    file.lookIns
      .filter((one) => one.doneAt === null && one.dueAt <= at + LOOK_IN_WINDOW_MS && one.dueAt > done)
      .at(-1) ?? null
  );
}
