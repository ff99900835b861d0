import type { PlanOption } from '@/calc/plan-types';
import type { Stage } from '@/shared/contract/charge';
import type { FrozenInputs } from './charge-json';

/** A charge as it stood before a change of the bench plan. */
export interface MovedCharge {
  chargeId: string;
  /** Its revision after the change: with any other it was touched since, and the change cannot be undone. */
  revAfter: number;
  before: {
    stage: Stage;
    option: PlanOption;
    frozen: FrozenInputs;
    clipOnAt: number;
    plannedEarlyAt: number;
    plannedLikelyAt: number;
    plannedLateAt: number;
    minRestS: number;
    queuedAt: number | null;
  };
}
