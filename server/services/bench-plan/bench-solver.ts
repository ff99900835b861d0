import { createHash } from 'node:crypto';
import type { BenchProblem, BenchSolution, FillProblem, FillSolution } from '@/calc/bench/bench-types';
import type { PlanOption } from '@/calc/plan-types';
import { DomainError } from '../../errors/domain-error';
import { WorkerPool } from '../worker-pool';
import type {
  Alternatives,
  BenchAnswer,
  BenchAnswers,
  BenchTask,
  EarlyStart,
  EarlyStartFound,
  WayInput,
} from './bench-tasks';

/** A search for the best plan ends after this with the best one found, ms. */
export const SEARCH_LIMIT_MS = 1500;
/** A task that has not come back after this is given up, ms: thirty times the longest that was seen. */
const PATIENCE_MS = 30_000;
/** Answers kept, of each kind: a workshop has some dozen charges that wait, and a day some plans. */
const KEPT = 400;

/** Reckons for the bench plan, off the event loop. The same question is answered once. */
export interface BenchSolver {
  /** What a charge takes on each channel. */
  alternatives(ask: WayInput): Promise<Alternatives>;
  /** The option on these channels, whole; null: it cannot be done there. */
  option(ask: WayInput, channelIds: string[]): Promise<PlanOption | null>;
  /** The best plan found within the limit. */
  bench(problem: BenchProblem): Promise<BenchSolution>;
  fills(problem: FillProblem): Promise<FillSolution>;
  earlyStarts(spares: EarlyStart[]): Promise<EarlyStartFound[]>;
  close(): Promise<void>;
}

/** Runs one task somewhere. */
export interface BenchRunner {
  run(task: BenchTask): Promise<BenchAnswer>;
  close(): Promise<void>;
}

/** The thread of the bench plan. */
export const benchThread = (): BenchRunner =>
  new WorkerPool<BenchTask, BenchAnswer>({
    entry: 'bench',
    size: 1,
    longestQueue: 500,
    tooMany: () =>
      new DomainError(503, 'busy', 'The bench plan is being reckoned for many at once. Try again shortly.', {
        retryAfterS: 5,
      }),
    patienceMs: PATIENCE_MS,
  });

/** Keeps answers by what they were asked with; one that failed is asked again. */
export function makeBenchSolver(runner: BenchRunner = benchThread()): BenchSolver {
  const known = new Map<string, Promise<BenchAnswer>>();
  function ask<Kind extends keyof BenchAnswers>(task: BenchTask & { kind: Kind }): Promise<BenchAnswers[Kind]> {
    const key = createHash('sha256').update(JSON.stringify(task)).digest('base64');
    let answer = known.get(key);
    if (answer !== undefined) known.delete(key);
    else {
      answer = runner.run(task);
      answer.catch(() => known.delete(key));
    }
    // The one that was asked for last stands last, and the first goes.
    known.set(key, answer);
    if (known.size > KEPT) known.delete(known.keys().next().value!);
    return answer as Promise<BenchAnswers[Kind]>;
  }
  return {
    alternatives: (way) => ask({ kind: 'way', ask: way }),
    option: (way, channelIds) => ask({ kind: 'option', ask: way, channelIds }),
    bench: (problem) => ask({ kind: 'bench', problem, limitMs: SEARCH_LIMIT_MS }),
    fills: (problem) => ask({ kind: 'fills', problem, limitMs: SEARCH_LIMIT_MS }),
    earlyStarts: (spares) => ask({ kind: 'early-starts', spares }),
    close: () => runner.close(),
  };
}
