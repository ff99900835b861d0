/** The other side of a worker pool: what a thread of server/workers does with the tasks it is sent. */
import { parentPort } from 'node:worker_threads';
import type { PoolAnswer, PoolTask } from './worker-pool';

/** Answers every task by `work`; what it throws goes back as words. */
export function answerTasks<Task, Result>(work: (task: Task) => Result): void {
  parentPort?.on('message', ({ id, task }: PoolTask<Task>) => {
    let answer: PoolAnswer<Result>;
    try {
      answer = { id, result: work(task) };
    } catch (error) {
      answer = { id, error: error instanceof Error ? error.message : 'failed' };
    }
    parentPort?.postMessage(answer);
  });
}
