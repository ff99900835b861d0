/** The work of the bench plan's thread: pure reckoning, and the only clock it knows is the limit of a search. */
import { planBench, planFills } from '@/calc/index';
import type { SolveLimits } from '@/calc/bench/bench-types';
import type { BenchAnswer, BenchTask } from './bench-tasks';
import { earlyStarts } from './early-starts';
import { alternativesOf, optionOn } from './ways';

/** Does one task. */
export function solveTask(task: BenchTask, now: () => number = () => performance.now()): BenchAnswer {
  switch (task.kind) {
    case 'way':
      return alternativesOf(task.ask);
    case 'option':
      return optionOn(task.ask, task.channelIds);
    case 'bench':
      return planBench(task.problem, within(task.limitMs, now));
    case 'fills':
      return planFills(task.problem, within(task.limitMs, now));
    case 'early-starts':
      return earlyStarts(task.spares);
  }
}

function within(limitMs: number, now: () => number): SolveLimits {
  const end = now() + limitMs;
  return { shouldStop: () => now() >= end };
}
