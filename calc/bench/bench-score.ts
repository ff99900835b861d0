/** What a plan is judged by, the first first: jobs without a place, weighted tardiness, makespan, sum of starts (s). */
export interface BenchScore {
  unplaced: number;
  lateS: number;
  makespanS: number;
  startsS: number;
}

/** Times are equal that differ by less than this: sums of the same parts in another order, s. */
export const SAME_S = 1e-6;

/** Below 0: `one` is the better plan; 0: they are alike. */
export function compareScores(one: BenchScore, other: BenchScore): number {
  if (one.unplaced !== other.unplaced) return one.unplaced - other.unplaced;
  const late = one.lateS - other.lateS;
  if (Math.abs(late) > SAME_S) return late;
  const makespan = one.makespanS - other.makespanS;
  if (Math.abs(makespan) > SAME_S) return makespan;
  const starts = one.startsS - other.startsS;
  return Math.abs(starts) > SAME_S ? starts : 0;
}
