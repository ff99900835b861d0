import * as z from 'zod/mini';
import type { ChannelFaultDto } from './equipment';
import { id, instant, optionalText, reason, text, type Instant, type PersonRef } from './common';
import type { OddSeen, Reckoning } from '@/calc/live-types';
import type { Band, CheckVerdict, Direction, Finish, PlanOption, SegmentKind, Way } from './plan';
import { typedGroupVolts } from './group-volts';
import { groupVolts, optionalQuantity } from './quantity';

export const stages = [
  'planned',
  'queued',
  'charging',
  'discharging',
  'tapering',
  'resting',
  'check-due',
  'ready',
  'fitted',
  'shelved',
  'held',
  'stopped',
] as const;
export type Stage = (typeof stages)[number];
/** Stages in which the charge holds its spare (and stands on the bench). */
export const openStages = [
  'planned',
  'queued',
  'charging',
  'discharging',
  'tapering',
  'resting',
  'check-due',
  'ready',
  'held',
] as const satisfies readonly Stage[];
export const runningStages = ['charging', 'discharging', 'tapering'] as const satisfies readonly Stage[];

/** The checks before clipping on, in their order. */
export const checkCodes = [
  'isolation',
  'polarity',
  'condition',
  'temperature',
  'ceiling',
  'ventilation',
  'attendance',
] as const;
export type CheckCode = (typeof checkCodes)[number];

export const answerCheckSchema = z.object({
  code: z.enum(checkCodes),
  /** 'yes' lets the charge go on, 'no' rules it out until it is changed. */
  answer: z.enum(['yes', 'no']),
  note: z.optional(optionalText('The note', 200)),
  /** When it was answered, where the answer had to wait for a connection. */
  at: z.optional(instant),
  /** The question as it was read then: a late answer counts for no other. */
  asked: z.optional(text('The question', 300)),
});
export type AnswerCheckInput = z.infer<typeof answerCheckSchema>;

const atNow = z.optional(instant);

export const startChargeSchema = z.object({ at: atNow });
export const queueChargeSchema = z.object({ clipOnAt: z.nullable(instant) });
export const holdSchema = z.object({ reason, at: atNow });
export const resumeSchema = z.object({ at: atNow });
export const stopSchema = z.object({ reason, at: atNow, quarantine: z.optional(z.boolean()) });
export const currentOffSchema = z.object({ at: atNow });
/** The clips were moved to the next step of the charge. */
export const nextStepSchema = z.object({ at: atNow });
export const handOverSchema = z.object({ personId: id });
export const lookInSchema = z.object({ note: z.optional(optionalText('The note', 200)), at: atNow });
export type LookInInput = z.infer<typeof lookInSchema>;

const readingShape = {
  at: atNow,
  terminalVolts: optionalQuantity({ name: 'Volts', unit: 'V', min: 0, max: 150 }),
  amps: optionalQuantity({ name: 'Amps', unit: 'A', min: -2000, max: 2000 }),
  celsius: optionalQuantity({ name: 'Temperature', unit: '°C', min: -40, max: 120 }),
  groupVolts: z.optional(z.nullable(typedGroupVolts)),
  meterId: z.optional(z.nullable(id)),
  /** Where the volts between the clips were read. Left out: at the charger, by its own display, unless a meter is named. */
  takenAt: z.optional(z.nullable(z.enum(['supply', 'module']))),
};
/** At least one number; which of them is up to what can be read. */
export const readingSchema = z.object(readingShape).check(
  z.refine(
    (r) => r.terminalVolts !== null || r.amps !== null || r.celsius !== null || (r.groupVolts ?? null) !== null,
    {
      message: 'Type at least one number that was read.',
      path: ['terminalVolts'],
    },
  ),
);
export type ReadingInput = z.infer<typeof readingSchema>;
/** A correction keeps the old reading and says why. */
export const correctReadingSchema = z.object({ ...readingShape, reason: z.optional(optionalText('The reason', 300)) });

