import { afterAll, describe, expect, it } from 'vitest';
import type { BenchProblem } from '@/calc/bench/bench-types';
import type { PlanInput } from '@/calc/plan-types';
import { benchThread, makeBenchSolver, type BenchRunner } from '@/server/services/bench-plan/bench-solver';
import type { BenchTask, WayInput } from '@/server/services/bench-plan/bench-tasks';
import { solveTask } from '@/server/services/bench-plan/solve';
import { channel, planInput } from '@/tests/calc/plan-fixtures';

const thread = benchThread();
const solver = makeBenchSolver(thread);
afterAll(() => solver.close());

const ask = (change: Partial<PlanInput> = {}): WayInput => ({
  input: planInput({ channels: [channel('A1'), channel('B1', { maxAmps: 20 })], ...change }),
  way: 'terminals',
  finish: 'over-and-settle',
  knownEnd: null,
});

/** So many jobs on two channels, each due before it can be done: nothing is proved at once. */
const crowded = (count: number): BenchProblem => ({
  taken: [[], []],
  jobs: Array.from({ length: count }, (_, place) => ({
    id: `job-${place}`,
    dueS: 1800 + ((place * 7919) % 13) * 900,
    weight: 1 + (place % 3),
    alternatives: [0, 1].map((at) => ({
      channels: [at],
      busyS: 3600 + ((place * 104_729) % 11) * 300 + at * 420,
      readyS: 7200,
      guardS: 7800 + place,
      mayStart: [{ fromS: 0, toS: 7 * 86_400 }],
    })),
  })),
});

describe('the thread of the bench plan', () => {
  it('reckons what this thread would, to the last digit', async () => {
    expect(await solver.alternatives(ask())).toEqual(solveTask({ kind: 'way', ask: ask() }));
    const option = await solver.option(ask(), ['id-B1']);
    expect(option).toEqual(solveTask({ kind: 'option', ask: ask(), channelIds: ['id-B1'] }));
    expect(option!.channelIds).toEqual(['id-B1']);
  });

  it('stops a search at its limit with the best plan so far, and lets the event loop turn meanwhile', async () => {
    let turns = 0;
    const timer = setInterval(() => (turns += 1), 5);
    const found = await solver.bench(crowded(30));
    clearInterval(timer);
    expect(found.placements).toHaveLength(30);
    expect(found.weightedTardinessS).toBeGreaterThan(0);
    // Reckoned on this thread, a search leaves no turn at all.
    expect(turns).toBeGreaterThan(5);
  });

  it('goes on with the next question after one that cannot be answered', async () => {
    const wrong = { ...crowded(1), taken: [] };
    await expect(solver.bench(wrong)).rejects.toThrow('channel');
    expect((await solver.bench(crowded(2))).placements).toHaveLength(2);
  });
});

describe('the answers kept', () => {
  const counting = (run: (task: BenchTask) => ReturnType<typeof solveTask>) => {
    const asked: string[] = [];
    const runner: BenchRunner = {
      run: async (task) => {
        asked.push(task.kind);
        return run(task);
      },
      close: async () => {},
    };
    return { asked, solver: makeBenchSolver(runner) };
  };

  it('answer the same question once, however many ask at the same time', async () => {
    const { asked, solver: kept } = counting((task) => solveTask(task));
    const [one, other] = await Promise.all([kept.bench(crowded(3)), kept.bench(crowded(3))]);
    expect(one).toBe(other);
    await kept.bench(crowded(4));
    await kept.bench(crowded(3));
    expect(asked).toEqual(['bench', 'bench']);
  });

  it('do not keep a failure', async () => {
    let fails = true;
    const { asked, solver: kept } = counting((task) => {
      if (fails) throw new Error('gone');
      return solveTask(task);
    });
    await expect(kept.bench(crowded(2))).rejects.toThrow('gone');
    fails = false;
    expect((await kept.bench(crowded(2))).placements).toHaveLength(2);
    expect(asked).toHaveLength(2);
  });
});
