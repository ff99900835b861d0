import type { MeterDto, ResistorDto } from '@/shared/contract/equipment';
import { age } from '../format/clock';
import { useFormats } from '../format/formats';
import { NBSP } from '../format/marks';
import { shortest, signed } from '../format/number';
import { watts } from '../format/quantities';
import { Link } from '../primitives/link';
import { Table, type Column } from '../primitives/table';
import { isOldCheck, meterChecked } from './meter-age';

const editColumn = <R extends { name: string }>(mayChange: boolean, onEdit: (row: R) => void): Column<R>[] =>
  mayChange
    ? [
        {
          key: 'edit',
          title: 'Change',
          quietTitle: true,
          phone: 'value',
          width: 48,
          cell: (row) => (
            <Link
              tight
              align="right"
              kind="small"
              title="edit"
              label={`Edit ${row.name}`}
              onPress={() => onEdit(row)}
            />
          ),
        },
      ]
    : [];

/** Meters with what is known of their error. */
export function MetersTable({
  meters,
  now,
  mayChange,
  onEdit,
}: {
  meters: readonly MeterDto[];
  now: number;
  mayChange: boolean;
  onEdit: (meter: MeterDto) => void;
}) {
  const { zone, marks } = useFormats();
  return (
    <Table
      label="Meters"
      rows={meters}
      rowKey={(meter) => meter.id}
      columns={[
        { key: 'name', title: 'Name', phone: 'name', share: 2, cell: (meter) => meter.name },
        {
          key: 'offset',
          title: 'Reads too high by',
          numeric: true,
          phone: 'detail',
          cell: (meter) => `${signed(meter.offsetMillivolts, 1, marks)}${NBSP}mV`,
        },
        {
          key: 'checked',
          title: 'Last cross-check',
          phone: 'detail',
          share: 1.6,
          cell: (meter) =>
            meter.checkedAt === null
              ? 'never'
              : `${meterChecked(meter, zone, now)}${isOldCheck(meter, now) ? `, ${age(Date.parse(meter.checkedAt), zone, now)} ago` : ''}`,
        },
        ...editColumn(mayChange, onEdit),
      ]}
    />
  );
}

/** Resistors for bringing groups level. */
export function ResistorsTable({
  resistors,
  mayChange,
  onEdit,
}: {
  resistors: readonly ResistorDto[];
  mayChange: boolean;
  onEdit: (resistor: ResistorDto) => void;
}) {
  const { marks } = useFormats();
  return (
    <Table
      label="Levelling resistors"
      rows={resistors}
      rowKey={(resistor) => resistor.id}
      columns={[
        { key: 'name', title: 'Name', phone: 'name', share: 2, cell: (resistor) => resistor.name },
        {
          key: 'ohm',
          title: 'Resistance',
          numeric: true,
          phone: 'detail',
          cell: (resistor) => `${shortest(resistor.ohm, 3, marks)}${NBSP}Ω`,
        },
        {
          key: 'watts',
          title: 'Stands',
          numeric: true,
          phone: 'detail',
          cell: (resistor) => watts(resistor.maxWatts, marks),
        },
        ...editColumn(mayChange, onEdit),
      ]}
    />
  );
}
