import type { TracePlanPoint } from '@/calc/plan-types';
import { ampsNumber, voltsNumber } from '../format/quantities';
import { useFormats } from '../format/formats';
import { Table } from '../primitives/table';

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

/** The table twin of a charge picture. */
export function PictureTable({
  trace,
  at,
  stepS = 1800,
}: {
  trace: readonly TracePlanPoint[];
  /** Seconds of the trace in words: a clock. */
  at: (s: number) => string;
  stepS?: number;
}) {
  const { marks } = useFormats();
  return (
    <Table
      label="Planned volts and amps"
      keepOnPhone
      rows={pictureRows(trace, stepS)}
      rowKey={(row) => String(row.s)}
      columns={[
        { key: 'at', title: 'Time', numeric: false, cell: (row) => at(row.s) },
        { key: 'clips', title: 'At the clips, V', numeric: true, cell: (row) => voltsNumber(row.clipVolts, marks) },
        { key: 'rest', title: 'At rest, V', numeric: true, cell: (row) => voltsNumber(row.restVolts, marks) },
        { key: 'amps', title: 'Amps', numeric: true, cell: (row) => ampsNumber(row.amps, marks) },
      ]}
    />
  );
}
