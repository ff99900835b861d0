/** Who is there when, what they can do, and where: what the bench plan needs to know of people and places. */
import * as z from 'zod/mini';
import { day, id, optionalText, text, type PersonRef } from './common';
import { dayHours, timeOfDay, type DayHours } from './workshop';

export const placeKinds = ['bay', 'bench'] as const;
export type PlaceKind = (typeof placeKinds)[number];
export const placeKindNames: Record<PlaceKind, string> = { bay: 'Bay', bench: 'Bench' };

/** A bay or a bench: one piece of work at a time. */
export const placeSchema = z.object({ name: text('The place', 40), kind: z.enum(placeKinds) });
export type PlaceInput = z.infer<typeof placeSchema>;
export interface PlaceDto extends PlaceInput {
  id: string;
  /** Work that is not over names it: it cannot be removed. */
  inUse: boolean;
  rev: number;
}

/** An entry of the workshop's own list of skills. */
export const skillSchema = z.object({ name: text('The skill', 40) });
export type SkillInput = z.infer<typeof skillSchema>;
export interface SkillDto extends SkillInput {
  id: string;
  people: number;
  inUse: boolean;
  rev: number;
}

const pause = z
  .object({ from: timeOfDay, to: timeOfDay })
  .check(z.refine((one) => one.from < one.to, { message: 'The break ends before it begins.', path: ['to'] }));
const dayOff = z
  .object({ from: day, to: day, note: optionalText('The note', 60) })
  .check(z.refine((one) => one.from <= one.to, { message: 'The last day comes before the first.', path: ['to'] }));

/** Working hours of one person. */
export const staffingSchema = z.object({
  /** Monday first; null: the workshop's. */
  hours: z.nullable(z.array(dayHours).check(z.length(7, 'Seven days, Monday first.'))),
  /** Every working day, as far as they lie within the hours. */
  breaks: z.array(pause).check(z.maxLength(6, 'At most six breaks a day.')),
  daysOff: z.array(dayOff).check(z.maxLength(60, 'At most 60 entries. Remove those that are over.')),
  skillIds: z.array(id).check(z.maxLength(40, 'At most 40 skills.')),
});
export type StaffingInput = z.infer<typeof staffingSchema>;
export interface StaffingDto extends StaffingInput {
  person: PersonRef;
  /** The hours that count: the person's own, else the workshop's. */
  hoursNow: DayHours[];
  rev: number;
}

/** All that the bench plan knows of people and places. */
export interface StaffingListDto {
  /** Everybody who may sign in, by name. */
  people: StaffingDto[];
  skills: SkillDto[];
  places: PlaceDto[];
}
