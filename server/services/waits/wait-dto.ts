import { FEW_CHARGES, type WaitAgainstPlanDto, type WaitSpreadDto, type WaitStageDto } from '@/shared/contract/waits';
import type { PlanRow, SpreadRow, StageRow } from '../../repositories/wait-figures.repository';

const seconds = (ms: number | null): number => (ms ?? 0) / 1000;
export const hours = (ms: number): number => ms / 3_600_000;

export const spreadDto = (row: SpreadRow): WaitSpreadDto => ({
  charges: row.charges,
  few: row.charges < FEW_CHARGES,
  waitHours: hours(row.waitMs),
  medianS: seconds(row.medianMs),
  p90S: seconds(row.p90Ms),
  usedHours: hours(row.usedMs),
  lostHours: hours(row.lostMs),
});

export const planDto = (row: PlanRow): WaitAgainstPlanDto => ({
  againstPlanS: seconds(row.lateMedianMs),
  biasS: seconds(row.biasMs),
  absErrorS: seconds(row.errorMs),
  insideBand: row.insideBand ?? 0,
});

export const stageDto = (stage: WaitStageDto['stage'], row: StageRow): WaitStageDto => ({
  stage,
  charges: row.charges,
  few: row.charges < FEW_CHARGES,
  waitHours: hours(row.waitMs),
  medianS: seconds(row.medianMs),
  p90S: seconds(row.p90Ms),
});

/** Of a week in which nothing became ready. */
export const noSpread = spreadDto({ charges: 0, waitMs: 0, medianMs: 0, p90Ms: 0, usedMs: 0, lostMs: 0 });
