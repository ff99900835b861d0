import { firstStart, secondsOver, type BenchModel } from './bench-model';
import { SAME_S, type BenchScore } from './bench-score';

/** A plan as a search turns it over: the jobs in an order, each with one of its alternatives. */
export interface BenchOrder {
  order: Int32Array;
  /** Per job, not per place in the order. */
  alternative: Int32Array;
}

/** Reads orders of one model, with its own scratch. */
export interface BenchDecoder {
  /** Of the last order that was read to its end. */
  score: BenchScore;
  /** Per job; Infinity: it found no place. */
  starts: Float64Array;
  /** False, as soon as the order is sure to be worse than `limit` by its weighted tardiness. */
  read: (plan: BenchOrder, limit: BenchScore | null) => boolean;
}

/**
 * The plan that an order stands for: each job after the other begins as soon as all channels of its alternative have
 * done with the jobs before it. Every plan in which nothing could begin earlier is that of its jobs in order of their
 * starts, and so one of the best is among the orders.
 */
export function benchDecoder(model: BenchModel): BenchDecoder {
  const free = new Float64Array(model.channels);
  const starts = new Float64Array(model.source.length);
  const score: BenchScore = { unplaced: 0, lateS: 0, makespanS: 0, startsS: 0 };
  const { busy, ready, guard, due, weight, firstHeld, held } = model;
  const read = ({ order, alternative }: BenchOrder, limit: BenchScore | null): boolean => {
    free.fill(0);
    let [unplaced, late, makespan, sum] = [0, 0, 0, 0];
    for (let at = 0; at < order.length; at += 1) {
      const job = order[at]!;
      const way = alternative[job]!;
      const end = firstHeld[way + 1]!;
      let from = 0;
      for (let h = firstHeld[way]!; h < end; h += 1) from = Math.max(from, free[held[h]!]!);
      const start = firstStart(model, way, from);
      starts[job] = start;
      if (start === Infinity) {
        unplaced += 1;
      } else {
        for (let h = firstHeld[way]!; h < end; h += 1) free[held[h]!] = start + busy[way]!;
        const over = start + guard[way]! - due[job]!;
        if (over > 0) late += weight[job]! * over;
        if (model.overPrice > 0) late += model.overPrice * secondsOver(model, way, start);
        makespan = Math.max(makespan, start + ready[way]!);
        sum += start;
      }
      if (limit && (unplaced > limit.unplaced || (unplaced === limit.unplaced && late > limit.lateS + SAME_S)))
        return false;
    }
    score.unplaced = unplaced;
    score.lateS = late;
    score.makespanS = makespan;
    score.startsS = sum;
    return true;
  };
  return { score, starts, read };
}
