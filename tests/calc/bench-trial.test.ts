import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { benchDecoder } from '@/calc/bench/bench-decode';
import { benchModel, lateModel, type BenchModel } from '@/calc/bench/bench-model';
import { compareScores, type BenchScore } from '@/calc/bench/bench-score';
import { benchTrial, type BenchTrial, type Put } from '@/calc/bench/bench-trial';
import { seededRandom, type BenchProblem } from '@/calc/index';

const ANY: BenchScore = { unplaced: Infinity, lateS: Infinity, makespanS: Infinity, startsS: Infinity };

/** Ten charges of whole times on three channels, some of two channels at once, with a night and two running charges. */
function workshop(seed: number, overS: number): BenchModel {
  const random = seededRandom(seed);
  const whole = (from: number, to: number) => from + Math.floor(random() * (to - from + 1));
  // Some only on the first day, so that a change may leave one without a place.
  const days = [
    { fromS: 0, toS: whole(20, 50) },
    { fromS: 70, toS: 110 },
  ];
  const problem: BenchProblem = {
    taken: [[{ fromS: 0, toS: whole(1, 9) }], [{ fromS: 12, toS: 18 }], []],
    jobs: Array.from({ length: 10 }, (_, job) => ({
      id: `${job}`,
      dueS: random() < 0.2 ? null : whole(5, 90),
      weight: whole(0, 4),
      alternatives: [[0], [1], [2], [0, 2], [1, 2]]
        .filter((_one, at) => at === job % 3 || random() < 0.5)
        .map((channels) => {
          const busyS = whole(3, 20);
          const mayStart = random() < 0.3 ? days.slice(0, 1) : days;
          return { channels, busyS, readyS: busyS + 1, guardS: busyS + whole(1, 5), mayStart };
        }),
    })),
  };
  const model = benchModel(problem);
  return overS > 0 ? { ...lateModel(model, problem, overS), overPrice: 3 } : model;
}

/** The list read from its beginning to its end. */
function readWhole(model: BenchModel, order: Int32Array, alternative: Int32Array): BenchScore {
  const decoder = benchDecoder(model);
  decoder.read({ order, alternative }, null);
  return { ...decoder.score };
}

/** The same score as the whole list has; where all have a place it is only given up when it is worse than the limit. */
function expectSame(trial: BenchTrial, tried: boolean, whole: BenchScore, limit: BenchScore): void {
  if (!tried && (limit === ANY || whole.unplaced === 0)) expect(compareScores(whole, limit)).toBeGreaterThan(0);
  if (!tried) return;
  else
    for (const key of Object.keys(whole) as (keyof BenchScore)[]) expect(trial.score[key]).toBeCloseTo(whole[key], 6);
}

describe('a change of a plan of channels, of which only what it touches is read again', () => {
  const drawn = fc.record({
    seed: fc.integer({ min: 1, max: 1e6 }),
    overS: fc.constantFrom(0, 0, 6, 15),
    strict: fc.boolean(),
  });

  it('comes to what the whole list comes to, a job put in at every place by every alternative, over 150 workshops', () => {
    fc.assert(
      fc.property(drawn, ({ seed, overS, strict }) => {
        const model = workshop(seed, overS);
        const random = seededRandom(seed + 1);
        const { order, alternative } = shuffled(model, random);
        const job = order[0]!;
        const others = order.slice(1);
        const trial = benchTrial(model);
        trial.base(others, alternative);
        const limit = strict ? readWhole(model, order, alternative) : ANY;
        for (let way = model.firstAlternative[job]!; way < model.firstAlternative[job + 1]!; way += 1)
          for (let at = 0; at <= others.length; at += 1) {
            const changed = Int32Array.from([...others.slice(0, at), job, ...others.slice(at)]);
            const ways = alternative.slice();
            ways[job] = way;
            expectSame(trial, trial.insert({ at, job, way }, limit), readWhole(model, changed, ways), limit);
          }
      }),
      { numRuns: 150 },
    );
  });

  it('and so do two jobs that change places, with alternatives drawn anew, over 150 workshops', () => {
    fc.assert(
      fc.property(drawn, ({ seed, overS, strict }) => {
        const model = workshop(seed, overS);
        const random = seededRandom(seed + 1);
        const { order, alternative } = shuffled(model, random);
        const trial = benchTrial(model);
        trial.base(order, alternative);
        const limit = strict ? readWhole(model, order, alternative) : ANY;
        for (let from = 0; from < order.length; from += 1)
          for (let to = from + 1; to < order.length; to += 1) {
            const puts = [order[to]!, order[from]!].map((job, k): Put => {
              const [first, end] = [model.firstAlternative[job]!, model.firstAlternative[job + 1]!];
              return { at: k === 0 ? from : to, job, way: first + Math.floor(random() * (end - first)) };
            });
            const changed = order.slice();
            const ways = alternative.slice();
            for (const { at, job, way } of puts) {
              changed[at] = job;
              ways[job] = way;
            }
            expectSame(trial, trial.replace(puts[0]!, puts[1]!, limit), readWhole(model, changed, ways), limit);
          }
      }),
      { numRuns: 150 },
    );
  });
});

function shuffled(model: BenchModel, random: () => number): { order: Int32Array; alternative: Int32Array } {
  const order = Int32Array.from(model.source.keys());
  for (let at = order.length - 1; at > 0; at -= 1) {
    const to = Math.floor(random() * (at + 1));
    [order[at], order[to]] = [order[to]!, order[at]!];
  }
  const alternative = Int32Array.from(model.source, (_, job) => {
    const [first, end] = [model.firstAlternative[job]!, model.firstAlternative[job + 1]!];
    return first + Math.floor(random() * (end - first));
  });
  return { order, alternative };
}
