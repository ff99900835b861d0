import type { LiveReading } from '../live-types';
import { quantile } from '../statistics/quantile';
import type { LaneReading } from './lane-past';

/** A reading that counts, and what it stands for. */
export interface KeptReading extends LaneReading {
  reading: LiveReading;
  /** Readings it stands for, itself among them. */
  count: number;
}

/** Up to so many are all kept. */
const ALL_BELOW = 32;
/** Of more the last ones are kept, in which a fault shows first. */
const LAST_KEPT = 8;
/** The earlier ones in so many windows at most. */
const WINDOWS = 20;
/** Shortest window, s; longer ones are twice as long, and so on. */
const SHORTEST_WINDOW_S = 60;
/** Readings that differ by more than this from the one before are both kept. */
const JUMP_AMPS_SHARE = 0.05;
const JUMP_AMPS = 0.2;
const JUMP_VOLTS = 0.02;
/** And by more than so many times what readings beside each other usually differ: a meter that scatters makes no jumps. */
const JUMP_OF_USUAL = 4;

/**
 * The readings that a reckoning goes through, in the order of time whatever the order they came in.
 *
 * Of up to 32 it is all. Of more the last eight stay, and of the earlier ones the last in each window (of 60, 120, 240 … s, at
 * most 20 windows), both sides of every jump out of the scatter, and the first: readings close together share the error of the
 * model, so that more of them say little more. No charge is lost: each kept reading brings the trapezium over all that were left
 * out before it.
 */
export function thinReadings(readings: readonly LiveReading[], nowS: number): KeptReading[] {
  const all = readings.filter(({ s }) => s <= nowS).sort(inOrder);
  const kept = keptIndexes(all);
  const thinned: KeptReading[] = [];
  let ampSeconds = 0;
  let left = 0;
  let lastAmps: { s: number; amps: number } | null = null;
  let between = 0;
  all.forEach((reading, at) => {
    if (reading.amps !== null) {
      const amps = Math.abs(reading.amps);
      if (lastAmps !== null) ampSeconds += ((lastAmps.amps + amps) / 2) * (reading.s - lastAmps.s);
      lastAmps = { s: reading.s, amps };
      between += 1;
    }
    left += 1;
    if (!kept(at)) return;
    const own = reading.amps === null ? 0 : 1;
    thinned.push({
      index: thinned.length,
      s: reading.s,
      // A discharge is read as a negative current; a lane counts its own way.
      amps: reading.amps === null ? null : Math.abs(reading.amps),
      terminalVolts: reading.terminalVolts,
      ...(own === 1 && between > 1 ? { ampSeconds } : {}),
      reading,
      count: left,
    });
    left = 0;
    if (own === 1) {
      ampSeconds = 0;
      between = 0;
    }
  });
  return thinned;
}

function keptIndexes(all: readonly LiveReading[]): (at: number) => boolean {
  const early = all.length - LAST_KEPT;
  if (all.length <= ALL_BELOW) return () => true;
  const span = all[early]!.s - all[0]!.s;
  let windowS = SHORTEST_WINDOW_S;
  while (span / windowS > WINDOWS) windowS *= 2;
  const windowOf = (at: number): number => Math.floor(all[at]!.s / windowS);
  const isJump = jumpsOf(all);
  return (at) =>
    at === 0 ||
    at >= early ||
    windowOf(at) !== windowOf(at + 1) ||
    isJump(all[at]!, all[at + 1]!) ||
    isJump(all[at - 1]!, all[at]!) ||
    hasMore(all[at]!, all[at + 1]!);
}

/** Whether one reading is a jump from the one before: in the current, or in the volts between the clips. */
function jumpsOf(all: readonly LiveReading[]): (one: LiveReading, next: LiveReading) => boolean {
  const jumpAmps = Math.max(JUMP_AMPS, JUMP_OF_USUAL * usualStep(all, ({ amps }) => amps && Math.abs(amps)));
  const jumpVolts = Math.max(JUMP_VOLTS, JUMP_OF_USUAL * usualStep(all, ({ terminalVolts }) => terminalVolts));
  return (one, next) => {
    if (one.amps !== null && next.amps !== null) {
      const most = Math.max(Math.abs(one.amps), Math.abs(next.amps));
      if (Math.abs(Math.abs(one.amps) - Math.abs(next.amps)) > Math.max(jumpAmps, JUMP_AMPS_SHARE * most)) return true;
    }
    return (
      one.terminalVolts !== null &&
      next.terminalVolts !== null &&
      Math.abs(one.terminalVolts - next.terminalVolts) > jumpVolts
    );
  };
}

/** Median of the steps between readings beside each other; 0 where fewer than two were read. */
function usualStep(all: readonly LiveReading[], of: (reading: LiveReading) => number | null): number {
  const steps: number[] = [];
  let before: number | null = null;
  for (const reading of all) {
    const value = of(reading);
    if (value === null) continue;
    if (before !== null) steps.push(Math.abs(value - before));
    before = value;
  }
  return steps.length === 0 ? 0 : quantile(steps, 0.5);
}

/** Group voltages or a temperature among readings without are rare, and wanted. */
const hasMore = (one: LiveReading, next: LiveReading): boolean =>
  (one.groupVolts !== null && next.groupVolts === null) || (one.celsius !== null && next.celsius === null);

/** By time; at the same instant by what was read, so that the order of arrival is no matter. */
function inOrder(one: LiveReading, other: LiveReading): number {
  if (one.s !== other.s) return one.s - other.s;
  const [first, second] = [JSON.stringify(one), JSON.stringify(other)];
  return first < second ? -1 : first > second ? 1 : 0;
}
