import type { BenchProblem, BenchSolution } from '@/calc/index';
import { CHANNEL_KINDS, QUARTER_S } from '../../calc/reference/bench-instances';
import type { Column, Milp } from './solve';

const HOUR_S = 3600;
/** Starts after this are taken together: a charge begun then costs what it costs at this time and holds nothing, s. */
const HORIZON_S = 72 * HOUR_S;

/**
 * The time-indexed model of a drawn workshop: one column per charge, kind of channel and quarter of an hour to start at,
 * one row per charge (it is begun once) and one per kind and quarter (no more charges than channels that are not taken).
 * All times are whole quarters and all lengths too, so that the best plan is among its solutions; channels of one kind
 * are alike, so that counting them is enough. Weighted tardiness in hours.
 */
export function benchMilp({ taken, jobs }: BenchProblem, plan: BenchSolution): Milp {
  const kindOf = CHANNEL_KINDS.flatMap(({ count }, kind) => Array.from({ length: count }, () => kind));
  const steps = HORIZON_S / QUARTER_S;
  const rows: Milp['rows'] = jobs.map(() => ({ least: 1, most: 1 }));
  const rowOf = (kind: number, step: number) => jobs.length + kind * steps + step;
  CHANNEL_KINDS.forEach((_, kind) => {
    for (let step = 0; step < steps; step += 1) {
      const at = step * QUARTER_S;
      const free = taken.filter(
        (list, channel) => kindOf[channel] === kind && !list.some(({ fromS, toS }) => fromS <= at && at < toS),
      );
      rows.push({ least: null, most: free.length });
    }
  });
  const columns: Column[] = [];
  const known: number[] = [];
  jobs.forEach(({ id, dueS, weight, alternatives }, job) => {
    const cost = (endS: number) => (weight * Math.max(0, endS - (dueS ?? Infinity))) / HOUR_S;
    const placed = plan.placements.find(({ jobId }) => jobId === id)!;
    CHANNEL_KINDS.forEach((_, kind) => {
      const one = alternatives.find(({ channels }) => kindOf[channels[0]!] === kind);
      if (!one) return;
      for (const { fromS, toS } of one.mayStart)
        for (let start = fromS; start <= toS && start < HORIZON_S; start += QUARTER_S) {
          const held: [number, number][] = [[job, 1]];
          for (let at = start; at < Math.min(HORIZON_S, start + one.busyS); at += QUARTER_S)
            held.push([rowOf(kind, at / QUARTER_S), 1]);
          columns.push({ cost: cost(start + one.guardS), upper: 1, whole: true, rows: held });
          const isIt = placed.startS === start && kindOf[alternatives[placed.alternative]!.channels[0]!] === kind;
          known.push(isIt ? 1 : 0);
        }
    });
    const least = Math.min(...alternatives.map(({ guardS }) => guardS));
    columns.push({ cost: cost(HORIZON_S + least), upper: 1, whole: true, rows: [[job, 1]] });
    known.push(placed.startS >= HORIZON_S ? 1 : 0);
  });
  return { sense: 'minimize', columns, rows, known };
}
