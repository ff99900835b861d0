import type { BenchAlternative, BenchProblem, Stretch } from './bench-types';

/**
 * A bench problem as plain arrays, which a search goes through some hundred thousand times a second. Only the jobs that
 * can be placed, each with the alternatives that have an instant to start at; alternatives are numbered through all jobs.
 */
export interface BenchModel {
  channels: number;
  /** Per job: its index in the problem, its due time (Infinity: none), its weight. */
  source: number[];
  due: Float64Array;
  weight: Float64Array;
  /** Alternatives of job j: `firstAlternative[j]` to `firstAlternative[j + 1] − 1`. */
  firstAlternative: Int32Array;
  /** Per alternative: its index in the job, its times. */
  alternativeSource: number[];
  busy: Float64Array;
  ready: Float64Array;
  guard: Float64Array;
  /** Channels of alternative a: `held[firstHeld[a]]` to `held[firstHeld[a + 1] − 1]`. */
  firstHeld: Int32Array;
  held: Int32Array;
  /** Instants at which alternative a may start with the channels' taken stretches kept; both ends count. */
  firstWindow: Int32Array;
  windowFrom: Float64Array;
  windowTo: Float64Array;
  /** What a second costs by which a start is after the stretch it may start in; 0: no start is. */
  overPrice: number;
  /** 1: a window after a stretch, in which starts cost so much more. */
  isOver: Uint8Array;
  /** Ids of the jobs left out, because no channel can ever carry them out. */
  unplaced: string[];
}

/** Brings a checked problem down to arrays. */
export function benchModel(problem: BenchProblem): BenchModel {
  const { taken, jobs } = problem;
  const kept: { job: number; alternatives: { at: number; one: BenchAlternative }[] }[] = [];
  const unplaced: string[] = [];
  jobs.forEach(({ id, alternatives }, job) => {
    const usable = alternatives.map((one, at) => ({ at, one })).filter(({ one }) => startsOf(one, taken, 0).length > 0);
    if (usable.length > 0) kept.push({ job, alternatives: usable });
    else unplaced.push(id);
  });
  const all = kept.flatMap(({ alternatives }) => alternatives);
  const model = {
    channels: taken.length,
    source: kept.map(({ job }) => job),
    due: Float64Array.from(kept, ({ job }) => jobs[job]!.dueS ?? Infinity),
    weight: Float64Array.from(kept, ({ job }) => jobs[job]!.weight),
    firstAlternative: offsets(kept.map(({ alternatives }) => alternatives.length)),
    alternativeSource: all.map(({ at }) => at),
    busy: Float64Array.from(all, ({ one }) => one.busyS),
    ready: Float64Array.from(all, ({ one }) => one.readyS),
    guard: Float64Array.from(all, ({ one }) => one.guardS),
    firstHeld: offsets(all.map(({ one }) => one.channels.length)),
    held: Int32Array.from(all.flatMap(({ one }) => one.channels)),
    unplaced,
  };
  return { ...model, ...startWindows(model, problem, 0), overPrice: 0 };
}

/** The model with starts so much after their stretches; what they cost is set by `overPrice`. */
export const lateModel = (model: BenchModel, problem: BenchProblem, byS: number): BenchModel => ({
  ...model,
  ...startWindows(model, problem, byS),
});

type StartWindows = Pick<BenchModel, 'firstWindow' | 'windowFrom' | 'windowTo' | 'isOver'>;

function startWindows(
  { source, firstAlternative, alternativeSource }: Omit<BenchModel, keyof StartWindows | 'overPrice'>,
  { taken, jobs }: BenchProblem,
  overS: number,
): StartWindows {
  const each = source.flatMap((job, at) =>
    alternativeSource
      .slice(firstAlternative[at], firstAlternative[at + 1])
      .map((way) => startsOf(jobs[job]!.alternatives[way]!, taken, overS)),
  );
  const all = each.flat();
  return {
    firstWindow: offsets(each.map(({ length }) => length)),
    windowFrom: Float64Array.from(all, ({ fromS }) => fromS),
    windowTo: Float64Array.from(all, ({ toS }) => toS),
    isOver: Uint8Array.from(all, ({ isOver }) => Number(isOver)),
  };
}

/** The first instant from `fromS` on at which the alternative may start, as far as taken stretches go; Infinity: none. */
export function firstStart(model: BenchModel, alternative: number, fromS: number): number {
  const end = model.firstWindow[alternative + 1]!;
  for (let at = model.firstWindow[alternative]!; at < end; at += 1)
    if (model.windowTo[at]! >= fromS) return Math.max(fromS, model.windowFrom[at]!);
  return Infinity;
}

interface StartWindow extends Stretch {
  isOver: boolean;
}

/** When an alternative may start, from now on: a stretch may be a single instant, where a gap is just long enough. */
function startsOf(
  { channels, busyS, mayStart }: BenchAlternative,
  taken: readonly Stretch[][],
  overS: number,
): StartWindow[] {
  let starts = mayStart.flatMap(({ fromS, toS }, at): StartWindow[] => {
    const over = Math.min(toS + overS, mayStart[at + 1]?.fromS ?? Infinity);
    return [{ fromS, toS, isOver: false }, ...(over > toS ? [{ fromS: toS, toS: over, isOver: true }] : [])];
  });
  starts = starts.filter(({ toS }) => toS >= 0).map((one) => ({ ...one, fromS: Math.max(0, one.fromS) }));
  for (const channel of channels)
    for (const hole of taken[channel]!)
      starts = starts.flatMap((one) =>
        [
          { ...one, toS: Math.min(one.toS, hole.fromS - busyS) },
          { ...one, fromS: Math.max(one.fromS, hole.toS) },
        ].filter((left) => left.fromS <= left.toS),
      );
  return starts;
}

/** By how much the start is after the stretch it may start in, s. */
export function secondsOver(model: BenchModel, alternative: number, startS: number): number {
  for (let at = model.firstWindow[alternative]!; model.windowFrom[at]! <= startS; at += 1)
    if (startS <= model.windowTo[at]!) return model.isOver[at] ? startS - model.windowFrom[at]! : 0;
  return 0;
}

function offsets(lengths: readonly number[]): Int32Array {
  const from = new Int32Array(lengths.length + 1);
  lengths.forEach((length, at) => (from[at + 1] = from[at]! + length));
  return from;
}
