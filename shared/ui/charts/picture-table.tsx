import type { TracePlanPoint } from '@/calc/plan-types';
import { ampsNumber, voltsNumber } from '../format/quantities';
import { useFormats } from '../format/formats';
import { Table } from '../primitives/table';
import { pictureRows } from './picture-rows';

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
