/** A reading of all groups of a pack, and the second source at the module it points to. */
import * as z from 'zod/mini';
import { id, instant, optionalText, reason, text, type Instant, type PersonRef } from './common';
import { MOST_GROUPS } from './pack';
import { groupVolts, optionalQuantity, quantity } from './quantity';

export const readingStages = ['arrival', 'after-fit', 'after-balance'] as const;
export type ReadingStage = (typeof readingStages)[number];
/** 'Arrival', 'After the fit', 'Balance charge 2' */
export const readingName = ({ stage, balanceCount }: Pick<PackReadingInput, 'stage' | 'balanceCount'>): string =>
  stage === 'arrival' ? 'Arrival' : stage === 'after-fit' ? 'After the fit' : `Balance charge ${balanceCount ?? 1}`;

export const readingSources = ['typed', 'pasted', 'file'] as const;

const stageShape = {
  stage: z.enum(readingStages),
  /** Which balance charge it follows, from 1; null at the other stages. */
  balanceCount: z.nullable(z.int().check(z.minimum(1), z.maximum(99))),
};

export const packReadingSchema = z
  .object({
    ...stageShape,
    /** In the order of the pack's groups. */
    groupVolts: z
      .array(groupVolts)
      .check(
        z.minLength(1, 'Type the voltage of each group.'),
        z.maxLength(MOST_GROUPS, `A pack has at most ${MOST_GROUPS} groups here.`),
      ),
    /** Of the whole pack, where it was read, V. */
    packVolts: optionalQuantity({ name: 'Pack voltage', unit: 'V', min: 0, max: 2000 }),
    celsius: optionalQuantity({ name: 'Temperature', unit: '°C', min: -40, max: 90 }),
    /** Since the pack last had a load on it. */
    restedMinutes: optionalQuantity({ name: 'Time since load', unit: 'min', min: 0, max: 100_000 }),
    /** A meter of the workshop; null: the pack's own instrument. */
    meterId: z.nullable(id),
    /** Name of the instrument where it is none of the workshop's meters. */
    instrument: optionalText('The instrument', 60),
    source: z.enum(readingSources),
    fileName: optionalText('The file name', 120),
    note: optionalText('The note'),
    at: z.optional(instant),
  })
  .check((context) => {
    if ((context.value.stage === 'after-balance') !== (context.value.balanceCount !== null))
      context.issues.push({
        code: 'custom',
        message: 'Say which balance charge it follows.',
        input: context.value.balanceCount,
        path: ['balanceCount'],
      });
  });
export type PackReadingInput = z.infer<typeof packReadingSchema>;

/** A reading that was wrong is not changed: it is set aside with the reason, and a new one is entered. */
export const setReadingAsideSchema = z.object({ reason });

/** What takes trust from a target; 'unknown-rest': nobody noted how long the pack had rested. */
export type TrustReason =
  'flat-curve' | 'old-reading' | 'few-healthy' | 'wide-spread' | 'short-rest' | 'unknown-rest' | 'cold-or-warm';

export interface PackReadingDto extends Omit<PackReadingInput, 'at'> {
  id: string;
  at: Instant;
  by: PersonRef;
  /** Highest less lowest, mV; median, lowest and highest, V. */
  spreadMillivolts: number;
  medianVolts: number;
  lowestVolts: number;
  highestVolts: number;
  /** Odd groups, 0-based, and the module positions they point to, the worst first. */
  odd: number[];
  oddPositions: string[];
  /** Against the median group, Ah, by the curve of the pack's module type; null: no type. */
  groupAmpHours: number[] | null;
  spreadAmpHours: number | null;
  /** What the reading before it makes of this one; null: there is none to compare with. */
  change: {
    kind: 'exchange' | 'no-change' | 'balanced' | 'worse';
    ampHours: { low: number; likely: number; high: number } | null;
  } | null;
  setAside: { reason: string; at: Instant; by: PersonRef } | null;
}

/**
 * What two instruments may show differently at one group once their offset is off, V: within it the odd group of a module
 * is told from a healthy one all the same. Common practice.
 */
export const SOURCE_TOLERANCE_VOLTS = 0.01;

/** Hand-meter readings of the suspected module's groups, the meter in the hand. */
export const secondSourceSchema = z.object({
  readingId: id,
  modulePosition: text('The module position', 20),
  /** In the order of the module's groups. */
  groupVolts: z.array(groupVolts).check(z.minLength(1, 'Type what the hand meter shows.'), z.maxLength(24)),
  /** The same meter at a healthy group of the pack, where it was read: takes the two instruments' offset out. */
  healthyGroup: z.nullable(z.object({ group: z.int().check(z.minimum(0)), volts: groupVolts })),
  meterId: z.nullable(id),
  /** The module the meter points to, where it is another. */
  pointsTo: z.nullable(text('The module position', 20)),
  at: z.optional(instant),
});
export type SecondSourceInput = z.infer<typeof secondSourceSchema>;

/** Somebody decides between the two: which module it is, or that the pack is read again. */
export const decideSourceSchema = z
  .object({
    decision: z.enum(['module', 'read-again']),
    modulePosition: z.nullable(text('The module position', 20)),
    reason,
  })
  .check(
    z.refine((one) => (one.decision === 'module') === (one.modulePosition !== null), {
      message: 'Say which module it is.',
      path: ['modulePosition'],
    }),
  );
export type DecideSourceInput = z.infer<typeof decideSourceSchema>;

export interface SecondSourceDto extends Omit<SecondSourceInput, 'at'> {
  id: string;
  at: Instant;
  by: PersonRef;
  agrees: boolean;
  /** Groups of the pack, 0-based, in which the two differ, and by how much, mV. */
  differs: { group: number; millivolts: number }[];
  /** Offset that was taken out, mV; null: none was measured. */
  offsetMillivolts: number | null;
  decided: (DecideSourceInput & { at: Instant; by: PersonRef }) | null;
}

/** Takes the target from a reading, or types another with a reason. */
export const takeTargetSchema = z.object({
  readingId: id,
  /** Null: as computed. */
  volts: z.nullable(groupVolts),
  toleranceMillivolts: quantity({ name: 'Tolerance', unit: 'mV', min: 1, max: 50 }),
  reason: optionalText('The reason', 300),
});
export type TakeTargetInput = z.infer<typeof takeTargetSchema>;

/** A target as the healthy groups of a reading have it. */
export interface ComputedTargetDto {
  readingId: string;
  volts: number;
  standardErrorMillivolts: number;
  /** mV per percent of charge, by the type's curve; null: no type. */
  slopeMillivoltsPerPercent: number | null;
  healthy: number;
  trust: 'good' | 'fair' | 'poor';
  reasons: TrustReason[];
}

export interface TargetDto extends ComputedTargetDto {
  toleranceMillivolts: number;
  /** Another than computed was typed. */
  typed: boolean;
  reason: string | null;
  at: Instant;
  by: PersonRef;
}
