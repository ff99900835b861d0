import type { LaneReading } from './lane-past';

/** A channel that pauses when it is warm goes on and off over this, s: 10 min of current and 2.5 min of pause; a guess. */
const PAUSE_MEMORY_S = 120;
/** A pause that is less likely than this is none: the channel is dead. */
const LEAST_CHANCE = 1e-3;
/** A current from here on is the set one, as a share of it. */
const FULL_SHARE = 0.9;
/** And one below this is none. */
const ZERO_SHARE = 0.01;

/**
 * The readings of a channel with thermal pauses, with the mean current in place of the one at that instant: the model runs with
 * the mean as well. A reading of no current is a pause, until that would be less likely than one in a thousand.
 *
 * On and off are taken as a process with two states and a memory that fades exponentially, so that the best guess of the
 * charge between two readings lies between their own mean and the channel's, the nearer to this the further they are apart:
 * d + (m − d)·tanh(x)/x with x = Δt/2T (the bridge of a stationary process with exponential covariance, from memory).
 *
 * @param setAmps that the channel is set to, positive
 * @param duty share of the time in which it gives current
 */
export function overPauses(readings: readonly LaneReading[], setAmps: number | null, duty: number): LaneReading[] {
  if (setAmps === null || duty >= 1) return [...readings];
  const meanAmps = setAmps * duty;
  let before: { s: number; amps: number; knows: boolean } | null = null;
  let pauseChance = 1;
  return readings.map((reading) => {
    const { amps, s } = reading;
    if (amps === null) return reading;
    const off = amps <= ZERO_SHARE * setAmps;
    const full = amps >= FULL_SHARE * setAmps;
    if (!off) pauseChance = 1;
    else if (before !== null && before.amps <= ZERO_SHARE * setAmps) pauseChance *= stillOff(s - before.s, duty);
    else pauseChance = 1 - duty;
    const last = before;
    before = { s, amps, knows: off || full };
    if (off && pauseChance < LEAST_CHANCE) return reading;
    if (!off && !full) return { ...reading, amps: Math.min(amps, meanAmps), readAmps: amps };
    const mean: LaneReading = {
      ...reading,
      amps: full ? amps * duty : meanAmps,
      readAmps: amps,
      ...(off ? { paused: true as const } : {}),
    };
    if (last === null || !last.knows || !(s > last.s)) return mean;
    const seconds = s - last.s;
    const seen = (reading.ampSeconds ?? ((last.amps + amps) / 2) * seconds) / seconds;
    const apart = seconds / Math.max(1, reading.count ?? 1);
    return { ...mean, ampSeconds: (meanAmps + (seen - meanAmps) * remembered(apart)) * seconds };
  });
}

const remembered = (seconds: number): number => {
  const x = seconds / (2 * PAUSE_MEMORY_S);
  return x < 1e-6 ? 1 : Math.tanh(x) / x;
};

/** Chance that a channel that was off is off again, or still, after so long. */
const stillOff = (seconds: number, duty: number): number => 1 - duty + duty * Math.exp(-seconds / PAUSE_MEMORY_S);
