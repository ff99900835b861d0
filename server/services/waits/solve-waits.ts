/** The work of the waits' thread: pure reckoning over a history. */
import { mannWhitney, medianDifference } from '@/calc/index';
import { jobControl } from './job-control';
import { solveChannels, solveWhatIf } from './solve-replay';
import { solveShelf } from './solve-shelf';
import type { WaitsAnswer, WaitsTask } from './waits-tasks';

/** Does one task; null where it was told to stop. */
export function solveWaits(task: WaitsTask): WaitsAnswer {
  if (task.kind === 'compare') {
    const { before, then, seed } = task;
    return { ...medianDifference(before, then, seed), p: mannWhitney(before, then).p };
  }
  jobControl(task.control).begin();
  if (task.kind === 'what-if') return solveWhatIf(task);
  return task.kind === 'channels' ? solveChannels(task) : solveShelf(task);
}
