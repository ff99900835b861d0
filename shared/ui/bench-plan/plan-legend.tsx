import type { ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { Circle, Svg } from 'react-native-svg';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { useTheme } from '../theme/theme';
import { radius, stroke } from '../theme/tokens';

/** The head of the people's lanes: what the shapes in them mean. */
export function PlanLegend({ nameWidth }: { nameWidth: number }) {
  const styles = useStyles();
  const { colors } = useTheme();
  return (
    <View style={styles.head}>
      <Txt kind="heading" heading={2} style={{ width: nameWidth }}>
        People
      </Txt>
      <Meaning text="fill in a wait">
        <View style={[styles.dock, styles.fill]} />
      </Meaning>
      <Meaning text="own work">
        <View style={[styles.dock, styles.own]} />
      </Meaning>
      <Meaning text="free">
        <View style={[styles.dock, styles.free]} />
      </Meaning>
      <Meaning text="look-in">
        <Svg width={12} height={12} viewBox="0 0 12 12" fill="none">
          <Circle cx={6} cy={6} r={4.5} stroke={colors.ink} strokeWidth={2} />
        </Svg>
      </Meaning>
    </View>
  );
}

const Meaning = ({ text, children }: { text: string; children: ReactNode }) => (
  <View style={row.one} aria-hidden>
    {children}
    <Txt kind="small" nowrap>
      {text}
    </Txt>
  </View>
);

const row = StyleSheet.create({ one: { flexDirection: 'row', alignItems: 'center', columnGap: 8, marginRight: 18 } });

const useStyles = makeStyles(({ colors }) => ({
  head: { flexDirection: 'row', alignItems: 'center', flexWrap: 'wrap', minHeight: 40, rowGap: 4, paddingVertical: 6 },
  dock: { width: 26, height: 18, borderRadius: radius.dock },
  fill: { backgroundColor: colors.sheet, borderWidth: stroke.control, borderColor: colors.ink, borderLeftWidth: 6 },
  own: { backgroundColor: colors.well },
  free: { borderWidth: stroke.control, borderColor: colors.edge, borderStyle: 'dashed' },
}));
