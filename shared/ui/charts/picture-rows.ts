import type { TracePlanPoint } from '@/calc/plan-types';

export interface PictureRow {
  s: number;
  clipVolts: number;
  restVolts: number;
  /** Where the rest voltage may be by then, 10 and 90 %, V; null where the trace does not tell. */
  restBand: { low: number; high: number } | null;
  amps: number;
}

/** The trace at even steps, its last point included: the rows of the table beside a picture. */
export function pictureRows(trace: readonly TracePlanPoint[], stepS: number): PictureRow[] {
  const last = trace.at(-1);
  if (!last) return [];
  const rows: PictureRow[] = [];
  for (let s = trace[0]?.s ?? 0; s < last.s - 1; s += stepS) {
    const after = trace.findIndex((point) => point.s >= s);
    const b = trace[after] ?? last;
    rows.push(rowBetween(trace[after - 1] ?? b, b, s));
  }
  return [...rows, rowBetween(last, last, last.s)];
}

function rowBetween(a: TracePlanPoint, b: TracePlanPoint, s: number): PictureRow {
  const share = b.s === a.s ? 0 : (s - a.s) / (b.s - a.s);
  const between = (from: number, to: number) => from + share * (to - from);
  const [from, to] = [bandAt(a), bandAt(b)];
  return {
    s,
    clipVolts: between(a.clipVolts, b.clipVolts),
    restVolts: between(a.restVolts, b.restVolts),
    restBand: from && to ? { low: between(from.low, to.low), high: between(from.high, to.high) } : (to ?? from),
    amps: between(a.amps, b.amps),
  };
}

const bandAt = ({ restLowVolts, restHighVolts }: TracePlanPoint): { low: number; high: number } | null =>
  restLowVolts === undefined || restHighVolts === undefined ? null : { low: restLowVolts, high: restHighVolts };

/** The band of the rest voltage along the trace, for the picture; undefined where the trace does not tell it. */
export function restBandOf(trace: readonly TracePlanPoint[]): { s: number; low: number; high: number }[] | undefined {
  const points = trace.flatMap((point) => {
    const band = bandAt(point);
    return band === null ? [] : [{ s: point.s, ...band }];
  });
  return points.length > 1 ? points : undefined;
}
