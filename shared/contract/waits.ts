import * as z from 'zod/mini';
import { day, type Instant } from './common';

export const waitsQuerySchema = z.object({
  from: z.optional(day),
  to: z.optional(day),
  moduleTypeId: z.optional(z.string()),
  chargerId: z.optional(z.string()),
});
export type WaitsQuery = z.infer<typeof waitsQuerySchema>;

export interface WaitGroupDto {
  key: string;
  name: string;
  charges: number;
  waitHours: number;
  medianS: number;
  p90S: number;
  /** Actual minus planned likely finish: median, s; null with no charge. */
  againstPlanS: number;
  /** Share whose finish lay inside its 10–90 % band. */
  insideBand: number;
}

export interface WaitWeekDto {
  /** Monday of the week in the workshop's zone, and its ISO number. */
  monday: string;
  week: number;
  charges: number;
  waitHours: number;
  medianS: number;
  p90S: number;
}

export interface WaitStageDto {
  stage: 'queue' | 'charging' | 'tapering' | 'resting' | 'check-due';
  medianS: number;
}

export interface WaitsDto {
  from: string;
  to: string;
  charges: number;
  medianS: number | null;
  p90S: number | null;
  againstPlanS: number | null;
  insideBand: number | null;
  weeks: WaitWeekDto[];
  byModuleType: WaitGroupDto[];
  byCharger: WaitGroupDto[];
  stages: WaitStageDto[];
  rows: WaitRowDto[];
}

export interface WaitRowDto {
  chargeId: string;
  title: string;
  typeName: string;
  chargerName: string;
  askedAt: Instant;
  readyAt: Instant;
  waitS: number;
  plannedS: number;
  actualS: number;
  insideBand: boolean;
}
