/** How long a stint lasts on the clock, and in whose wait it lies. */
import type { EntityManager } from 'typeorm';
import { chargesWaitedFor, lookInsAhead, type WaitedFor } from '../repositories/waited-charges.repository';
import { findStaffing } from '../repositories/staffing.repository';
import { presentSpans, type SpanMs } from './presence';
import { defaultSettings } from './workshop-defaults';
import type { Acting } from './work-write';

const MINUTE_MS = 60_000;
/** The longest piece, 80 h, is over within this even in a half-time week, ms. */
const AHEAD_MS = 42 * 86_400_000;
const { lookInVisitMinutes } = defaultSettings('', 'UTC');

/**
 * When work is over that begins at `from` and takes `workMs`, epoch ms. It goes on only while the person is present, and
 * each look-in within it takes a visit. Whoever begins outside their hours works on by the clock.
 * @param present ascending, apart from each other
 * @param lookIns instants, ascending
 */
export function workedUntil(
  from: number,
  workMs: number,
  present: readonly SpanMs[],
  lookIns: readonly number[],
  visitMs: number,
): number {
  const at = present.findIndex((one) => one.from <= from && from < one.to);
  const spans = at < 0 ? [] : present.slice(at);
  const visits = lookIns.filter((one) => one >= from);
  let left = workMs;
  let cursor = from;
  for (const span of [...spans, { from: Math.max(from, spans.at(-1)?.to ?? from), to: Infinity }]) {
    cursor = Math.max(cursor, span.from);
    while (visits[0] !== undefined && visits[0] < span.to) {
      const worked = Math.max(0, visits[0] - cursor);
      if (left <= worked) break;
      left -= worked;
      // Two look-ins at one time are two visits, one after the other.
      cursor = Math.min(span.to, Math.max(cursor, visits[0]) + visitMs);
      visits.shift();
    }
    if (cursor + left <= span.to) return cursor + left;
    left -= span.to - cursor;
    cursor = span.to;
  }
  return cursor + left;
}

/** When a person is there from `from` on, far enough for the longest piece of work. */
export async function presentAhead(acting: Acting, personId: string, from: number): Promise<SpanMs[]> {
  const { manager, workshop } = acting;
  return presentSpans(workshop, await findStaffing(manager, workshop.id, personId), from, from + AHEAD_MS);
}

/** The span of a stint that begins at `from`, with the look-ins of the person's own charges within it. */
export async function spanOf(acting: Acting, personId: string, from: number, longMinutes: number): Promise<SpanMs> {
  const { manager, workshop } = acting;
  const present = await presentAhead(acting, personId, from);
  const lookIns = await lookInsAhead(manager, workshop.id, personId, from);
  const visitMs = (workshop.lookInVisitMinutes ?? lookInVisitMinutes) * MINUTE_MS;
  return { from, to: workedUntil(from, longMinutes * MINUTE_MS, present, lookIns, visitMs) };
}

/** From the clip-on until its check is due, as far as anybody knows. */
const waitSpan = (charge: WaitedFor): SpanMs => ({
  from: charge.startedAt ?? charge.clipOnAt,
  to: charge.readyAt ?? charge.checkDueAt ?? charge.likelyAt ?? charge.plannedLikelyAt,
});

const shared = (one: SpanMs, other: SpanMs): number =>
  Math.max(0, Math.min(one.to, other.to) - Math.max(one.from, other.from));

/**
 * The charge in whose wait a stint lies: of those the person waits for the one that runs or rests for most of it, for
 * half of it at least; their own before one of a repair they work on. Null: none.
 */
export async function waitChargeOf(
  manager: EntityManager,
  workshopId: string,
  personId: string,
  span: SpanMs,
): Promise<string | null> {
  const found = (await chargesWaitedFor(manager, workshopId, personId))
    .map((charge) => ({ charge, ms: shared(span, waitSpan(charge)) }))
    .filter(({ ms }) => ms > 0 && ms * 2 >= span.to - span.from)
    .sort((one, other) => other.ms - one.ms || own(other.charge, personId) - own(one.charge, personId));
  return found[0]?.charge.id ?? null;
}

const own = (charge: WaitedFor, personId: string): number => Number(charge.personId === personId);