/** As it is typed, digits and all: what can be judged by them is up to the type and the tolerance (rest-check.ts). */
export const restCheckSchema = z.object({
  groupVolts: z
    .array(z.union([z.string(), z.number()], 'Type the voltage of each group.'))
    .check(
      z.minLength(1, 'Type the voltage of each group.'),
      z.maxLength(24, 'More than 24 groups is no module. Type those of one module.'),
    ),
  celsius: optionalQuantity({ name: 'Temperature', unit: '°C', min: -40, max: 90 }),
  meterId: z.nullable(id),
  at: atNow,
});
export type TypedRestCheck = z.infer<typeof restCheckSchema>;
export interface RestCheckInput extends Omit<TypedRestCheck, 'groupVolts'> {
  groupVolts: number[];
}

export const fitSchema = z.object({ note: z.optional(optionalText('The note')) });
export const shelveSchema = z.object({
  shelfPlace: optionalText('The shelf place', 30),
  note: z.optional(optionalText('The note')),
});
export const topUpSchema = z.object({ targetVolts: z.optional(groupVolts) });

/** Which charges to list: those on the bench, or those that are over, newest first. */
export const chargesQuerySchema = z.object({
  open: z.optional(z.enum(['1'])),
  closed: z.optional(z.enum(['1'])),
  page: z.optional(z.string().check(z.regex(/^[1-9]\d{0,5}$/, 'Pages are counted from 1.'))),
});
export type ChargesQuery = z.infer<typeof chargesQuerySchema>;

export interface InstantBand {
  early: Instant;
  likely: Instant;
  late: Instant;
}

export interface TimedSegment {
  kind: SegmentKind;
  from: Instant;
  to: Instant;
}

export interface LookInDto {
  id: string;
  dueAt: Instant;
  doneAt: Instant | null;
  by: PersonRef | null;
}

/** A charge as the board, the bench and the wall show it. */
export interface ChargeCardDto {
  id: string;
  /** 'C-0147' */
  number: string;
  /** The repair where there is one, else the number. */
  title: string;
  repairRef: string | null;
  modulePosition: string | null;
  spare: { id: string; label: string };
  typeName: string;
  /** Window of the type, V per group. */
  chargeLimitVolts: number;
  dischargeLimitVolts: number;
  channelNames: string[];
  person: PersonRef | null;
  stage: Stage;
  /** Stage it was in when it was held. */
  heldFrom: Stage | null;
  direction: Direction;
  way: Way;
  finish: Finish;
  targetVolts: number;
  toleranceVolts: number;
  groups: { volts: number; reckoned: boolean; fromVolts: number; clipVolts: number | null }[];
  laggingGroup: number | null;
  lagVolts: number;
  amps: number | null;
  clipOnAt: Instant;
  startedAt: Instant | null;
  segments: TimedSegment[];
  ready: InstantBand | null;
  plannedReady: InstantBand;
  readyBy: Instant | null;
  taperAt: Instant | null;
  currentEndAt: Instant | null;
  checkDueAt: Instant | null;
  readyAt: Instant | null;
  /** Since when it is late against its plan (or its check waits too long); null: not late. */
  overdueSince: Instant | null;
  heldAt: Instant | null;
  stoppedAt: Instant | null;
  lookIns: LookInDto[];
  nextLookInAt: Instant | null;
  lastReadingAt: Instant | null;
  /** Says what waits for a hand within the charge: 'Swap to group 2'. */
  nextHand: string | null;
  rev: number;
}

export interface CheckItemDto {
  code: CheckCode;
  /** 'data': answered by the numbers and locked; 'ruled-out': the numbers forbid; 'person': to be answered. */
  by: 'person' | 'data' | 'ruled-out';
  /** 'Temperature' */
  title: string;
  /** The question to a person; where the numbers answer, what they say: '21 °C, allowed 10–45 °C'. */
  question: string;
  /** What it is about, or where the answer comes from: 'Answered from the reading at 13:37 by Ines Marlow. Locked.' */
  detail: string;
  /** Words on the two answers; the given one stands behind the title afterwards. Empty where the numbers answer. */
  yes: string;
  no: string;
  answer: 'yes' | 'no' | null;
  answeredBy: PersonRef | null;
  answeredAt: Instant | null;
  note: string | null;
}

