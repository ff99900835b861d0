import { useState } from 'react';
import { View } from 'react-native';
import type { ChargeDto, ReadingDto } from '@/shared/contract/charge';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { amps, celsius, clipVolts, voltsNumber } from '../format/quantities';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';

const readingWords = (reading: ReadingDto, marks: Parameters<typeof clipVolts>[1]): string =>
  [
    reading.terminalVolts === null ? '' : clipVolts(reading.terminalVolts, marks),
    reading.amps === null ? '' : amps(reading.amps, marks),
    reading.celsius === null ? '' : celsius(reading.celsius),
    reading.groupVolts ? `groups ${reading.groupVolts.map((volts) => voltsNumber(volts, marks)).join(' ')} V` : '',
  ]
    .filter(Boolean)
    .join(' · ');

/** With what it was read and where the clips were: 'with Hand meter 1 at the module', 'off the charger’s display'. */
export function takenWords(
  reading: Pick<ReadingDto, 'meterId' | 'takenAt'> & { source?: ReadingDto['source'] },
  meters: readonly { id: string; name: string }[],
): string {
  const { meterId, takenAt } = reading;
  const place = takenAt === null ? '' : ` at the ${takenAt}`;
  if (reading.source === 'file') return `out of a file${takenAt === null ? '' : `, volts${place}`}`;
  if (meterId === null) return `off the charger’s display${takenAt === null ? '' : `, sensed${place}`}`;
  return `with ${meters.find((meter) => meter.id === meterId)?.name ?? 'a meter that is gone'}${place}`;
}

/** All readings, latest first. A corrected one stays, struck through, with who changed it and why. */
export function ReadingLog({
  charge,
  now,
  meters,
  onCorrect,
}: {
  charge: ChargeDto;
  now: number;
  meters: readonly { id: string; name: string }[];
  onCorrect: (reading: ReadingDto) => void;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const [all, setAll] = useState(false);
  const readings = [...charge.readings].sort((a, b) => b.at.localeCompare(a.at));
  const shown = all ? readings : readings.slice(0, readingsShown);
  if (readings.length === 0) return null;
  return (
    <View>
      <Txt kind="heading" heading={2}>
        Readings
      </Txt>
      {shown.map((reading) => (
        <View key={reading.id} style={styles.row}>
          <View style={styles.words}>
            <Txt style={reading.replacedBy ? styles.struck : undefined} tone={reading.replacedBy ? 'ink3' : 'ink'}>
              {readingWords(reading, marks)}
            </Txt>
            <Txt kind="small" tone="ink2">
              {`${moment(Date.parse(reading.at), zone, now, marks)}, ${reading.by.name.split(' ')[0]}, ${takenWords(reading, meters)}${reading.replacedBy ? ', corrected since' : ''}${reading.replaces ? ', a correction' : ''}${reading.reason ? `: ${reading.reason}` : ''}`}
            </Txt>
          </View>
          {reading.mayCorrect && !reading.replacedBy ? (
            <Link
              title="correct"
              label={`Correct the reading of ${moment(Date.parse(reading.at), zone, now, marks)}`}
              onPress={() => onCorrect(reading)}
            />
          ) : null}
        </View>
      ))}
      {readings.length > shown.length ? (
        <Link title={`All ${readings.length} readings`} onPress={() => setAll(true)} />
      ) : null}
    </View>
  );
}

/** More are shown on demand. */
const eventsShown = 8;
const readingsShown = 6;

/** What happened to the charge, latest first, with who did it. */
export function EventLog({ charge, now }: { charge: ChargeDto; now: number }) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const [all, setAll] = useState(false);
  const events = [...charge.events].sort((a, b) => b.at.localeCompare(a.at));
  if (events.length === 0) return null;
  const shown = all ? events : events.slice(0, eventsShown);
  return (
    <View>
      <Txt kind="heading" heading={2}>
        What happened
      </Txt>
      {shown.map((event) => (
        <View key={event.id} style={styles.row}>
          <Txt kind="small" tone="ink2" nowrap style={styles.time}>
            {moment(Date.parse(event.at), zone, now, marks)}
          </Txt>
          <Txt kind="small" style={styles.words}>
            {`${event.text}${event.by ? ` ${event.by.name.split(' ')[0]}.` : ''}`}
          </Txt>
        </View>
      ))}
      {events.length > shown.length ? (
        <Link title={`All ${events.length} entries`} onPress={() => setAll(true)} />
      ) : null}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    columnGap: 12,
    paddingVertical: 8,
    borderBottomWidth: 1,
    borderBottomColor: colors.line,
  },
  words: { flex: 1, minWidth: 0 },
  time: { width: 84 },
  struck: { textDecorationLine: 'line-through' },
}));
