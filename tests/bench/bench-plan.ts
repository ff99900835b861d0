import { earliestDueFirst, planBench, planFills } from '@/calc/index';
import { benchJob, benchProblem, published } from '../calc/bench-fixtures';
import { benchInstance, fillInstance } from '../calc/reference/bench-instances';
import kept from '../calc/reference/bench-instances.json';
import { fastest } from './fastest';
import { benchMilp } from './offline/bench-milp';
import { fillMilp } from './offline/fill-milp';
import { solveMilp } from './offline/solve';

/** Milliseconds of one run, with what it gave. */
function timed<T>(run: () => T): { value: T; ms: number } {
  const start = performance.now();
  const value = run();
  return { value, ms: performance.now() - start };
}

const hours = (s: number) => (s / 3600).toFixed(2);
const most = (list: number[]) => Math.max(...list).toFixed(0);

const mean = (list: number[]) => list.reduce((sum, one) => sum + one, 0) / list.length;

/** HiGHS solves these soonest. */
const SOON = { workshop: 4, day: 5 };

/**
 * The bench plan's solvers: workshops of 30 charges on 8 channels and days of 12 people and 40 pieces, each with its time
 * and its gap to the bound that a mixed integer program proved offline, as a multiple of list scheduling (earliest due
 * first, densest piece first), and one of each beside HiGHS, asked in the same run for the same gap; then small
 * workshops that are searched through completely, and 40 jobs on one machine.
 *
 * @returns lines to print
 */
export async function* benchBenchPlan(): AsyncGenerator<string> {
  const times: number[] = [];
  const gaps: number[] = [];
  const timesList: number[] = [];
  const beside: string[] = [];
  for (const { seed, boundHours } of kept.bench) {
    const problem = benchInstance(seed);
    const { value: plan, ms } = timed(() => planBench(problem));
    const gap = boundHours > 0 ? plan.weightedTardinessS / 3600 / boundHours - 1 : 0;
    times.push(ms);
    gaps.push(gap);
    const list = earliestDueFirst(problem);
    const listMs = fastest(() => earliestDueFirst(problem), 5, 3);
    timesList.push(ms / listMs);
    if (seed === SOON.workshop) {
      const highs = await solveMilp(benchMilp(problem, list), 60, Math.max(0.002, gap));
      beside.push(
        `workshop ${seed}: HiGHS takes ${((1000 * highs.seconds) / ms).toFixed(1)} times as long for a gap of ${(100 * Math.max(0.002, gap)).toFixed(1)} %`,
      );
    }
    yield `workshop ${seed}: ${hours(plan.weightedTardinessS)} h late by weight, bound ${boundHours.toFixed(2)} h (gap ${(100 * gap).toFixed(2)} %), own bound ${hours(plan.boundS)} h, earliest due first ${hours(list.weightedTardinessS)} h; ${ms.toFixed(0)} ms`;
  }
  yield `30 charges on 8 channels: at most ${most(times)} ms, gap at most ${(100 * Math.max(...gaps)).toFixed(2)} %, ${mean(timesList).toFixed(0)} times as long as earliest due first`;
  for (const { seed, boundMinutes } of kept.fills) {
    const problem = fillInstance(seed);
    const { value: plan, ms } = timed(() => planFills(problem));
    const greedy = planFills(problem, { maxNodes: 0 });
    const greedyMs = fastest(() => planFills(problem, { maxNodes: 0 }), 5, 3);
    const share = plan.weightedMinutes / boundMinutes;
    if (seed === SOON.day) {
      const highs = await solveMilp(fillMilp(problem), 60, Math.max(0.0005, 1 - share));
      beside.push(
        `day ${seed}: HiGHS takes ${((1000 * highs.seconds) / ms).toFixed(1)} times as long for a bound alone`,
      );
    }
    yield `day ${seed}, 12 people, 40 pieces: ${plan.weightedMinutes.toFixed(0)} of at most ${boundMinutes.toFixed(0)} weighted minutes (gap ${(100 * (1 - share)).toFixed(2)} %), densest first ${greedy.weightedMinutes.toFixed(0)}; ${ms.toFixed(0)} ms, ${(ms / greedyMs).toFixed(0)} times as long as densest first`;
  }
  yield* beside;
  const small = Array.from({ length: 20 }, (_, seed) => {
    const { taken, jobs } = benchInstance(100 + seed);
    const few = jobs.filter(({ alternatives }) => alternatives.some(({ channels }) => channels[0]! < 3)).slice(0, 7);
    const on3 = few.map((job) => ({
      ...job,
      alternatives: job.alternatives.filter(({ channels }) => channels[0]! < 3),
    }));
    return timed(() => planBench({ taken: taken.slice(0, 3), jobs: on3 }));
  });
  const proved = small.filter(({ value }) => value.proved).length;
  yield `7 charges on 3 channels: ${proved} of ${small.length} proved, at most ${most(small.map(({ ms }) => ms))} ms`;
  const { times: lengths, weights, due, optimum } = published.one_machine[3];
  const jobs = lengths.map((s, at) => benchJob(`${at}`, s, 1, { dueS: due[at]!, weight: weights[at]! }));
  const { value, ms } = timed(() => planBench(benchProblem(1, jobs)));
  yield `40 jobs on one machine (wt40, instance 1): ${value.weightedTardinessS}, published ${optimum}, own bound ${value.boundS.toFixed(0)}; ${ms.toFixed(0)} ms`;
}
