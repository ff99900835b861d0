import { View } from 'react-native';
import type { SpareReadingDto } from '@/shared/contract/spare';
import { date } from '../format/clock';
import { useFormats } from '../format/formats';
import { EN_DASH } from '../format/marks';
import { celsius, voltsNumber } from '../format/quantities';
import { FullWidth } from '../primitives/full-width';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { drawnSeries, ReadingsPicture } from './readings-picture';

/** Every reading at rest: the picture from two on, and the list, newest first. */
export function ReadingsHistory({
  readings,
  now,
  meterName,
}: {
  /** Newest first. */
  readings: readonly SpareReadingDto[];
  now: number;
  meterName: (id: string) => string | null;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const day = (at: number) => date(at, zone, now).replace(/^\S+\s/, '');
  const oldestFirst = [...readings]
    .reverse()
    .filter(({ groupVolts }) => groupVolts.length === readings[0]?.groupVolts.length);
  const { names } = drawnSeries(oldestFirst);
  return (
    <View>
      <View style={styles.head}>
        <Txt kind="heading" heading={2}>
          Readings
        </Txt>
        <View style={styles.key}>
          {names.map((name, index) => (
            <View key={name} style={styles.key}>
              <View style={[styles.dot, index === 1 && styles.hollow]} />
              <Txt kind="small">{index === names.length - 1 ? `${name}, volts at rest` : name}</Txt>
            </View>
          ))}
        </View>
      </View>
      {oldestFirst.length > 1 ? (
        <FullWidth height={130}>
          {(width) => <ReadingsPicture readings={oldestFirst} width={width} dayOf={day} />}
        </FullWidth>
      ) : null}
      <View role="list" aria-label="Readings" style={styles.list}>
        {readings.map((reading, place) => (
          <View role="listitem" key={reading.id} style={styles.row}>
            <View style={styles.words}>
              <Txt numberOfLines={1}>{day(Date.parse(reading.at))}</Txt>
              <Txt kind="small" tone="ink2" numberOfLines={2}>
                {[
                  reading.by.name.split(' ')[0],
                  reading.note,
                  reading.meterId && meterName(reading.meterId),
                  // Of the older ones a later reading tells what became of them.
                  place === 0 && reading.movedBy && `before ${reading.movedBy.title}`,
                ]
                  .filter(Boolean)
                  .join(', ')}
              </Txt>
              {reading.groupVolts.length > 3 ? (
                <Txt kind="small" tone="ink2">
                  {reading.groupVolts.map((value) => voltsNumber(value, marks)).join('  ')}
                </Txt>
              ) : null}
            </View>
            {(reading.groupVolts.length > 3
              ? [
                  `${voltsNumber(Math.min(...reading.groupVolts), marks)}${EN_DASH}${voltsNumber(Math.max(...reading.groupVolts), marks)}`,
                ]
              : reading.groupVolts.map((value) => voltsNumber(value, marks))
            ).map((text, group) => (
              <Txt key={group} kind="numS" nowrap align="right">
                {text}
              </Txt>
            ))}
            <Txt kind="numS" nowrap tone="ink2" align="right" style={styles.degrees}>
              {reading.celsius === null ? '–' : celsius(reading.celsius)}
            </Txt>
          </View>
        ))}
      </View>
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  head: { flexDirection: 'row', justifyContent: 'space-between', alignItems: 'center', columnGap: 12, marginBottom: 6 },
  key: { flexDirection: 'row', alignItems: 'center', columnGap: 6 },
  dot: { width: 10, height: 10, borderRadius: 5, backgroundColor: colors.ink, marginLeft: 6 },
  hollow: { backgroundColor: 'transparent', borderWidth: 2, borderColor: colors.ink },
  list: { marginTop: 4 },
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    columnGap: 12,
    minHeight: 40,
    paddingVertical: 4,
    borderTopWidth: 1,
    borderTopColor: colors.line,
  },
  words: { flex: 1, minWidth: 0 },
  degrees: { minWidth: 48 },
}));
