/** A charge on its way to another channel or time: where it may go, and what that brings. Pure; instants are epoch ms. */
import type { BenchPlanDto, MovePlaceDto, MovePlacesDto, PlacedDto, PlanChargeDto } from '@/shared/contract/bench-plan';
import type { Segment } from '@/calc/plan-types';

export interface Candidate {
  channelId: string;
  clipOn: number;
}

export const quarterMs = 15 * 60_000;

/** Where a charge stands in the plan; null where it has no channel yet. */
export function standsAt({ card, holds }: PlanChargeDto): Candidate | null {
  const first = [...holds].sort((a, b) => Date.parse(a.from) - Date.parse(b.from))[0];
  return first ? { channelId: first.channelId, clipOn: Date.parse(card.clipOnAt) } : null;
}

/** What is being moved: a charge of the days shown, or one of the queue whose day is another. */
export interface MoveSubject {
  chargeId: string;
  title: string;
  rev: number;
  fixedBecause: string | null;
  stands: Candidate | null;
  channelNames: readonly string[];
  clipOnAt: string;
  dueAt: string | null;
  /** null: it is not on the days shown, and nothing is drawn of it. */
  charge: PlanChargeDto | null;
}

/** The charge or the row of the queue with this id; null: it is gone. */
export function subjectOf(plan: BenchPlanDto, chargeId: string): MoveSubject | null {
  const charge = plan.charges.find(({ card }) => card.id === chargeId) ?? null;
  const row = plan.queue.find((one) => one.chargeId === chargeId);
  if (charge) {
    const { title, rev, channelNames, clipOnAt, readyBy } = charge.card;
    const { fixedBecause } = charge;
    const dueAt = row ? row.dueAt : readyBy;
    return { chargeId, title, rev, fixedBecause, stands: standsAt(charge), channelNames, clipOnAt, dueAt, charge };
  }
  if (!row) return null;
  const channel = plan.channels.find(({ name }) => name === row.channelNames[0]);
  const stands = channel ? { channelId: channel.id, clipOn: Date.parse(row.clipOnAt) } : null;
  return { ...row, fixedBecause: null, stands, charge: null };
}

/** The soonest on a channel; null where it cannot be done there. */
export const soonestOn = (places: MovePlacesDto, channelId: string): PlacedDto | null =>
  places.places.find((place) => place.channelId === channelId)?.soonest ?? null;

/** At a channel with the time that is wanted, or the soonest there where that is later. */
export function onChannel(places: MovePlacesDto, channelId: string, clipOn: number): Candidate | null {
  const soonest = soonestOn(places, channelId);
  return soonest && { channelId, clipOn: Math.max(clipOn, Date.parse(soonest.clipOnAt)) };
}

/** To the next or the last full quarter hour; never before the soonest on that channel, which the first step leads to. */
export function stepTime(candidate: Candidate, places: MovePlacesDto, step: 1 | -1): Candidate {
  const soonest = soonestOn(places, candidate.channelId);
  const quarters = candidate.clipOn / quarterMs;
  const wanted = (step === 1 ? Math.floor(quarters) + 1 : Math.ceil(quarters) - 1) * quarterMs;
  const earliest = soonest ? Date.parse(soonest.clipOnAt) : candidate.clipOn;
  if (step === -1 && candidate.clipOn <= earliest) return candidate;
  return { ...candidate, clipOn: Math.max(wanted, earliest) };
}

/** To the next channel, down or up, on which it can be done; stays where there is none. */
export function stepChannel(candidate: Candidate, places: MovePlacesDto, step: 1 | -1): Candidate {
  const rows = places.places;
  const at = rows.findIndex((place) => place.channelId === candidate.channelId);
  // From a channel that is no place for it, the first step down leads to the first one that is.
  for (let i = at + step; i >= 0 && i < rows.length; i += step) {
    const place = rows[i];
    const next = place?.soonest ? onChannel(places, place.channelId, candidate.clipOn) : null;
    if (next) return next;
  }
  return candidate;
}

