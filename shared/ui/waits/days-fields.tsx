import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { DayField } from '../workshop/day-field';

/** While a year is typed it is 2, 20 and 202 for a moment. */
const FIRST_DAY = '2000-01-01';

/** First and last day, both counted; told on as soon as both are there and in their order. What is typed stays. */
export function DaysFields({
  from,
  to,
  latest,
  onDays,
}: {
  from: string;
  to: string;
  latest: string;
  onDays: (from: string, to: string) => void;
}) {
  const [typed, setTyped] = useState({ from, to });
  const change = (next: { from: string; to: string }) => {
    setTyped(next);
    if (next.from >= FIRST_DAY && next.to !== '' && next.from <= next.to) onDays(next.from, next.to);
  };
  const turned = typed.from !== '' && typed.to !== '' && typed.from > typed.to;
  return (
    <View style={styles.row}>
      <View style={styles.field}>
        <DayField
          label="First day"
          value={typed.from}
          latest={latest}
          onChange={(day) => change({ ...typed, from: day })}
        />
      </View>
      <View style={styles.field}>
        <DayField
          label="Last day"
          value={typed.to}
          latest={latest}
          onChange={(day) => change({ ...typed, to: day })}
          {...(turned ? { error: 'This lies before the first day.' } : {})}
        />
      </View>
    </View>
  );
}

const styles = StyleSheet.create({
  row: { flexDirection: 'row', flexWrap: 'wrap', columnGap: 12, rowGap: 12 },
  field: { flexGrow: 1, flexBasis: 150, maxWidth: 240 },
});
