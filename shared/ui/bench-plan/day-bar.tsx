import { View } from 'react-native';
import { dayName } from '../format/clock';
import { addDays } from '../format/zone';
import { Button } from '../primitives/button';
import { IconButton } from '../primitives/icon-button';
import { SegmentSwitch } from '../primitives/segment-switch';
import { makeStyles } from '../theme/make-styles';

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
  const word = days === 1 ? 'day' : 'week';
  const before = addDays(day, -days);
  const after = addDays(day, days);
  return (
    <View style={styles.bar}>
      <View style={styles.walk}>
        <IconButton
          icon="back"
          label={`The ${word} before, ${dayName(before, today)}`}
          onPress={() => onChange(before, days)}
        />
        <Button look="line" size="small" title="Today" disabled={day === today} onPress={() => onChange(today, days)} />
        <IconButton
          icon="right"
          label={`The ${word} after, ${dayName(after, today)}`}
          onPress={() => onChange(after, days)}
        />
      </View>
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
  // The arrow, not its target, stands at the edge of the column.
  walk: { flexDirection: 'row', alignItems: 'center', marginLeft: -14 },
}));
