/** The workshop's day: channels and people on one time line, what is proposed for them, and the work that fits the waits. */
import * as z from 'zod/mini';
import type { ChargeCardDto, InstantBand } from './charge';
import { day, id, instant, type Instant, type PersonRef } from './common';
import type { StintState, WorkDto } from './work';

export const benchPlanQuerySchema = z.object({
  /** First day; left out: today. */
  day: z.optional(day),
  /** Left out: one. */
  days: z.optional(z.enum(['1', '7'])),
});
export type BenchPlanQuery = z.infer<typeof benchPlanQuerySchema>;

/** A stretch between two instants. */
export interface Span {
  from: Instant;
  to: Instant;
}

/** A charge in the lanes of its channels. */
export interface PlanChargeDto {
  card: ChargeCardDto;
  /** Per channel it has, had or is to have: from when to when. */
  holds: (Span & { channelId: string })[];
  /** Sentence why it cannot be moved; null: it can. */
  fixedBecause: string | null;
  /** Who is to look in at each of its look-ins that are still to come; those without anybody are named too. */
  lookIns: PlanLookInDto[];
}
export interface PlanLookInDto {
  chargeId: string;
  title: string;
  channelName: string;
  dueAt: Instant;
  doneAt: Instant | null;
  /** Who did it, or is to; null: nobody can. */
  person: PersonRef | null;
  /** Why nobody can do one that is to come; null: somebody can, or it has been done. */
  nobody: NobodyDto | null;
}
/** 'away': nobody is there; 'busy': whoever is has their hands in something that cannot be left. */
export interface NobodyDto {
  kind: 'away' | 'busy';
  /** 'Ines clips on R-2418 until 14:57. Nobody else is there.' */
  because: string;
}

export interface PlanChannelDto {
  id: string;
  name: string;
  /** '10 A', 'two-way 10 A', 'one group 5 A' */
  kind: string;
  /** When it is likely free next; null: nobody can say. */
  freeAt: Instant | null;
}

export const blockKinds = ['clip-on', 'swap', 'clip-off', 'check', 'fit', 'fill'] as const;
export type BlockKind = (typeof blockKinds)[number];
/** What somebody has to do: hands of a charge, the fit after it, a fill. */
export interface PlanBlockDto extends Span {
  kind: BlockKind;
  /** 'Fit R-2411', 'Brake bleed R-2416' */
  title: string;
  chargeId: string | null;
  repairId: string | null;
  workId: string | null;
  stint: { id: string; state: StintState } | null;
  place: string | null;
}

/** A piece of work beside a free stretch. */
export interface FitDto {
  work: WorkDto;
  /** When it would be done there, by the long estimate and with the look-ins within it; null: it does not fit. */
  span: Span | null;
  /** Of the long estimate, min; less than all that is left where work is split. */
  minutes: number;
  /** It belongs to the best filling of all waits together. */
  suggested: boolean;
  /** By how many minutes it does not fit; null: it fits, or time is not what it lacks. */
  overByMinutes: number | null;
  /** Why it does not fit: '12 min too long', 'Bay 1 is taken until 15:20'; null: it fits. */
  because: string | null;
}
/** A stretch in which a person has nothing of their own to do. */
export interface FreeStretchDto extends Span {
  minutes: number;
  /** The charge they wait for meanwhile; null: they wait for none. */
  waitOf: { chargeId: string; title: string } | null;
  lookIns: Instant[];
}
export interface PersonFitsDto {
  person: PersonRef;
  /** Still to come today and on the next working day; the first is the one that runs or comes next. */
  stretches: (FreeStretchDto & { fits: FitDto[] })[];
}
export interface FitsDto {
  at: Instant;
  people: PersonFitsDto[];
  /** The best filling is the best there is; false: the time to look for it was up. */
  proved: boolean;
}

export interface PlanPersonDto {
  person: PersonRef;
  skills: string[];
  /** Working hours in the days shown, breaks taken out. */
  present: Span[];
  breaks: Span[];
  /** Days off in the days shown. */
  daysOff: { day: string; note: string | null }[];
  blocks: PlanBlockDto[];
  free: FreeStretchDto[];
  lookIns: PlanLookInDto[];
}

