import { View } from 'react-native';
import type { ReadingDto } from '@/shared/contract/charge';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { EN_DASH } from '../format/marks';
import { ampsNumber, celsiusNumber, clipVoltsNumber } from '../format/quantities';
import { Link } from '../primitives/link';
import { Table } from '../primitives/table';
import { Txt } from '../primitives/txt';
import type { WaitingReadingItem } from './waiting-items';

interface Row {
  key: string;
  at: string;
  volts: number | null;
  amps: number | null;
  celsius: number | null;
  sent: boolean;
}

/** Readings that wait on this device, latest first, and under them the last one that was sent. */
export function WaitingReadings({
  last,
  waiting,
  now,
  device,
  onRemove,
}: {
  /** The last one that was sent; null: none. */
  last: ReadingDto | null;
  waiting: readonly WaitingReadingItem[];
  now: number;
  /** 'phone' or 'device'. */
  device: string;
  onRemove: (key: string) => void;
}) {
  const { zone, marks } = useFormats();
  if (waiting.length === 0) return null;
  const number = (value: number | null | undefined, words: (value: number) => string) =>
    value === null || value === undefined ? EN_DASH : words(value);
  const rows: Row[] = [
    ...[...waiting]
      .sort((a, b) => b.input.at.localeCompare(a.input.at))
      .map(({ key, input }) => ({
        key,
        at: input.at,
        volts: input.terminalVolts ?? null,
        amps: input.amps ?? null,
        celsius: input.celsius ?? null,
        sent: false,
      })),
    ...(last
      ? [{ key: last.id, at: last.at, volts: last.terminalVolts, amps: last.amps, celsius: last.celsius, sent: true }]
      : []),
  ];
  const cell = (row: Row, text: string) => (
    <Txt kind="numS" tone={row.sent ? 'ink3' : 'ink'} align="right" nowrap>
      {text}
    </Txt>
  );
  return (
    <View>
      <Table
        label={`Readings waiting on this ${device}`}
        rows={rows}
        rowKey={(row) => row.key}
        rowHeight={48}
        keepOnPhone
        columns={[
          {
            key: 'at',
            title: 'Read',
            share: 1.3,
            cell: (row) => (
              <Txt kind="numS" tone={row.sent ? 'ink3' : 'ink'} nowrap>
                {moment(Date.parse(row.at), zone, now, marks)}
              </Txt>
            ),
          },
          {
            key: 'volts',
            title: 'Volts',
            numeric: true,
            cell: (row) =>
              cell(
                row,
                number(row.volts, (value) => clipVoltsNumber(value, marks)),
              ),
          },
          {
            key: 'amps',
            title: 'Amps',
            numeric: true,
            cell: (row) =>
              cell(
                row,
                number(row.amps, (value) => ampsNumber(Math.abs(value), marks)),
              ),
          },
          { key: 'celsius', title: '°C', numeric: true, cell: (row) => cell(row, number(row.celsius, celsiusNumber)) },
          {
            key: 'remove',
            title: 'Remove',
            quietTitle: true,
            numeric: true,
            share: 1.2,
            cell: (row) =>
              row.sent ? (
                <Txt kind="small" tone="ink2">
                  sent
                </Txt>
              ) : (
                <Link
                  title="remove"
                  kind="small"
                  align="right"
                  label={`Remove the reading of ${moment(Date.parse(row.at), zone, now, marks)}`}
                  onPress={() => onRemove(row.key)}
                />
              ),
          },
        ]}
      />
    </View>
  );
}
