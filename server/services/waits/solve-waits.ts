/** The work of the waits' thread: pure reckoning over a history. */
import { mannWhitney, medianDifference } from '@/calc/index';
import type { WaitsAnswer, WaitsTask } from './waits-tasks';

/** Does one task. */
export function solveWaits(task: WaitsTask): WaitsAnswer {
  const { before, then, seed } = task;
  return { ...medianDifference(before, then, seed), p: mannWhitney(before, then).p };
}
