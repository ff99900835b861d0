import { View } from 'react-native';
import { G, Path, Rect, Svg, Text as SvgText } from 'react-native-svg';
import { Grid } from '../charts/grid';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { millivolts, millivoltsNumber, millivoltsWithBand } from '../format/quantities';
import { FullWidth } from '../primitives/full-width';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { useHalo } from '../theme/surface';
import { useTheme } from '../theme/theme';
import { faceStacks } from '../theme/tokens';
import type { SpreadBar } from './prove-words';
import { axisWidth, barWidth, layoutSpread, notchWidth } from './spread-layout';

/** Of the bars, of the number above the highest, and of the names under them, px. */
const [height, above, below] = [150, 26, 28];

/** The spread as read, solid, and as expected, dashed with its band as a whisker; the aim is the notch line across. */
export function SpreadChart({
  bars,
  aimMillivolts,
  now,
}: {
  bars: readonly SpreadBar[];
  aimMillivolts: number;
  now: number;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const expects = bars.some(({ at }) => at === null);
  return (
    <View style={{ rowGap: 8 }}>
      <View style={styles.head}>
        <Txt kind="heading" heading={2}>
          Spread, mV
        </Txt>
        {expects ? (
          <View style={styles.key} aria-hidden>
            <View style={styles.solid} />
            <Txt kind="small">read</Txt>
            <View style={styles.dashed} />
            <Txt kind="small">expected, with band</Txt>
          </View>
        ) : null}
      </View>
      <FullWidth height={above + height + below}>
        {(width) => <Drawing bars={bars} aimMillivolts={aimMillivolts} width={width} />}
      </FullWidth>
      <View role="list" aria-label="Spread of each reading">
        {[...bars].reverse().map(({ key, name, at, spread }) => (
          <View key={key} role="listitem" style={styles.row}>
            <Txt style={styles.name}>{name}</Txt>
            <Txt kind="small" tone="ink2" style={styles.when}>
              {at === null ? 'expected' : moment(Date.parse(at), zone, now, marks)}
            </Txt>
            <Txt kind={at === null ? 'body' : 'numXS'} align="right" tone={at === null ? 'ink2' : 'ink'}>
              {at === null ? millivoltsWithBand(inVolts(spread)) : millivolts(spread.p50 / 1000)}
            </Txt>
          </View>
        ))}
      </View>
    </View>
  );
}

const inVolts = ({ p10, p50, p90 }: SpreadBar['spread']) => ({ p10: p10 / 1000, p50: p50 / 1000, p90: p90 / 1000 });

/** The list under it says the same to who cannot see it. */
function Drawing({ bars, aimMillivolts, width }: { bars: readonly SpreadBar[]; aimMillivolts: number; width: number }) {
  const { colors } = useTheme();
  const halo = useHalo();
  const drawn = layoutSpread(bars, aimMillivolts, width, height);
  const notchX = width - notchWidth;
  return (
    <Svg
      width={width}
      height={above + height + below}
      viewBox={`0 ${-above} ${width} ${above + height + below}`}
      fill="none"
      aria-hidden
    >
      <Grid lines={drawn.lines} left={axisWidth} width={width} />
      {drawn.bars.map(({ bar, x, y, cut, whisker }) => (
        <G key={bar.key}>
          {whisker ? (
            <>
              <Rect
                {...{ x: x - barWidth / 2, y, width: barWidth, height: height - y }}
                stroke={colors.ink2}
                strokeWidth={1.5}
                strokeDasharray={[4, 3]}
              />
              <Path
                d={`M${x} ${whisker.low}V${whisker.high}M${x - 7} ${whisker.low}h14M${x - 7} ${whisker.high}h14`}
                stroke={colors.ink}
                strokeWidth={2}
              />
            </>
          ) : (
            <>
              <Rect {...{ x: x - barWidth / 2, y, width: barWidth, height: height - y }} fill={colors.ink2} />
              {cut ? <Path d={`M${x - 22} ${y + 22}l44 -9`} stroke={halo} strokeWidth={5} /> : null}
              <SvgText
                {...{ x, y: y - 7, textAnchor: 'middle', fill: colors.ink }}
                fontFamily={faceStacks.num}
                fontSize={18}
                fontWeight="600"
              >
                {millivoltsNumber(bar.spread.p50 / 1000)}
              </SvgText>
            </>
          )}
          <SvgText
            {...{ x, y: height + 18, textAnchor: 'middle', fill: colors.ink2 }}
            fontFamily={faceStacks.text}
            fontSize={13}
          >
            {bar.short}
          </SvgText>
        </G>
      ))}
      <Path d={`M${axisWidth} ${drawn.aimY}H${notchX + 2}`} stroke={halo} strokeWidth={6.5} />
      <Path d={`M${axisWidth} ${drawn.aimY}H${notchX + 2}`} stroke={colors.ink} strokeWidth={3} />
      <Path d={`M${notchX} ${drawn.aimY}l10 -6.5v13z`} fill={colors.ink} />
    </Svg>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  head: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    justifyContent: 'space-between',
    alignItems: 'baseline',
    columnGap: 12,
  },
  key: { flexDirection: 'row', alignItems: 'center', columnGap: 6 },
  solid: { width: 14, height: 14, backgroundColor: colors.ink2 },
  dashed: { width: 14, height: 14, borderWidth: 1.5, borderStyle: 'dashed', borderColor: colors.ink2, marginLeft: 6 },
  row: {
    flexDirection: 'row',
    alignItems: 'baseline',
    columnGap: 8,
    paddingVertical: 6,
    borderTopWidth: 1,
    borderColor: colors.line,
  },
  name: { flexGrow: 1.2, flexBasis: 120 },
  when: { flexGrow: 1, flexBasis: 80 },
}));
