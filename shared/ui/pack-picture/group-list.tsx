import { useFormats } from '../format/formats';
import { signed } from '../format/number';
import { deviation, volts } from '../format/quantities';
import { BottomSheet } from '../primitives/bottom-sheet';
import { Table } from '../primitives/table';

/** Every group of a reading in a table: for readers, and for whoever looks for one of them. Odd ones stand out. */
export function GroupList({
  groupVolts,
  medianVolts,
  odd,
  positions,
  groupAmpHours,
  open,
  onClose,
}: {
  groupVolts: readonly number[];
  medianVolts: number;
  odd: readonly number[];
  positions: readonly string[];
  groupAmpHours: readonly number[] | null;
  open: boolean;
  onClose: () => void;
}) {
  const { marks } = useFormats();
  const wrong = new Set(odd);
  return (
    <BottomSheet open={open} title={`${groupVolts.length} groups`} onClose={onClose}>
      <Table
        label="Groups of the pack"
        keepOnPhone
        rows={open ? groupVolts.map((value, group) => ({ value, group })) : []}
        rowKey={({ group }) => String(group)}
        rowTone={({ group }) => (wrong.has(group) ? 'alarmTint' : null)}
        columns={[
          { key: 'group', title: 'Group', width: 56, cell: ({ group }) => `G${group + 1}` },
          {
            key: 'module',
            title: 'Module',
            cell: ({ group }) => `${positions[group] ?? ''}${wrong.has(group) ? ', odd' : ''}`,
          },
          { key: 'volts', title: 'Volts', numeric: true, cell: ({ value }) => volts(value, marks) },
          { key: 'off', title: 'Off', numeric: true, cell: ({ value }) => deviation(value - medianVolts) },
          ...(groupAmpHours
            ? [
                {
                  key: 'ah',
                  title: 'Ah',
                  numeric: true,
                  cell: ({ group }: { group: number }) => signed(groupAmpHours[group] ?? 0, 1, marks),
                },
              ]
            : []),
        ]}
      />
    </BottomSheet>
  );
}