/** A charge in the queue. */
export interface QueueRowDto {
  chargeId: string;
  rev: number;
  title: string;
  stage: 'planned' | 'queued';
  channelNames: string[];
  clipOnAt: Instant;
  ready: InstantBand;
  dueAt: Instant | null;
  /** By how much its 90th percentile misses the due time, min; 0: it does not. */
  lateByMinutes: number;
  /** 'On B1 at 15:30 it is ready 30 min later.'; null: it has no other place. */
  otherwise: string | null;
}

export interface WaitsTodayDto {
  usedS: number;
  lostS: number;
}

export interface BenchChangeDto {
  id: string;
  /** 'R-2418 from A1 at 14:45 to B1 at 14:00' */
  text: string;
  by: PersonRef;
  at: Instant;
  /** Sentence why it cannot be undone; null: it can. */
  lastingBecause: string | null;
}

export interface BenchPlanDto {
  at: Instant;
  zone: string;
  /** First day, and the instants between which the days lie. */
  day: string;
  days: number;
  from: Instant;
  to: Instant;
  /** Opening hours of the days shown. */
  open: Span[];
  channels: PlanChannelDto[];
  charges: PlanChargeDto[];
  people: PlanPersonDto[];
  queue: QueueRowDto[];
  counts: { charges: number; late: number };
  waitsToday: WaitsTodayDto;
  /** The latest change by hand or by a proposal that nobody has undone. */
  lastChange: BenchChangeDto | null;
}

/** Where a charge stands, or would. */
export interface PlacedDto {
  channelNames: string[];
  clipOnAt: Instant;
  ready: InstantBand;
  lateByMinutes: number;
}
export interface ProposedMoveDto {
  chargeId: string;
  rev: number;
  title: string;
  dueAt: Instant | null;
  now: PlacedDto;
  then: PlacedDto;
  /** 'R-2421 ready 30 min later, on time' */
  text: string;
}
/** A better plan than the present one. */
export interface ProposalDto {
  /** Names the numbers it was made from: what has changed since makes it stale. */
  id: string;
  at: Instant;
  /** 'R-2406 is 22 min late on B2.'; why it was made. */
  because: string;
  moves: ProposedMoveDto[];
  /** 'R-2418 as it is' */
  asTheyAre: string[];
  /** Charges for which no place is left, each with the reason. */
  unplaced: { chargeId: string; title: string; because: string }[];
  /** Priority-weighted minutes of lateness: today's plan and this one. */
  lateMinutes: { now: number; then: number };
  /** Nothing is better; false: the best found in the time there was. */
  proved: boolean;
}
export const acceptProposalSchema = z.object({ proposalId: z.string().check(z.minLength(1, 'Which proposal?')) });

export const moveChargeSchema = z.object({
  chargeId: id,
  /** Of the charge as it was seen: 412 where somebody has changed it since. */
  rev: z.number(),
  channelId: id,
  clipOnAt: instant,
});
export type MoveChargeInput = z.infer<typeof moveChargeSchema>;
/** Where one charge could go, per channel. */
export interface MovePlaceDto {
  channelId: string;
  channelName: string;
  /** The soonest there; null: it cannot be done there. */
  soonest: PlacedDto | null;
  because: string | null;
}
export interface MovePlacesDto {
  chargeId: string;
  rev: number;
  places: MovePlaceDto[];
}

/** A repair that is booked: bring a spare close now, and there is less to wait for later. */
export interface StartNowDto {
  repairId: string;
  number: string;
  vehicle: string;
  typeName: string;
  /** Rest voltage with which packs of this kind usually arrive, V per group, and from how many of them; 0: typed. */
  usualVolts: number;
  arrivals: number;
  /**
   * What to bring the spare to now, V per group: the usual voltage; or the lowest likely one where no channel here could
   * take it down again for a pack that arrives below.
   */
  aimVolts: number;
  spare: { id: string; label: string; shelfPlace: string | null };
  channelName: string;
  /** What it takes now. */
  takes: { p10S: number; p50S: number; p90S: number };
  /** What is still to wait for once the pack has been read, after a start now; and how much less that is. */
  thenS: number;
  savesS: number;
}

export interface MyDayDto extends PlanPersonDto {
  at: Instant;
  zone: string;
  day: string;
}
