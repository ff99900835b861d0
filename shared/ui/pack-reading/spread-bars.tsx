import { View } from 'react-native';
import type { PackReadingDto } from '@/shared/contract/pack-reading';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { millivolts } from '../format/quantities';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { stageWords } from './prove-words';

/** The spread of each reading as a bar from 0, with the aim as an ink line across it. */
export function SpreadBars({
  log,
  aimMillivolts,
  now,
}: {
  log: readonly PackReadingDto[];
  aimMillivolts: number;
  now: number;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const most = Math.max(aimMillivolts * 1.2, ...log.map(({ spreadMillivolts }) => spreadMillivolts));
  const at = (value: number) => `${((100 * value) / most).toFixed(1)}%` as `${number}%`;
  return (
    <View role="list" aria-label="Spread of each reading" style={{ rowGap: 10 }}>
      {log.map((reading) => (
        <View key={reading.id} role="listitem" style={{ rowGap: 3 }}>
          <View style={styles.words}>
            <Txt>{stageWords(reading)}</Txt>
            <Txt kind="small" tone="ink2">
              {moment(Date.parse(reading.at), zone, now, marks)}
            </Txt>
            <Txt kind="numXS">{millivolts(reading.spreadMillivolts / 1000)}</Txt>
          </View>
          <View style={styles.track}>
            <View style={[styles.bar, { width: at(reading.spreadMillivolts) }]} />
            <View style={[styles.aim, { left: at(aimMillivolts) }]} />
          </View>
        </View>
      ))}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  words: { flexDirection: 'row', justifyContent: 'space-between', columnGap: 8 },
  track: { height: 18, backgroundColor: colors.well },
  bar: { height: 18, backgroundColor: colors.ink2 },
  aim: { position: 'absolute', top: -3, bottom: -3, width: 3, backgroundColor: colors.ink },
}));
