import { View } from 'react-native';
import { useFormats } from '../format/formats';
import { Table } from '../primitives/table';
import { Txt } from '../primitives/txt';
import { useBreakpoint } from '../theme/use-breakpoint';
import { learnedRows, type LearnedFigures } from './learned-rows';

/** Learned from this charge: each figure with its band, beside what was known before it. */
export function LearnedPanel({ learned }: { learned: LearnedFigures }) {
  const { marks } = useFormats();
  const rows = learnedRows(learned, marks);
  // Two bands do not fit beside a name on the phone: there the earlier one stands under it.
  const phone = useBreakpoint() === 'phone';
  if (rows.length === 0) return null;
  return (
    <View>
      <Txt kind="heading" heading={2}>
        Learned from this charge
      </Txt>
      <Table
        label="Learned from this charge"
        rows={rows}
        rowKey={(row) => row.name}
        columns={[
          { key: 'name', title: 'Figure', share: 1.2, cell: (row) => row.name },
          { key: 'now', title: 'With its readings', numeric: true, cell: (row) => row.now },
          {
            key: 'before',
            title: 'Before',
            numeric: true,
            tone: 'ink2',
            phone: 'detail',
            cell: (row) => (phone ? `before ${row.before}` : row.before),
          },
        ]}
      />
    </View>
  );
}
