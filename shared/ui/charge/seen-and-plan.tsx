import type { ChargeDto, ReadingDto } from '@/shared/contract/charge';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { EN_DASH } from '../format/marks';
import { ampsNumber, celsiusNumber, clipVoltsNumber } from '../format/quantities';
import { Table } from '../primitives/table';
import { Txt } from '../primitives/txt';

interface Row {
  name: string;
  volts: number | null;
  amps: number | null;
  celsius: number | null;
}

/** The last reading that counts. */
export const lastReading = (charge: ChargeDto): ReadingDto | null =>
  charge.readings
    .filter((reading) => reading.replacedBy === null)
    .sort((a, b) => a.at.localeCompare(b.at))
    .at(-1) ?? null;

/** The last reading beside what the plan expects at that instant. */
export function SeenAndPlan({ charge, now }: { charge: ChargeDto; now: number }) {
  const { zone, marks } = useFormats();
  const last = lastReading(charge);
  if (!last)
    return (
      <Txt kind="small" tone="ink2">
        No reading yet. The times are the plan’s until the first one.
      </Txt>
    );
  const rows: Row[] = [
    { name: 'Seen', volts: last.terminalVolts, amps: last.amps, celsius: last.celsius },
    ...(charge.expected
      ? [
          {
            name: 'Plan',
            volts: charge.expected.terminalVolts,
            amps: charge.expected.amps,
            celsius: charge.expected.celsius,
          },
        ]
      : []),
  ];
  return (
    <Table
      label={`Reading of ${moment(Date.parse(last.at), zone, now, marks)} beside the plan`}
      rows={rows}
      rowKey={(row) => row.name}
      keepOnPhone
      columns={[
        { key: 'name', title: `Read ${moment(Date.parse(last.at), zone, now, marks)}`, cell: (row) => row.name },
        {
          key: 'volts',
          title: 'Volts',
          numeric: true,
          cell: (row) => (row.volts === null ? EN_DASH : clipVoltsNumber(row.volts, marks)),
        },
        {
          key: 'amps',
          title: 'Amps',
          numeric: true,
          cell: (row) => (row.amps === null ? EN_DASH : ampsNumber(Math.abs(row.amps), marks)),
        },
        {
          key: 'celsius',
          title: '°C',
          numeric: true,
          cell: (row) => (row.celsius === null ? EN_DASH : celsiusNumber(row.celsius)),
        },
      ]}
    />
  );
}
