import { View } from 'react-native';
import type { TracePlanPoint } from '@/calc/plan-types';
import { EN_DASH } from '../format/marks';
import { ampsNumber, voltsNumber } from '../format/quantities';
import { useFormats } from '../format/formats';
import { Table, type Column } from '../primitives/table';
import { Txt } from '../primitives/txt';
import type { PictureReading } from './charge-picture-layout';
import { pictureRows, type PictureRow } from './picture-rows';

/** The table twin of a charge picture: the course at even steps with its band, and the readings that stand on it. */
export function PictureTable({
  trace,
  at,
  stepS = 1800,
  readings = [],
}: {
  trace: readonly TracePlanPoint[];
  /** Seconds of the trace in words: a clock. */
  at: (s: number) => string;
  stepS?: number;
  readings?: readonly PictureReading[];
}) {
  const { marks } = useFormats();
  const rows = pictureRows(trace, stepS);
  const banded = rows.some((row) => row.restBand !== null);
  const band: Column<PictureRow>[] = banded
    ? [
        {
          key: 'band',
          title: 'Rest between, V',
          numeric: true,
          share: 1.6,
          tone: 'ink2',
          cell: ({ restBand }) =>
            restBand === null
              ? EN_DASH
              : `${voltsNumber(restBand.low, marks)}${EN_DASH}${voltsNumber(restBand.high, marks)}`,
        },
      ]
    : [];
  return (
    <View style={{ rowGap: 16 }}>
      <Table
        label="Planned volts and amps"
        keepOnPhone
        rows={rows}
        rowKey={(row) => String(row.s)}
        columns={[
          { key: 'at', title: 'Time', numeric: false, cell: (row) => at(row.s) },
          { key: 'clips', title: 'At the clips, V', numeric: true, cell: (row) => voltsNumber(row.clipVolts, marks) },
          { key: 'rest', title: 'At rest, V', numeric: true, cell: (row) => voltsNumber(row.restVolts, marks) },
          ...band,
          { key: 'amps', title: 'Amps', numeric: true, cell: (row) => ampsNumber(row.amps, marks) },
        ]}
      />
      {readings.length > 0 ? <ReadingsTable readings={readings} at={at} /> : null}
    </View>
  );
}

/** What was read, beside what the plan says; an odd one says so in a word. */
function ReadingsTable({ readings, at }: { readings: readonly PictureReading[]; at: (s: number) => string }) {
  const { marks } = useFormats();
  return (
    <View>
      <Txt kind="label">Readings</Txt>
      <Table
        label="Readings on the picture"
        keepOnPhone
        rows={[...readings].sort((a, b) => a.s - b.s)}
        rowKey={(row) => `${row.s} ${row.volts} ${row.amps}`}
        rowTone={(row) => (row.odd ? 'alarmTint' : null)}
        columns={[
          { key: 'at', title: 'Time', cell: (row) => `${at(row.s)}${row.odd ? ', odd' : ''}` },
          {
            key: 'clips',
            title: 'At the clips, V',
            numeric: true,
            cell: (row) => (row.volts == null ? EN_DASH : voltsNumber(row.volts, marks)),
          },
          {
            key: 'amps',
            title: 'Amps',
            numeric: true,
            cell: (row) => (row.amps == null ? EN_DASH : ampsNumber(row.amps, marks)),
          },
        ]}
      />
    </View>
  );
}
