import { chemistryNames, type ModuleTypeDto } from '@/shared/contract/equipment';
import { useFormats } from '../format/formats';
import { EN_DASH } from '../format/marks';
import { clipVolts, clipVoltsNumber, range, ratedAh } from '../format/quantities';
import { Table } from '../primitives/table';

/** Module types with what decides a charge; a row opens its type. */
export function TypesTable({
  types,
  onOpen,
}: {
  types: readonly ModuleTypeDto[];
  onOpen: (type: ModuleTypeDto) => void;
}) {
  const { marks } = useFormats();
  return (
    <Table
      label="Module types"
      rows={types}
      rowKey={(type) => type.id}
      onOpen={onOpen}
      rowLabel={(type) => `Open ${type.name}`}
      columns={[
        { key: 'name', title: 'Name', phone: 'name', share: 1.7, cell: (type) => type.name },
        {
          key: 'chemistry',
          title: 'Chemistry',
          phone: 'detail',
          tone: 'ink2',
          share: 1.7,
          cell: (type) => chemistryNames[type.chemistry],
        },
        {
          key: 'groups',
          title: 'Groups',
          phone: 'detail',
          cell: (type) => `${type.groupsInSeries} × ${type.cellsInParallel}`,
        },
        { key: 'rated', title: 'Rated', numeric: true, phone: 'value', cell: (type) => ratedAh(type.ratedAh, marks) },
        {
          key: 'limits',
          title: 'Limits',
          numeric: true,
          phone: 'none',
          share: 1.3,
          cell: (type) =>
            range(clipVoltsNumber(type.dischargeLimitVolts, marks), clipVoltsNumber(type.chargeLimitVolts, marks), 'V'),
        },
        {
          key: 'shelf',
          title: 'Shelf',
          numeric: true,
          phone: 'none',
          cell: (type) => (type.shelfVolts === null ? EN_DASH : clipVolts(type.shelfVolts, marks)),
        },
        {
          key: 'spares',
          title: 'Spares',
          numeric: true,
          phone: 'none',
          width: 60,
          cell: (type) => String(type.spareCount),
        },
        {
          key: 'charges',
          title: 'Charges',
          numeric: true,
          phone: 'none',
          width: 64,
          cell: (type) => String(type.chargeCount),
        },
      ]}
    />
  );
}
