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

export const planSchema = z.object({
  spareId: id,
  /** Rest voltage per group of the pack's healthy groups. */
  targetVolts: groupVolts,
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
export type PlanRequest = z.infer<typeof planSchema>;

export interface PlanDto {
  plan: ChargePlan;
  /** Instant that 0 s stands for. */
  plannedAt: Instant;
  clipOnAt: Instant;
  toleranceMillivolts: number;
  /** Names of the channels in the plan by id. */
  channels: Record<string, { name: string; chargerName: string; freeAt: Instant | null }>;
}

/** Keeps one option of a plan as a charge. The server plans again and takes the option of the same id. */
export const keepPlanSchema = z.object({
  ...planSchema.shape,
  optionId: z.string().check(z.minLength(1), z.maxLength(200)),
  /** The charge that this one tops up: it is closed, its spare goes on in the new one. */
  topUpOf: z.optional(z.nullable(id)),
  /** The charge of the same spare, not begun, that this one is planned in place of: it is dropped. */
  insteadOf: z.optional(z.nullable(id)),
});
export type KeepPlanRequest = z.infer<typeof keepPlanSchema>;
