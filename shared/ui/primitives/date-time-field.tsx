import { StyleSheet, View } from 'react-native';
import { dayOptions } from '../format/choices';
import { Select } from './select';
import { TimeField } from './time-field';

/** A day ('2026-06-09') and a time of day as typed. `instantOfDay` and `parseTimeOfDay` make an instant of it. */
export interface DayAndTime {
  day: string;
  time: string;
}

/** An instant in the workshop's zone: the day from a list, the time typed or picked. */
export function DateTimeField({
  label,
  dayLabel = 'Day',
  value,
  onChange,
  onBlur,
  today,
  from = 0,
  to = 14,
  error,
  hint,
}: {
  label: string;
  dayLabel?: string;
  value: DayAndTime;
  onChange: (value: DayAndTime) => void;
  onBlur?: () => void;
  /** Today in the workshop's zone, 'YYYY-MM-DD' (`dayOf`). */
  today: string;
  /** First and last day offered, counted from today; negative for the past. */
  from?: number;
  to?: number;
  error?: string;
  hint?: string;
}) {
  return (
    <View style={styles.row}>
      <View style={styles.half}>
        <TimeField
          label={label}
          value={value.time}
          error={error}
          hint={hint}
          onChangeText={(time) => onChange({ ...value, time })}
          onBlur={onBlur}
        />
      </View>
      <View style={styles.half}>
        <Select
          label={dayLabel}
          value={value.day}
          options={dayOptions(today, from, to)}
          onChange={(day) => onChange({ ...value, day })}
        />
      </View>
    </View>
  );
}

const styles = StyleSheet.create({
  row: { flexDirection: 'row', flexWrap: 'wrap', columnGap: 12, rowGap: 12 },
  // Narrower than this '17:30' runs under its clock: in the desk's narrow column the day goes below.
  half: { flex: 1, minWidth: 140 },
});
