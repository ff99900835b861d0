import type { TracePlanPoint } from '@/calc/plan-types';

export interface PictureRow {
  s: number;
  clipVolts: number;
  restVolts: number;
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
    const a = trace[after - 1] ?? b;
    const share = b.s === a.s ? 0 : (s - a.s) / (b.s - a.s);
    const between = (from: number, to: number) => from + share * (to - from);
    rows.push({
      s,
      clipVolts: between(a.clipVolts, b.clipVolts),
      restVolts: between(a.restVolts, b.restVolts),
      amps: between(a.amps, b.amps),
    });
  }
  return [...rows, last];
}
