import * as z from 'zod/mini';
import { text } from './common';
import { quantity } from './quantity';
import { zone } from './session';

/** 'HH:MM' of a day in the workshop's zone. */
export const timeOfDay = z.string().check(z.regex(/^([01]\d|2[0-3]):[0-5]\d$/, 'Type the time like 08:00.'));

/** One day's opening; null: closed. Index 0 is Monday. */
export const dayHours = z.nullable(
  z
    .object({ from: timeOfDay, to: timeOfDay })
    .check(z.refine((day) => day.from < day.to, { message: 'Closing must come after opening.', path: ['to'] })),
);

const passOn = (name: string) => quantity({ name, unit: 'min', min: 0, max: 240, whole: true });

export const workshopSettingsSchema = z.object({
  name: text('The workshop’s name', 80),
  zone,
  workingHours: z.array(dayHours).check(z.length(7, 'Seven days, Monday first.')),
  toleranceMillivolts: quantity({ name: 'Tolerance', unit: 'mV', min: 1, max: 50 }),
  minRestMinutes: quantity({ name: 'Rest', unit: 'min', min: 0, max: 1440, whole: true }),
  lookInMinutes: quantity({ name: 'Look-in interval', unit: 'min', min: 5, max: 480, whole: true }),
  inrushLimitC: quantity({ name: 'Inrush limit', unit: 'C', min: 0.05, max: 10 }),
  lagLimitMillivolts: quantity({ name: 'Lag limit', unit: 'mV', min: 1, max: 200 }),
  /** A technician too decides where the pack and the hand meter point to different modules. Left out: no. */
  technicianDecides: z.optional(z.boolean()),
  /** Charges may run while nobody is there to look in: overnight, at weekends. Left out: no. */
  unattendedCharges: z.optional(z.boolean()),
  /** What one look-in takes. Left out: 5. */
  lookInVisitMinutes: z.optional(quantity({ name: 'Minutes of a look-in', unit: 'min', min: 1, max: 60, whole: true })),
  /** What fitting a ready module takes, in people's lines of the bench plan. Left out: 60. */
  fitMinutes: z.optional(quantity({ name: 'Minutes to fit', unit: 'min', min: 5, max: 600, whole: true })),
  /** Minutes after which an alert that nobody has taken goes on to the foremen, then the managers; 0: never. Left out: 0. */
  passOnTellMinutes: z.optional(passOn('Minutes of what only tells')),
  /** Left out: 10. */
  passOnAmberMinutes: z.optional(passOn('Minutes of what needs a hand')),
  /** Left out: 5. */
  passOnAlarmMinutes: z.optional(passOn('Minutes of an alarm')),
});
/** What is left out stays as it is. */
export const changeWorkshopSchema = z.partial(workshopSettingsSchema);
export type ChangeWorkshopInput = z.infer<typeof changeWorkshopSchema>;
export type WorkshopSettings = z.infer<typeof workshopSettingsSchema>;

export interface WorkshopDto extends WorkshopSettings {
  id: string;
  rev: number;
}
export type DayHours = z.infer<typeof dayHours>;