export interface ReadingDto {
  id: string;
  at: Instant;
  terminalVolts: number | null;
  amps: number | null;
  celsius: number | null;
  groupVolts: number[] | null;
  /** Meter it was read with; null: the charger's own display. */
  meterId: string | null;
  /** Where the volts between the clips were read; null: nobody has said, or none were. */
  takenAt: 'supply' | 'module' | null;
  by: PersonRef;
  source: 'typed' | 'file';
  /** Not null: this one is replaced by that one. */
  replacedBy: string | null;
  replaces: string | null;
  reason: string | null;
  mayCorrect: boolean;
}

export interface ChargeEventDto {
  id: string;
  at: Instant;
  kind: string;
  by: PersonRef | null;
  text: string;
}

export interface RestCheckDto {
  id: string;
  at: Instant;
  by: PersonRef;
  groupVolts: number[];
  celsius: number | null;
  /** It came before the minimum rest was over. */
  early: boolean;
  verdict: CheckVerdict;
}

/** A reading that nothing explains, and is not learned from. */
export interface OddDto extends Omit<OddSeen, 'sinceS'> {
  /** Instant of the first reading that is so. */
  since: Instant;
}

/** What the group readings since the end of current say of the rest. */
export interface RestDto {
  /** Where each group will settle, V: 10, 50 and 90 %. */
  settledVolts: Band[];
  /** That what is still to come is within a tenth of the tolerance in every group, 0…1. */
  chance: number;
  /** The chance is 90 % or more: the check may come before the minimum rest is over. */
  restedEnough: boolean;
  /** Since when, or when that is expected; null: not within a day. */
  enoughAt: Instant | null;
  /** Group readings behind it. */
  readings: number;
}

export interface ChargeLink {
  id: string;
  number: string;
}

export interface ChargeDto extends ChargeCardDto {
  option: PlanOption;
  /** Channels it has or is to have, in the order of their names. */
  channels: { id: string; name: string; fault: ChannelFaultDto | null }[];
  moduleTypeId: string;
  shelfPlace: string | null;
  /** Meter the pack was read with, and at which temperature: a top-up is planned with both again. */
  meterId: string | null;
  targetCelsius: number | null;
  /** The state of charge that was typed as the target, %; null: volts were. A top-up is planned with it again. */
  targetSoc: number | null;
  /** The target as it was typed, with that meter's offset still in it; `targetVolts` is without. */
  targetTypedVolts: number;
  /** The charge that this one went on from, and the one that went on from this. */
  topUpOf: ChargeLink | null;
  wentOnAs: ChargeLink | null;
  stopReason: string | null;
  minRestS: number;
  deliveredAh: number;
  plannedAh: number;
  stepIndex: number;
  expected: { at: Instant; terminalVolts: number; amps: number; celsius: number } | null;
  checks: CheckItemDto[];
  /** Sentence why the timer cannot be started yet; null: it can. */
  startBlockedBy: string | null;
  /** Its spare no longer reads what it was planned with: only a new plan lets it start. */
  planAgain: boolean;
  readings: ReadingDto[];
  restChecks: RestCheckDto[];
  events: ChargeEventDto[];
  /** Null where nothing rests for sure (nobody has said that the current is off), or with fewer than three readings. */
  rest: RestDto | null;
  /** What is odd about the latest readings; null: nothing, or it has passed. */
  odd: OddDto | null;
  /** What the readings of this charge have taught; null each where they have not told. */
  learned: Reckoning['learned'];
  dominant: string | null;
  createdAt: Instant;
  /**
   * Address the label's QR shows. Without an origin where the operator has set none: the server cannot know under which
   * of this machine's names people open it, the page does.
   */
  labelUrl: string;
}
