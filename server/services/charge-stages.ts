import type { Reckoning } from '@/calc/live-types';
import { openStages, runningStages, type Stage } from '@/shared/contract/charge';
import type { Charge } from '../entities/charge';
import type { ChargeFile } from './charge-file';
import { instantOf } from './charge-clock';
import { nextSwap } from './charge-steps';

const isOneOf = <S extends Stage>(stages: readonly S[], stage: Stage): stage is S =>
  (stages as readonly Stage[]).includes(stage);

/** Current flows, or would but for a swap of the clips. */
export const isRunning = (stage: Stage): boolean => isOneOf(runningStages, stage);
export const isOpen = (stage: Stage): boolean => isOneOf(openStages, stage);
/** Not begun yet. */
export const isWaitingToStart = (stage: Stage): boolean => stage === 'planned' || stage === 'queued';
/** Begun and not yet judged: its stage follows the clock and the readings. */
export const isUnderWay = (stage: Stage): boolean =>
  isRunning(stage) || stage === 'resting' || stage === 'check-due' || stage === 'held';

/** The reckoning's stage as the charge's: a discharge has a word of its own. */
export const stageFrom = (reckoning: Pick<Reckoning, 'stage'>, direction: Charge['direction']): Stage =>
  reckoning.stage === 'charging' && direction === 'discharge' ? 'discharging' : reckoning.stage;

export interface SwapWait {
  /** First step of the swap that is waited for. */
  stepIndex: number;
  /** End of current of the step before, epoch ms. */
  since: number;
}

/** The swap a running charge waits for; null where current flows, or no step follows. */
export function swapWait(file: Pick<ChargeFile, 'charge' | 'runs'>): SwapWait | null {
  const { charge } = file;
  if (!isRunning(charge.stage) || charge.reckoning === null) return null;
  const next = nextSwap(charge.option, file.runs);
  if (next === null) return null;
  const since = instantOf(charge, charge.reckoning.reckoning.stepEndS);
  return since <= charge.reckoning.at ? { stepIndex: next, since } : null;
}
