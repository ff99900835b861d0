import { DomainError } from '../../errors/domain-error';
import { WorkerPool } from '../worker-pool';
import { ReplayJobs } from './replay-jobs';
import type { WaitsAnswer, WaitsAnswers, WaitsTask } from './waits-tasks';

/** Runs tasks over the history of waits, off the event loop. */
export interface WaitsSolver {
  run<Task extends WaitsTask>(task: Task): Promise<WaitsAnswers[Task['kind']]>;
  /** Those that go on beside the request that began them. */
  jobs: ReplayJobs;
  close(): Promise<void>;
}

/** Runs one task somewhere. */
export interface WaitsRunner {
  run(task: WaitsTask): Promise<WaitsAnswer>;
  close(): Promise<void>;
}

/** A task that has not come back after this is given up, ms: of 200,000 charges a replay takes some ten seconds. */
const PATIENCE_MS = 180_000;

const waitsThread = (): WaitsRunner =>
  new WorkerPool<WaitsTask, WaitsAnswer>({
    entry: 'waits',
    size: 1,
    longestQueue: 50,
    tooMany: () =>
      new DomainError(503, 'busy', 'Waits are being reckoned for many at once. Try again shortly.', {
        retryAfterS: 10,
      }),
    patienceMs: PATIENCE_MS,
  });

export function makeWaitsSolver(runner: WaitsRunner = waitsThread()): WaitsSolver {
  return {
    run: <Task extends WaitsTask>(task: Task) => runner.run(task) as Promise<WaitsAnswers[Task['kind']]>,
    jobs: new ReplayJobs(),
    close: () => runner.close(),
  };
}
