import * as z from 'zod/mini';
import type { ChargePlan } from '@/calc/plan-types';
import { id, optionalInstant, optionalText, type Instant } from './common';
import { groupVolts, optionalQuantity } from './quantity';

export type {
  Band,
  Caution,
  ChargePlan,
  Doubt,
  Finish,
  PlanOption,
  PlannedStep,
  Refusal,
  RuledOutWay,
  Segment,
  SegmentKind,
  TracePlanPoint,
  Way,
  GroupVerdict,
  CheckVerdict,
  StepKind,
  TimeFactor,
} from '@/calc/plan-types';
export type { Direction } from '@/calc/types';

const planFields = z.object({
  spareId: id,
  /** Rest voltage per group of the pack's healthy groups; null: `targetSoc` stands in its place. */
  targetVolts: z.nullable(groupVolts),
  /** State of charge of the pack, typed or from its own counter: where voltage says little of it. */
  targetSoc: z.optional(optionalQuantity({ name: 'The state of charge', unit: '%', min: 0, max: 100 })),
  /** True: the wide band of a voltage target on a plateau is taken; else such a plan is refused, with that band. */
  acceptWideBand: z.optional(z.boolean()),
  /** Empty: the workshop's. */
  toleranceMillivolts: optionalQuantity({ name: 'Tolerance', unit: 'mV', min: 1, max: 50 }),
  /** Meter the pack was read with. */
  meterId: z.nullable(id),
  packCelsius: optionalQuantity({ name: 'Temperature', unit: '°C', min: -40, max: 90 }),
  readyBy: optionalInstant,
  clipOnAt: optionalInstant,
  /** Number of the repair in the workshop's own words, and the module's position. */
  repairRef: optionalText('The repair', 30),
  modulePosition: optionalText('The module position', 30),
  /** True: what closed charges have taught of the times is left out. */
  withoutLearned: z.optional(z.boolean()),
});

interface Targets {
  targetVolts: number | null;
  targetSoc?: number | null;
}
const isTargetGiven = (request: Targets): boolean =>
  request.targetVolts !== null || (request.targetSoc ?? null) !== null;
const isTargetOne = (request: Targets): boolean => request.targetVolts === null || (request.targetSoc ?? null) === null;
const noTarget = { message: 'Type what the pack rests at, in volts or as a state of charge.', path: ['targetVolts'] };
const twoTargets = { message: 'Type the volts or the state of charge, not both.', path: ['targetSoc'] };

export const planSchema = planFields.check(z.refine(isTargetGiven, noTarget), z.refine(isTargetOne, twoTargets));
export type PlanRequest = z.infer<typeof planSchema>;

export interface PlanDto {
  plan: ChargePlan;
  /** Instant that 0 s stands for. */
  plannedAt: Instant;
  clipOnAt: Instant;
  /** Rest voltage per group that it was planned to, V: without the meter's offset, or that of the state of charge. */
  targetVolts: number;
  toleranceMillivolts: number;
  /** Names of the channels in the plan by id. */
  channels: Record<string, { name: string; chargerName: string; freeAt: Instant | null }>;
}

/** Keeps one option of a plan as a charge. The server plans again and takes the option of the same id. */
export const keepPlanSchema = z
  .object({
    ...planFields.shape,
    optionId: z.string().check(z.minLength(1), z.maxLength(200)),
    /** The charge that this one tops up: it is closed, its spare goes on in the new one. */
    topUpOf: z.optional(z.nullable(id)),
    /** The charge of the same spare, not begun, that this one is planned in place of: it is dropped. */
    insteadOf: z.optional(z.nullable(id)),
    /** The repair it is for: its number and failing module stand for `repairRef` and `modulePosition`, its people get it. */
    repairId: z.optional(z.nullable(id)),
  })
  .check(z.refine(isTargetGiven, noTarget), z.refine(isTargetOne, twoTargets));
export type KeepPlanRequest = z.infer<typeof keepPlanSchema>;
