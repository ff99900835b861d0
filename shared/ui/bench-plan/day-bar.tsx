import { View } from 'react-native';
import { SegmentSwitch } from '../primitives/segment-switch';
import { makeStyles } from '../theme/make-styles';
import { DayWalk } from './day-walk';

/** Which days are shown: one or seven, and the ones before and after. */
export function DayBar({
  day,
  days,
  today,
  onChange,
}: {
  /** First day shown, 'YYYY-MM-DD'. */
  day: string;
  days: 1 | 7;
  today: string;
  onChange: (day: string, days: 1 | 7) => void;
}) {
  const styles = useStyles();
  return (
    <View style={styles.bar}>
      <DayWalk day={day} days={days} today={today} onGo={(next) => onChange(next, days)} />
      <SegmentSwitch
        label="Days shown"
        fit="words"
        value={days === 1 ? 'day' : 'week'}
        segments={[
          { value: 'day', label: 'Day' },
          { value: 'week', label: 'Week' },
        ]}
        onChange={(next) => onChange(day, next === 'day' ? 1 : 7)}
      />
    </View>
  );
}

const useStyles = makeStyles(() => ({
  bar: {
    flexDirection: 'row',
    alignItems: 'center',
    justifyContent: 'space-between',
    columnGap: 8,
    rowGap: 8,
    flexWrap: 'wrap',
  },
}));
