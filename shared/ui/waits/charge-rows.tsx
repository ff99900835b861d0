import type { WaitRowDto } from '@/shared/contract/waits';
import { moment } from '../format/clock';
import { durationTable } from '../format/duration';
import { useFormats } from '../format/formats';
import { Table } from '../primitives/table';
import { useBreakpoint } from '../theme/use-breakpoint';
import { againstPlan, wayNames } from './wait-words';

const table = (seconds: number): string => durationTable(seconds, 'minute');

/** The charges behind a number, each the way to its page. */
export function ChargeRows({
  rows,
  now,
  onOpen,
}: {
  rows: readonly WaitRowDto[];
  now: number;
  onOpen: (chargeId: string) => void;
}) {
  const { zone, marks } = useFormats();
  const phone = useBreakpoint() === 'phone';
  return (
    <Table
      label="Charges"
      rows={rows}
      rowKey={(row) => row.chargeId}
      rowLabel={(row) => `Open ${row.title}`}
      onOpen={(row) => onOpen(row.chargeId)}
      columns={[
        { key: 'title', title: 'Charge', phone: 'name', cell: (row) => row.title },
        { key: 'type', title: 'Module type', phone: 'detail', share: 1.5, cell: (row) => row.typeName },
        { key: 'channel', title: 'Channel', phone: 'detail', share: 0.9, cell: (row) => row.channelName },
        { key: 'who', title: 'Technician', phone: 'none', cell: (row) => row.technicianName.split(' ')[0] ?? '' },
        { key: 'way', title: 'Way', phone: 'none', share: 1.4, cell: (row) => wayNames[row.way] },
        {
          key: 'ready',
          title: 'Ready',
          numeric: true,
          phone: 'detail',
          share: 1.3,
          cell: (row) => (phone ? 'ready ' : '') + moment(Date.parse(row.readyAt), zone, now, marks),
        },
        { key: 'wait', title: 'Wait', numeric: true, phone: 'value', share: 0.6, cell: (row) => table(row.waitS) },
        { key: 'used', title: 'Used', numeric: true, phone: 'none', share: 0.6, cell: (row) => table(row.usedS) },
        {
          key: 'lost',
          title: 'Lost',
          numeric: true,
          phone: 'detail',
          share: 0.6,
          cell: (row) => (phone ? `lost ${table(row.lostS)}` : table(row.lostS)),
        },
        {
          key: 'plan',
          title: 'Against the plan',
          numeric: true,
          phone: 'none',
          cell: (row) => againstPlan(row.actualS - row.plannedS),
        },
        {
          key: 'inside',
          title: 'In its band',
          phone: 'none',
          share: 0.6,
          cell: (row) => (row.insideBand ? 'yes' : 'no'),
        },
      ]}
    />
  );
}
