import * as z from 'zod/mini';
import { id, instant, optionalText, reason, text, type Instant, type PersonRef } from './common';
import { groupVoltsProblems, typedGroupVolts, type TypeWindow } from './group-volts';
import { optionalQuantity } from './quantity';

export const conditions = ['sound', 'swollen', 'leaking', 'dented', 'water', 'deep-discharged'] as const;
export const conditionNames: Record<(typeof conditions)[number], string> = {
  sound: 'Sound',
  swollen: 'Swollen',
  leaking: 'Leaking',
  dented: 'Dented',
  water: 'Water got in',
  'deep-discharged': 'Deep-discharged',
};
export const numberSources = ['measured', 'label', 'guessed'] as const;

export const spareReadingSchema = z.object({
  groupVolts: typedGroupVolts,
  celsius: optionalQuantity({ name: 'Temperature', unit: '°C', min: -40, max: 90 }),
  meterId: z.nullable(id),
  at: z.optional(instant),
  note: z.optional(optionalText('The note')),
});
export type SpareReadingInput = z.infer<typeof spareReadingSchema>;

/** The same for a form that knows the type: the number of groups and each voltage are judged as the server will. */
export const spareReadingSchemaFor = (type: TypeWindow) =>
  spareReadingSchema.check((context) => {
    for (const [path, message] of Object.entries(groupVoltsProblems(context.value.groupVolts, type, 'groupVolts')))
      context.issues.push({
        code: 'custom',
        message,
        input: context.value.groupVolts,
        path: path.split('.').map((part) => (/^\d+$/.test(part) ? Number(part) : part)),
      });
  });

export const spareSchema = z.object({
  label: text('The label', 30),
  moduleTypeId: id,
  shelfPlace: optionalText('The shelf place', 30),
  /** Measured Ah of a group; empty: rated times health. */
  capacityAh: optionalQuantity({ name: 'Capacity', unit: 'Ah', min: 0, aboveMin: true, max: 1000 }),
  healthPercent: optionalQuantity({ name: 'Health', unit: '%', min: 5, max: 120 }),
  capacitySource: z.enum(numberSources),
  condition: z.enum(conditions),
  note: optionalText('The note'),
});
export type SpareInput = z.infer<typeof spareSchema>;

/** A new spare comes with its first reading. */
export const newSpareSchema = z.object({ ...spareSchema.shape, reading: spareReadingSchema });
export type NewSpareInput = z.infer<typeof newSpareSchema>;

/** The charge that waits for a spare, as the person saw it who sets that spare aside. */
const seenCharge = z.object({ id, rev: z.int().check(z.minimum(1)) });

export const quarantineSchema = z.object({
  reason,
  /** What was seen, where it is a condition of the module; left out or null: it stays as it is. */
  condition: z.optional(z.nullable(z.enum(conditions))),
  /** Where it goes; left out: it stays where it is. */
  shelfPlace: z.optional(optionalText('The shelf place', 30)),
  /** The planned or queued charge that is taken off with it. A spare that one waits for is not set aside without. */
  charge: z.optional(z.nullable(seenCharge)),
});
export type QuarantineInput = z.infer<typeof quarantineSchema>;

export type SpareWhere = 'shelf' | 'charge' | 'quarantine' | 'fitted';

export interface SpareReadingDto {
  id: string;
  at: Instant;
  groupVolts: number[];
  celsius: number | null;
  meterId: string | null;
  by: PersonRef;
  note: string | null;
  /** The last charge, discharge or levelling that has moved the groups since: this is what they read before it. */
  movedBy: { id: string; title: string } | null;
}

export type CapacitySource = 'typed' | 'two readings';
/** 'used': it stands in the spare's capacity; 'found': it disagrees and waits for a person; 'left': a person has left it. */
export type CapacityState = 'used' | 'found' | 'left';

/** Takes what a charge has found as the spare's capacity, or leaves it. */
export const capacityAnswerSchema = z.object({ answer: z.enum(['take', 'leave']) });
export type CapacityAnswerInput = z.infer<typeof capacityAnswerSchema>;

/** A figure of the capacity of one group of a spare. */
export interface SpareCapacityDto {
  id: string;
  at: Instant;
  by: PersonRef;
  ampHours: number;
  /** Standard deviation, Ah. */
  sdAh: number;
  source: CapacitySource;
  state: CapacityState;
  /** How far from what was known before, in standard deviations of the difference; null: typed. */
  apart: number | null;
  chargeId: string | null;
}

export interface SpareDto extends SpareInput {
  id: string;
  typeName: string;
  groupsInSeries: number;
  chargeLimitVolts: number;
  dischargeLimitVolts: number;
  floorVolts: number;
  shelfVolts: number | null;
  where: SpareWhere;
  /** Capacity used in plans, Ah, and its standard deviation. */
  usedCapacityAh: number;
  capacitySdAh: number;
  /** What was ever typed or found of the capacity, newest first. One that is 'found' waits for an answer. */
  capacities: SpareCapacityDto[];
  quarantine: { reason: string; at: Instant; by: PersonRef } | null;
  charge: { id: string; title: string; stage: string; rev: number } | null;
  reading: SpareReadingDto | null;
  rev: number;
}

export interface SpareHistoryDto {
  readings: SpareReadingDto[];
  charges: { id: string; title: string; stage: string; at: Instant; targetVolts: number }[];
}

export const spareWheres = ['shelf', 'charge', 'quarantine', 'fitted'] as const satisfies readonly SpareWhere[];
/** Which spares to list; without `where` all but the fitted ones. */
export const sparesQuerySchema = z.object({
  q: z.optional(z.string().check(z.maxLength(60, 'This is too long to look for.'))),
  where: z.optional(z.enum(spareWheres)),
  moduleTypeId: z.optional(id),
});
export type SparesQuery = z.infer<typeof sparesQuerySchema>;
