import { useState } from 'react';
import { View } from 'react-native';
import type { RepairEventDto } from '@/shared/contract/repair';
import { firstName } from '../charge/card-model';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';

/** More are shown on demand. */
const shownFirst = 8;

/** What happened to the repair, latest first, with who did it. */
export function EventsPart({ events, now }: { events: readonly RepairEventDto[]; now: number }) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const [all, setAll] = useState(false);
  const latest = [...events].sort((a, b) => b.at.localeCompare(a.at));
  if (latest.length === 0) return null;
  const shown = all ? latest : latest.slice(0, shownFirst);
  return (
    <View>
      <Txt kind="heading" heading={2}>
        What happened
      </Txt>
      <View role="list">
        {shown.map((event) => (
          <View key={event.id} role="listitem" style={styles.row}>
            <Txt kind="numXS" nowrap style={marks.hour12 ? styles.twelve : styles.time}>
              {moment(Date.parse(event.at), zone, now, marks)}
            </Txt>
            <Txt nowrap style={styles.who} numberOfLines={1}>
              {event.by ? firstName(event.by.name) : ''}
            </Txt>
            <Txt tone="ink2" style={styles.words}>
              {event.text}
            </Txt>
          </View>
        ))}
      </View>
      {latest.length > shown.length ? (
        <Link title={`All ${latest.length} entries`} onPress={() => setAll(true)} />
      ) : null}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  row: {
    flexDirection: 'row',
    alignItems: 'baseline',
    columnGap: 12,
    paddingVertical: 7,
    borderTopWidth: 1,
    borderTopColor: colors.line,
  },
  // 'Mon 12:53' and 'Mon 12:53 pm': the names stand under each other with either clock.
  time: { width: 84 },
  twelve: { width: 106 },
  who: { width: 64 },
  words: { flex: 1, minWidth: 0 },
}));
