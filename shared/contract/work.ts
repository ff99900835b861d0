/** Other work: pieces that fill a wait, and the stints in which somebody does them. */
import * as z from 'zod/mini';
import { id, instant, optionalInstant, optionalText, reason, text, type Instant, type PersonRef } from './common';
import { optionalQuantity, quantity } from './quantity';
import { workPriorities } from './work-terms';

const workShape = {
  /** 'Brake bleed' */
  title: text('What is to be done', 80),
  likelyMinutes: quantity({ name: 'Likely minutes', unit: 'min', min: 1, max: 2400, whole: true }),
  /** Nine times in ten it takes no longer; null: half as long again as likely. */
  longMinutes: optionalQuantity({ name: 'Long minutes', unit: 'min', min: 1, max: 4800, whole: true }),
  skillId: z.nullable(id),
  placeId: z.nullable(id),
  priority: z.enum(workPriorities),
  dueAt: optionalInstant,
  repairId: z.nullable(id),
  splittable: z.boolean(),
  note: optionalText('The note', 500),
};
export const workSchema = z.object(workShape).check(
  z.refine((one) => one.longMinutes === null || one.longMinutes >= one.likelyMinutes, {
    message: 'Long is shorter than likely. Type the longer one here.',
    path: ['longMinutes'],
  }),
);
export type WorkInput = z.infer<typeof workSchema>;

/** Takes a piece of work, or gives it to somebody. */
export const takeWorkSchema = z.object({
  /** Left out: oneself. To give it to others takes the right to plan the bench. */
  personId: z.optional(id),
  /** When it begins; left out: now. */
  from: z.optional(instant),
  /** Minutes of it by the long estimate, of work that can be split; left out: all that is left. */
  minutes: z.optional(quantity({ name: 'Minutes', unit: 'min', min: 1, max: 4800, whole: true })),
});
export type TakeWorkInput = z.infer<typeof takeWorkSchema>;

export const endStintSchema = z.object({
  /** Of the likely estimate what is still to be done, min; left out or 0: the work is done. */
  minutesLeft: z.optional(quantity({ name: 'Minutes left', unit: 'min', min: 0, max: 4800, whole: true })),
});
export type EndStintInput = z.infer<typeof endStintSchema>;
export const dropWorkSchema = z.object({ reason });
export const workQuerySchema = z.object({
  state: z.optional(z.enum(['open', 'over'])),
  /** That of one repair; left out: of all, and of none. */
  repairId: z.optional(id),
  page: z.optional(z.string().check(z.regex(/^[1-9]\d{0,5}$/, 'Pages are counted from 1.'))),
});
export type WorkQuery = z.infer<typeof workQuerySchema>;

export const stintStates = ['taken', 'begun', 'done', 'given-back'] as const;
export type StintState = (typeof stintStates)[number];
/** A stretch in which somebody does a piece of work, or is to. */
export interface StintDto {
  id: string;
  person: PersonRef;
  /** Who gave it; null: taken by the person. */
  givenBy: PersonRef | null;
  state: StintState;
  /** As planned, by the long estimate and with the look-ins within it; once begun or over, as it was. */
  from: Instant;
  to: Instant;
  begunAt: Instant | null;
  endedAt: Instant | null;
  /** The charge in whose wait it lies; null: in none. */
  waitOf: { chargeId: string; title: string } | null;
}

export const workStates = ['open', 'taken', 'begun', 'done', 'dropped'] as const;
export type WorkState = (typeof workStates)[number];
/** 'open': some of it is in nobody's hands; 'taken': all is taken; 'begun': somebody is at it. */
export interface WorkDto extends Omit<WorkInput, 'longMinutes' | 'skillId' | 'placeId' | 'repairId'> {
  id: string;
  /** 'W-0012' */
  number: string;
  longMinutes: number;
  skill: { id: string; name: string } | null;
  place: { id: string; name: string } | null;
  repair: { id: string; number: string } | null;
  state: WorkState;
  /** Not in anybody's hands yet, min by the likely and by the long estimate. */
  leftMinutes: number;
  leftLongMinutes: number;
  stints: StintDto[];
  createdBy: PersonRef;
  createdAt: Instant;
  /** Set when it is over: done or dropped. */
  over: { at: Instant; by: PersonRef; reason: string | null } | null;
  rev: number;
}
export interface WorkListDto {
  work: WorkDto[];
  counts: { open: number; taken: number; begun: number; over: number };
  nextPage: number | null;
}
