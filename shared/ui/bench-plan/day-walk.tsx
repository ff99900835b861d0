import { View } from 'react-native';
import { dayName } from '../format/clock';
import { addDays } from '../format/zone';
import { Button } from '../primitives/button';
import { IconButton } from '../primitives/icon-button';

/** The days before, today, and the days after. */
export function DayWalk({
  day,
  days,
  today,
  onGo,
}: {
  /** First day shown, 'YYYY-MM-DD'. */
  day: string;
  days: 1 | 7;
  today: string;
  onGo: (day: string) => void;
}) {
  const word = days === 1 ? 'day' : 'week';
  const before = addDays(day, -days);
  const after = addDays(day, days);
  return (
    // The arrow, not its target, stands at the edge of the column.
    <View style={{ flexDirection: 'row', alignItems: 'center', marginLeft: -14 }}>
      <IconButton icon="back" label={`The ${word} before, ${dayName(before, today)}`} onPress={() => onGo(before)} />
      <Button look="line" size="small" title="Today" disabled={day === today} onPress={() => onGo(today)} />
      <IconButton icon="right" label={`The ${word} after, ${dayName(after, today)}`} onPress={() => onGo(after)} />
    </View>
  );
}