/**
 * What a candidate brings: the soonest on its channel, moved to its time. The server reckons the exact one when it is
 * taken; nights and weekends in between can make it later.
 */
export function placedAt(candidate: Candidate, places: MovePlacesDto, dueAt: string | null): PlacedDto | null {
  const soonest = soonestOn(places, candidate.channelId);
  if (!soonest) return null;
  const later = candidate.clipOn - Date.parse(soonest.clipOnAt);
  if (later === 0) return soonest;
  const moved = (instant: string) => new Date(Date.parse(instant) + later).toISOString();
  const late = moved(soonest.ready.late);
  return {
    channelNames: soonest.channelNames,
    clipOnAt: moved(soonest.clipOnAt),
    ready: { early: moved(soonest.ready.early), likely: moved(soonest.ready.likely), late },
    lateByMinutes: dueAt === null ? 0 : Math.max(0, Math.round((Date.parse(late) - Date.parse(dueAt)) / 60_000)),
  };
}

/** The charge that has the channel while the candidate would run there; null: nobody has it. */
export function heldBy(
  candidate: Candidate,
  chargeId: string,
  placed: PlacedDto,
  plan: Pick<BenchPlanDto, 'charges'>,
): { title: string; from: number; to: number } | null {
  const until = Date.parse(placed.ready.likely);
  for (const { card, holds } of plan.charges) {
    if (card.id === chargeId) continue;
    const hold = holds.find(
      ({ channelId, from, to }) =>
        channelId === candidate.channelId && Date.parse(from) < until && Date.parse(to) > candidate.clipOn,
    );
    if (hold) return { title: card.title, from: Date.parse(hold.from), to: Date.parse(hold.to) };
  }
  return null;
}

/**
 * The silhouette of a charge at its candidate place: its own, moved, and stretched or pressed to the time it takes on that
 * channel. Seconds count from `zero`.
 */
export function ghostSegments(segments: readonly Segment[], candidate: Candidate, placed: PlacedDto, zero: number) {
  const begin = segments[0]?.fromS ?? 0;
  const end = segments.at(-1)?.toS ?? begin + 3600;
  const startS = (candidate.clipOn - zero) / 1000;
  const length = (Date.parse(placed.ready.likely) - candidate.clipOn) / 1000;
  const scale = length / Math.max(60, end - begin);
  const moved = (s: number) => startS + (s - begin) * scale;
  return segments.map((one) => ({ ...one, fromS: moved(one.fromS), toS: moved(one.toS) }));
}

/** A charge at the place it would go to. */
export interface Ghost {
  title: string;
  candidate: Candidate;
  placed: PlacedDto;
  /** Of the charge where it stands, seconds from its clip-on. */
  segments: readonly Segment[];
  hanging: boolean;
}

/** What is drawn of a charge at its candidate place. */
export function ghostOf({ card }: PlanChargeDto, candidate: Candidate, placed: PlacedDto): Ghost {
  const zero = Date.parse(card.clipOnAt);
  return {
    title: card.title,
    candidate,
    placed,
    segments: card.segments.map(({ kind, from, to }) => ({
      kind,
      fromS: (Date.parse(from) - zero) / 1000,
      toS: (Date.parse(to) - zero) / 1000,
    })),
    hanging: card.direction === 'discharge',
  };
}

/** Whether a candidate is another place than the charge has. */
export const isOther = (candidate: Candidate, stands: Candidate | null): boolean =>
  stands === null || candidate.channelId !== stands.channelId || Math.abs(candidate.clipOn - stands.clipOn) >= 60_000;

/** The place at which the charge is likely ready soonest; null: there is none. */
export function soonestPlace(places: MovePlacesDto): MovePlaceDto | null {
  const possible = places.places.filter((place) => place.soonest !== null);
  const readyOf = (place: MovePlaceDto) => Date.parse(place.soonest?.ready.likely ?? '');
  return possible.sort((a, b) => readyOf(a) - readyOf(b))[0] ?? null;
}
