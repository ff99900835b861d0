import { useState } from 'react';
import { View } from 'react-native';
import { NBSP } from '../format/marks';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { metresNumber, reachSentence, type Reach } from './wall-reach';

const nameWidth = 104;
const numberWidth = 44;

/** Bars of how far each part of the wall carries, with the farthest reader as a line through them. */
export function ReachPicture({ reach, distance }: { reach: readonly Reach[]; distance: number | null }) {
  const styles = useStyles();
  const [width, setWidth] = useState(0);
  const room = Math.max(0, width - nameWidth - numberWidth);
  const farthest = Math.max(...reach.map(({ metres }) => metres), distance ?? 0) * 1.08;
  const x = (metres: number) => (metres / farthest) * room;
  return (
    <View onLayout={({ nativeEvent }) => setWidth(nativeEvent.layout.width)} style={styles.box}>
      <View role="list" aria-label="How far each part is read">
        {reach.map(({ name, metres }) => {
          const carries = distance === null || metres >= distance;
          return (
            <View key={name} role="listitem" aria-label={`${name} to ${metresNumber(metres)} m`} style={styles.row}>
              <Txt kind="small" style={styles.name}>
                {name}
              </Txt>
              <View style={[styles.bar, { width: x(metres) }, carries ? styles.carries : styles.short]} />
              <View style={styles.grow} />
              <Txt kind="numS" align="right" nowrap style={styles.number}>
                {`${metresNumber(metres)}${NBSP}m`}
              </Txt>
            </View>
          );
        })}
      </View>
      {distance !== null && room > 0 ? (
        <View style={[styles.halo, { left: nameWidth + x(distance) - 3.25 }]} aria-hidden>
          <View style={styles.line} />
        </View>
      ) : null}
      {distance !== null ? (
        <Txt kind="small" tone="ink2" style={styles.words}>
          {reachSentence(reach, distance)}
        </Txt>
      ) : null}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  box: { position: 'relative' },
  row: { flexDirection: 'row', alignItems: 'center', height: 34 },
  name: { width: nameWidth, fontSize: 14 },
  bar: { height: 18, borderWidth: 1.5 },
  carries: { backgroundColor: colors.ink2, borderColor: colors.ink2 },
  short: { backgroundColor: colors.well, borderColor: colors.edge },
  grow: { flex: 1 },
  number: { width: numberWidth },
  halo: {
    position: 'absolute',
    top: -6,
    width: 6.5,
    height: 178,
    backgroundColor: colors.ground,
    alignItems: 'center',
  },
  line: { width: 2.5, flex: 1, backgroundColor: colors.ink },
  words: { marginTop: 6 },
}));
