/** After so many tries an entry is given up and shown to the manager: with the waits below after about an hour. */
export const MOST_TRIES = 12;
const FIRST_WAIT_MS = 5000;
/** No wait is longer than this, and so no due instant lies further ahead, ms. */
export const LONGEST_WAIT_MS = 10 * 60_000;

/**
 * How long to wait after a try that failed, ms: twice as long each time, the last half of it by chance, so that what failed
 * together does not come back together.
 * @param tries tries made, 1 or more
 * @param random 0…1, seeded in tests
 * @param askedMs what the service asked for; it is waited for that at least, up to the longest wait
 */
export function backoffMs(tries: number, random: () => number, askedMs = 0): number {
  const full = Math.min(LONGEST_WAIT_MS, FIRST_WAIT_MS * 2 ** (tries - 1));
  const wait = full * (0.5 + 0.5 * random());
  return Math.round(Math.min(LONGEST_WAIT_MS, Math.max(wait, askedMs)));
}
