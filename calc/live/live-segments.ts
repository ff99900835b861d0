import type { Segment } from '../plan-types';
import type { LivePast, LiveRound } from './live-rounds';

export interface AheadClock {
  /** Of each round still to come (the running one first): hands, start, taper and end, s from the clip-on. */
  rounds: { handsFromS: number; fromS: number; taperS: number | null; toS: number }[];
  currentEndS: number;
  restEndS: number;
  readyS: number;
}

/** The ribbon of a running charge: what was, with gaps where it was held, and what is to come. */
export function liveSegments(past: LivePast, clock: AheadClock): Segment[] {
  const segments: Segment[] = [];
  const push = (kind: Segment['kind'], fromS: number, toS: number): void => {
    const last = segments[segments.length - 1];
    if (toS - fromS <= 1e-6) return;
    if (last && last.kind === kind && Math.abs(last.toS - fromS) < 1e-6) last.toS = toS;
    else segments.push({ kind, fromS, toS });
  };
  past.begun.forEach((round, at) => {
    const before = past.begun[at - 1];
    const start = round.stretches[0]?.fromS;
    if (before && start !== undefined) push('hands', endOf(before) ?? start, start);
    pastOf(round, push);
  });
  for (const { handsFromS, fromS, taperS, toS } of clock.rounds) {
    push('hands', handsFromS, fromS);
    const change = taperS === null ? toS : Math.min(Math.max(taperS, fromS), toS);
    push('cc', fromS, change);
    push('taper', change, toS);
  }
  push('rest', clock.currentEndS, clock.restEndS);
  push('check', clock.restEndS, clock.readyS);
  return segments;
}

function pastOf(round: LiveRound, push: (kind: Segment['kind'], fromS: number, toS: number) => void): void {
  const tapers = round.pasts.map((one) => one.taperAtS);
  const taperS = tapers.every((one) => one !== null) ? Math.max(...tapers.map((one) => one!)) : Infinity;
  for (const { fromS, toS } of round.stretches) {
    const end = Math.min(toS, round.endedAtS ?? Infinity);
    const change = Math.min(Math.max(taperS, fromS), end);
    push('cc', fromS, change);
    push('taper', change, end);
  }
}

/** Last current of a round that is over. */
export function endOf(round: LiveRound): number | null {
  const last = round.stretches[round.stretches.length - 1];
  if (!last) return round.endedAtS;
  return Math.min(last.toS, round.endedAtS ?? Infinity);
}
