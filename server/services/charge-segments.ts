import type { Segment } from '@/calc/plan-types';
import type { TimedSegment } from '@/shared/contract/charge';
import type { ChargeFile } from './charge-file';
import { instantOf, optionZeroAt } from './charge-clock';
import { isWaitingToStart, swapWait } from './charge-stages';
import { toInstant } from './instants';

interface Stretch {
  kind: Segment['kind'];
  from: number;
  to: number;
}

/** How far what is still to come has moved since it was reckoned, ms: a held or waiting charge moves with the clock. */
export function waitShiftMs(file: ChargeFile, now: number): number {
  const { charge } = file;
  if (charge.stage === 'queued') return Math.max(0, now - charge.clipOnAt);
  const waits = charge.stage === 'held' || swapWait(file) !== null;
  return waits && charge.reckoning !== null ? Math.max(0, now - charge.reckoning.at) : 0;
}

/** The charge's time from clip-on to check: what is done at the instants it was done, what is to come as reckoned last. */
export function timedSegments(file: ChargeFile, now: number): TimedSegment[] {
  const { charge } = file;
  const end = charge.stoppedAt ?? charge.readyAt ?? charge.closedAt ?? Infinity;
  return stretches(file, now)
    .filter((one) => one.from < end && one.to > one.from)
    .map(({ kind, from, to }) => ({ kind, from: toInstant(from), to: toInstant(Math.min(to, end)) }));
}

function stretches(file: ChargeFile, now: number): Stretch[] {
  const { charge } = file;
  const zero = optionZeroAt(charge);
  const planned = charge.option.segments.map((segment) => ({
    kind: segment.kind,
    from: zero + Math.round(segment.fromS * 1000),
    to: zero + Math.round(segment.toS * 1000),
  }));
  const reckoning = charge.reckoning;
  const shift = waitShiftMs(file, now);
  // Taken off before it began: nothing of its plan has happened.
  if (charge.startedAt === null && charge.stage === 'stopped') return [];
  if (charge.startedAt === null || reckoning === null)
    return isWaitingToStart(charge.stage)
      ? planned.map((one) => ({ ...one, from: one.from + shift, to: one.to + shift }))
      : planned;
  const begun = charge.startedAt;
  // Wait and clip-on lie before the first current; the reckoning counts from there.
  const before = planned.filter((one) => one.from < begun).map((one) => ({ ...one, to: Math.min(one.to, begun) }));
  const since = reckoning.reckoning.segments.map((segment) => ({
    kind: segment.kind,
    from: instantOf(charge, segment.fromS),
    to: instantOf(charge, segment.toS),
  }));
  return [...before, ...moved(since, reckoning.at, shift).filter((one) => one.to > begun)];
}

/** What was still to come when it was reckoned begins later by the wait since; a stretch over that instant is cut there. */
function moved(stretchesOf: readonly Stretch[], at: number, shift: number): Stretch[] {
  if (shift === 0) return [...stretchesOf];
  return stretchesOf.flatMap((one) => {
    if (one.to <= at) return [one];
    const later = { ...one, from: Math.max(one.from, at) + shift, to: one.to + shift };
    return one.from < at ? [{ ...one, to: at }, later] : [later];
  });
}
