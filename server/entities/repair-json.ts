/** Shapes of the JSON columns of a repair. */
import type { ComputedTargetDto } from '@/shared/contract/pack-reading';

/** The target as it was taken: later changes of curve or meter do not touch it. */
export interface StoredTarget extends ComputedTargetDto {
  toleranceMillivolts: number;
  /** Another than computed was typed. */
  typed: boolean;
  reason: string | null;
  /** Epoch ms. */
  at: number;
  personId: string;
}

export interface HealthyGroup {
  /** 0-based. */
  group: number;
  volts: number;
}

export interface DifferingGroup {
  /** Of the pack, 0-based. */
  group: number;
  millivolts: number;
}
