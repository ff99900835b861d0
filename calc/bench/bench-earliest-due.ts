import { firstStart, type BenchModel } from './bench-model';
import type { BenchOrder } from './bench-decode';

/**
 * List scheduling: the jobs by due time (then the heavier first), each at the alternative by which it is ready first, in
 * the first gap that is long enough.
 */
export function earliestDueOrder(model: BenchModel): BenchOrder {
  const jobs = model.source.length;
  const alternative = Int32Array.from({ length: jobs }, (_, job) => model.firstAlternative[job]!);
  const starts = new Float64Array(jobs).fill(Infinity);
  const held: { fromS: number; toS: number }[][] = Array.from({ length: model.channels }, () => []);
  for (const job of byDue(model)) {
    let readyAt = Infinity;
    for (let way = model.firstAlternative[job]!; way < model.firstAlternative[job + 1]!; way += 1) {
      const start = firstGap(model, way, held);
      if (start + model.ready[way]! >= readyAt) continue;
      readyAt = start + model.ready[way]!;
      alternative[job] = way;
      starts[job] = start;
    }
    if (readyAt === Infinity) continue;
    const way = alternative[job]!;
    for (let h = model.firstHeld[way]!; h < model.firstHeld[way + 1]!; h += 1)
      held[model.held[h]!]!.push({ fromS: starts[job]!, toS: starts[job]! + model.busy[way]! });
  }
  // By their starts, so that reading the order again puts none of them later.
  const order = Int32Array.from(starts.keys()).sort(
    (one, other) => compare(starts[one]!, starts[other]!) || one - other,
  );
  return { order, alternative };
}

/** Indices of the jobs, due first, heavier first, first come first. */
function byDue({ source, due, weight }: BenchModel): number[] {
  return [...source.keys()].sort(
    (one, other) => compare(due[one]!, due[other]!) || weight[other]! - weight[one]! || one - other,
  );
}

/** Also for two times that never come. */
const compare = (one: number, other: number): number => (one === other ? 0 : one - other);

/** The first start at which no channel of the alternative is held by a job placed before; Infinity: none. */
function firstGap(model: BenchModel, way: number, held: readonly { fromS: number; toS: number }[][]): number {
  let start = firstStart(model, way, 0);
  for (let moved = true; moved && start < Infinity;) {
    moved = false;
    for (let h = model.firstHeld[way]!; h < model.firstHeld[way + 1]!; h += 1)
      for (const { fromS, toS } of held[model.held[h]!]!)
        if (fromS < start + model.busy[way]! && start < toS) {
          start = firstStart(model, way, toS);
          moved = true;
        }
  }
  return start;
}
