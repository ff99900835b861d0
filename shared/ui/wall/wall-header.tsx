import { StyleSheet, View } from 'react-native';
import { Circle, Svg } from 'react-native-svg';
import { clock, clockWithSeconds } from '../format/clock';
import { useFormats } from '../format/formats';
import { BrandMark } from '../icons/brand-mark';
import { makeStyles } from '../theme/make-styles';
import { useTheme } from '../theme/theme';
import { wallScale } from '../theme/tokens';
import { web } from '../theme/web-props';
import { WallText } from './wall-text';

const sizes = wallScale.header;

/** A dot while it is live, a hollow ring while nothing is heard. */
function Heard({ live, size }: { live: boolean; size: number }) {
  const { colors } = useTheme();
  const r = size / 2 - (live ? 2 : 4);
  return (
    <Svg width={size} height={size} aria-hidden>
      {live ? (
        <Circle cx={size / 2} cy={size / 2} r={r} fill={colors.ready} />
      ) : (
        <Circle cx={size / 2} cy={size / 2} r={r} fill="none" stroke={colors.ink2} strokeWidth={4} />
      )}
    </Svg>
  );
}

/** The wall's head: workshop, counts, when it was heard, the clock. */
export function WallHeader({
  workshop,
  counts,
  heardAt,
  live,
  now,
  note,
}: {
  workshop: string;
  counts: string;
  heardAt: number | null;
  live: boolean;
  now: number;
  /** 'may fall asleep' */
  note?: string | null;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const heard = heardAt === null ? 'not heard yet' : `heard ${clockWithSeconds(heardAt, zone)}`;
  return (
    <View role="banner" style={styles.head}>
      <BrandMark size={56} />
      <WallText size={sizes.name} strong heading={1}>
        {workshop}
      </WallText>
      <WallText size={sizes.count} tone="ink2">
        {counts}
      </WallText>
      <View style={styles.grow} />
      {note ? (
        <WallText size={sizes.live} tone="ink2">
          {note}
        </WallText>
      ) : null}
      <View style={styles.heard}>
        <Heard live={live} size={22} />
        <WallText size={sizes.live} tone="ink2">
          {live ? `live, ${heard}` : heard}
        </WallText>
      </View>
      <View {...web({ role: 'timer', 'aria-live': 'off' })} aria-label={`Workshop time ${clock(now, zone, marks)}`}>
        <WallText size={sizes.clock} strong>
          {clock(now, zone, marks)}
        </WallText>
      </View>
    </View>
  );
}

/** In its place when the wall is not live: amber, full width, since when. Nothing else moves. */
export function StaleBand({ workshop, since, now }: { workshop: string | null; since: number | null; now: number }) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  return (
    <View role="alert" style={[styles.head, styles.band]}>
      <Svg width={44} height={44} viewBox="0 0 44 44" aria-hidden>
        <Circle cx={22} cy={22} r={17} fill="none" stroke={styles.ring.color} strokeWidth={6} />
      </Svg>
      <WallText size={sizes.stale} strong tone="onCheckDue">
        {since === null
          ? 'Not live: no word from the server yet.'
          : `Not live since ${clock(since, zone, marks)}. Times below are old.`}
      </WallText>
      <View style={styles.grow} />
      {workshop ? (
        <WallText size={40} tone="onCheckDue" heading={1}>
          {workshop}
        </WallText>
      ) : null}
      <WallText size={sizes.clock} strong tone="onCheckDue">
        {clock(now, zone, marks)}
      </WallText>
    </View>
  );
}

const base = StyleSheet.create({
  row: { flexDirection: 'row', alignItems: 'center' },
});
const useStyles = makeStyles(({ colors }) => ({
  head: {
    ...StyleSheet.flatten(base.row),
    height: 92,
    flexShrink: 0,
    paddingHorizontal: 40,
    columnGap: 26,
    borderBottomWidth: 2,
    borderBottomColor: colors.line,
  },
  band: { backgroundColor: colors.checkDue, borderBottomWidth: 0 },
  ring: { color: colors.onCheckDue },
  grow: { flex: 1 },
  heard: { flexDirection: 'row', alignItems: 'center', columnGap: 12 },
}));
