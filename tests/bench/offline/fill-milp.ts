import { intersect, subtract, type FillProblem, type FillWork, type Stretch } from '@/calc/index';
import type { Column, Milp } from './solve';

/** Work that fits into a stretch of a window: its look-ins taken off, the whole of each. */
function workIn(problem: FillProblem, window: number, { fromS, toS }: Stretch): number {
  const { lookInsS } = problem.windows[window]!;
  let over = 0;
  let lost = 0;
  for (const at of [...lookInsS].sort((a, b) => a - b)) {
    // A look-in begins when the one before is over.
    const begins = Math.max(at, over);
    over = begins + problem.lookInS;
    lost += Math.max(0, Math.min(over, toS) - Math.max(begins, fromS));
  }
  return Math.max(0, toS - fromS - lost);
}

/** The stretches of a window in one of which a piece, or each part of it, must lie: its place is free all along. */
function gapsFor(problem: FillProblem, work: FillWork, window: number): Stretch[] {
  const { personId, fromS, toS } = problem.windows[window]!;
  if (!work.personIds.includes(personId)) return [];
  const own = intersect([{ fromS, toS }], [{ fromS: Math.max(0, work.releaseS), toS: work.dueS ?? Infinity }]);
  const taken = work.placeId === null ? [] : (problem.placesTaken[work.placeId] ?? []);
  const least = work.splittable ? Math.min(work.leastPartS, work.longS) : work.longS;
  return subtract(own, taken).filter((gap) => workIn(problem, window, gap) >= least - 1e-6);
}

/** A piece in a gap: the column that says so, and how much of it there is: `by` seconds for each of the column `seconds`. */
interface Lying {
  piece: number;
  window: number;
  gap: Stretch;
  chosen: number;
  seconds: number;
  by: number;
}

/**
 * A relaxation of a day's fills: who does which piece in which gap, without saying when. A column per piece and gap of a
 * window (whole, or seconds with a yes or no for pieces that can be parted). In every stretch between two instants at
 * which a gap begins or ends, a window, a place and a piece take no more than they have of it; what a piece in a gap has
 * there at least is all of it less what could be done of it in the gap before and after (energetic reasoning).
 */
export function fillMilp(problem: FillProblem): Milp {
  const { windows, work, placesTaken } = problem;
  const columns: Column[] = [];
  const rows: Milp['rows'] = [];
  const row = (most: number) => rows.push({ least: null, most }) - 1;
  const lying: Lying[] = [];
  work.forEach((one, piece) => {
    const once = row(one.splittable ? one.longS : 1);
    const worth = (one.weight * one.likelyS) / 60 / one.longS;
    const each = windows.flatMap((_, window) => gapsFor(problem, one, window).map((gap) => ({ window, gap })));
    for (const { window, gap } of each) {
      const seconds = columns.length;
      const by = one.splittable ? 1 : one.longS;
      const most = one.splittable ? Math.min(one.longS, workIn(problem, window, gap)) : 1;
      lying.push({ piece, window, gap, chosen: one.splittable ? seconds + 1 : seconds, seconds, by });
      columns.push({ cost: worth * by, upper: most, whole: !one.splittable, rows: [[once, 1]] });
      if (!one.splittable) continue;
      const [atLeast, atMost] = [rows.push({ least: 0, most: null }) - 1, row(0)];
      columns[seconds]!.rows.push([atLeast, 1], [atMost, 1]);
      const least = Math.min(one.leastPartS, one.longS);
      columns.push({
        cost: 0,
        upper: 1,
        whole: true,
        rows: [
          [atLeast, -least],
          [atMost, -most],
        ],
      });
    }
  });

  /** At most `free` of every stretch for a group that has one thing to itself. */
  const limit = (group: Lying[], free: (within: Stretch) => number) => {
    const instants = [...new Set(group.flatMap(({ gap }) => [gap.fromS, gap.toS]))].sort((one, other) => one - other);
    for (const [at, fromS] of instants.entries())
      for (const toS of instants.slice(at + 1)) {
        const has = free({ fromS, toS });
        const inside = group.flatMap((one) => {
          const { piece, window, gap, by } = one;
          const before = workIn(problem, window, { fromS: gap.fromS, toS: Math.min(gap.toS, fromS) });
          const after = workIn(problem, window, { fromS: Math.max(gap.fromS, toS), toS: gap.toS });
          const outside = before + after;
          const most = by * columns[one.seconds]!.upper - outside;
          return most > 1e-6 && outside < work[piece]!.longS ? [{ ...one, outside, most }] : [];
        });
        // What cannot be too much needs no row.
        if (inside.reduce((sum, { most }) => sum + most, 0) <= has + 1e-6) continue;
        const to = row(has);
        for (const { seconds, chosen, by, outside } of inside)
          if (seconds === chosen) columns[seconds]!.rows.push([to, by - outside]);
          else {
            columns[seconds]!.rows.push([to, 1]);
            if (outside > 0) columns[chosen]!.rows.push([to, -outside]);
          }
      }
  };
  windows.forEach((_, window) =>
    limit(
      lying.filter((one) => one.window === window),
      (within) => workIn(problem, window, within),
    ),
  );
  const placeIds = new Set(work.flatMap(({ placeId }) => (placeId === null ? [] : [placeId])));
  for (const placeId of placeIds)
    limit(
      lying.filter(({ piece }) => work[piece]!.placeId === placeId),
      (within) => subtract([within], placesTaken[placeId] ?? []).reduce((sum, { fromS, toS }) => sum + toS - fromS, 0),
    );
  // Parts of one piece are never done at once.
  work.forEach(({ splittable, placeId }, piece) => {
    if (!splittable || placeId !== null) return;
    limit(
      lying.filter((one) => one.piece === piece),
      ({ fromS, toS }) => toS - fromS,
    );
  });
  return { sense: 'maximize', columns, rows, known: null };
}
