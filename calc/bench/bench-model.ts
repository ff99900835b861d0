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
  /** Ids of the jobs left out, because no channel can ever carry them out. */
  unplaced: string[];
}

/** Brings a checked problem down to arrays. */
export function benchModel({ taken, jobs }: BenchProblem): BenchModel {
  const kept: { job: number; alternatives: { at: number; one: BenchAlternative; starts: Stretch[] }[] }[] = [];
  const unplaced: string[] = [];
  jobs.forEach(({ id, alternatives }, job) => {
    const usable = alternatives
      .map((one, at) => ({ at, one, starts: startsOf(one, taken) }))
      .filter(({ starts }) => starts.length > 0);
    if (usable.length > 0) kept.push({ job, alternatives: usable });
    else unplaced.push(id);
  });
  const all = kept.flatMap(({ alternatives }) => alternatives);
  return {
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
    firstWindow: offsets(all.map(({ starts }) => starts.length)),
    windowFrom: Float64Array.from(all.flatMap(({ starts }) => starts.map(({ fromS }) => fromS))),
    windowTo: Float64Array.from(all.flatMap(({ starts }) => starts.map(({ toS }) => toS))),
    unplaced,
  };
}

/** The first instant from `fromS` on at which the alternative may start, as far as taken stretches go; Infinity: none. */
export function firstStart(model: BenchModel, alternative: number, fromS: number): number {
  const end = model.firstWindow[alternative + 1]!;
  for (let at = model.firstWindow[alternative]!; at < end; at += 1)
    if (model.windowTo[at]! >= fromS) return Math.max(fromS, model.windowFrom[at]!);
  return Infinity;
}

/** When an alternative may start, from now on: a stretch may be a single instant, where a gap is just long enough. */
function startsOf({ channels, busyS, mayStart }: BenchAlternative, taken: readonly Stretch[][]): Stretch[] {
  let starts = mayStart.filter(({ toS }) => toS >= 0).map(({ fromS, toS }) => ({ fromS: Math.max(0, fromS), toS }));
  for (const channel of channels)
    for (const hole of taken[channel]!)
      starts = starts.flatMap(({ fromS, toS }) =>
        [
          { fromS, toS: Math.min(toS, hole.fromS - busyS) },
          { fromS: Math.max(fromS, hole.toS), toS },
        ].filter((left) => left.fromS <= left.toS),
      );
  return starts;
}

function offsets(lengths: readonly number[]): Int32Array {
  const from = new Int32Array(lengths.length + 1);
  lengths.forEach((length, at) => (from[at + 1] = from[at]! + length));
  return from;
}
