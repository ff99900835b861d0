import { View } from 'react-native';
import type { CompareWaitsDto, WaitPeriodDto } from '@/shared/contract/waits';
import { date } from '../format/clock';
import { duration } from '../format/duration';
import { useFormats } from '../format/formats';
import { EN_DASH } from '../format/marks';
import { fixed } from '../format/number';
import { share } from '../format/quantities';
import { instantOfDay } from '../format/zone';
import { Table } from '../primitives/table';
import { Txt } from '../primitives/txt';
import { chargesWord, fewCharges, usedShare } from './wait-words';

/** How it is found whether a difference may be chance. */
const method =
  'The medians of all charges of both periods. The interval: both drawn again and again from themselves (bootstrap, 95 %). The rank test (Mann–Whitney, two-sided) asks whether one of them tends to wait longer. Called clear only where p is under 0.05 and the interval does not hold 0.';

interface Line {
  name: string;
  of: (period: WaitPeriodDto) => string;
}
const lines: Line[] = [
  { name: 'Charges', of: ({ charges }) => String(charges) },
  { name: 'Lost, h a week', of: ({ lostHoursPerWeek }) => fixed(lostHoursPerWeek, 1) },
  {
    name: 'Used',
    of: (period) => {
      const used = usedShare(period);
      return used === null ? '–' : share(used);
    },
  },
  { name: 'Half under', of: ({ few, medianS }) => (few ? '–' : duration(medianS, 'minute')) },
  { name: '9 of 10 under', of: ({ few, p90S }) => (few ? '–' : duration(p90S, 'minute')) },
];

/** Two periods side by side, with what may be said of their difference and how it was found. */
export function Comparison({ found, today }: { found: CompareWaitsDto; today: string }) {
  const { zone } = useFormats();
  const { before, then, difference } = found;
  const at = (day: string) => instantOfDay(day, 12 * 60, zone);
  const days = ({ from, to }: WaitPeriodDto) => {
    const words = (day: string) => date(at(day), zone, at(today)).replace(/^\S+\s/, '');
    return `${words(from)} ${EN_DASH} ${words(to)}`;
  };
  const few = [before, then].filter((period) => period.few);
  return (
    <View style={{ rowGap: 8 }}>
      {difference ? (
        <Txt bold={difference.clear}>{difference.text}</Txt>
      ) : (
        <Txt>
          {`No difference is reckoned: fewer than ${fewCharges} charges in ${few.map((period) => `${days(period)} (${chargesWord(period.charges)})`).join(' and in ')}.`}
        </Txt>
      )}
      <Table
        label="Two periods side by side"
        keepOnPhone
        rows={lines}
        rowKey={({ name }) => name}
        columns={[
          { key: 'name', title: '', quietTitle: true, cell: ({ name }) => name },
          { key: 'before', title: days(before), numeric: true, cell: ({ of }) => of(before) },
          { key: 'then', title: days(then), numeric: true, cell: ({ of }) => of(then) },
        ]}
      />
      {difference ? (
        <Txt kind="small" tone="ink2">
          {method}
        </Txt>
      ) : null}
    </View>
  );
}
