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

/** When a piece can be done in a window at all; null: never. */
function couldLie(problem: FillProblem, work: FillWork, window: number): Stretch | null {
  const { personId, fromS, toS } = problem.windows[window]!;
  if (!work.personIds.includes(personId)) return null;
  const own = intersect([{ fromS, toS }], [{ fromS: Math.max(0, work.releaseS), toS: work.dueS ?? Infinity }])[0];
  if (!own) return null;
  const taken = work.placeId === null ? [] : (problem.placesTaken[work.placeId] ?? []);
  const least = work.splittable ? Math.min(work.leastPartS, work.longS) : work.longS;
  return subtract([own], taken).some((gap) => workIn(problem, window, gap) >= least - 1e-6) ? own : null;
}

/**
 * A relaxation of a day's fills: who does which piece in which window, without saying when. A column per piece and window
 * (whole, or seconds with a yes or no for pieces that can be parted). For every stretch between two instants at which
 * something begins or ends, what can lie only within it may not be more than a window, or a place, has of it.
 */
export function fillMilp(problem: FillProblem): Milp {
  const { windows, work, placesTaken } = problem;
  const columns: Column[] = [];
  const rows: Milp['rows'] = [];
  const row = (most: number) => rows.push({ least: null, most }) - 1;
  const lying: { piece: number; window: number; column: number; by: number; within: Stretch }[] = [];
  work.forEach((one, piece) => {
    const once = row(one.splittable ? one.longS : 1);
    const worth = (one.weight * one.likelyS) / 60 / one.longS;
    windows.forEach((_, window) => {
      const within = couldLie(problem, one, window);
      if (!within) return;
      const column = columns.length;
      const by = one.splittable ? 1 : one.longS;
      lying.push({ piece, window, column, by, within });
      columns.push({
        cost: worth * by,
        upper: one.splittable ? one.longS : 1,
        whole: !one.splittable,
        rows: [[once, 1]],
      });
      if (!one.splittable) return;
      const least = Math.min(one.leastPartS, one.longS);
      const [atLeast, atMost] = [rows.push({ least: 0, most: null }) - 1, row(0)];
      columns[column]!.rows.push([atLeast, 1], [atMost, 1]);
      columns.push({
        cost: 0,
        upper: 1,
        whole: true,
        rows: [
          [atLeast, -least],
          [atMost, -one.longS],
        ],
      });
    });
  });
  const limit = (group: typeof lying, free: (within: Stretch) => number) => {
    const begins = [...new Set(group.map(({ within }) => within.fromS))];
    const ends = [...new Set(group.map(({ within }) => within.toS))];
    for (const fromS of begins)
      for (const toS of ends) {
        const inside = group.filter(({ within }) => within.fromS >= fromS && within.toS <= toS);
        if (inside.length < 2) continue;
        const at = row(free({ fromS, toS }));
        for (const { column, by } of inside) columns[column]!.rows.push([at, by]);
      }
  };
  windows.forEach((_, window) =>
    limit(
      lying.filter((one) => one.window === window),
      (within) => workIn(problem, window, within),
    ),
  );
  for (const [placeId, taken] of Object.entries(placesTaken))
    limit(
      lying.filter(({ piece }) => work[piece]!.placeId === placeId),
      (within) => subtract([within], taken).reduce((sum, { fromS, toS }) => sum + toS - fromS, 0),
    );
  return { sense: 'maximize', columns, rows, known: null };
}
