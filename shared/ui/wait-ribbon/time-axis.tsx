import { StyleSheet } from 'react-native';
import { G, Path, Svg, Text as SvgText } from 'react-native-svg';
import { useTheme } from '../theme/theme';
import { faceStacks } from '../theme/tokens';
import { tickAnchor, type Tick } from './ticks';

const n = (value: number) => Math.round(value * 100) / 100;

/** The hours under one ribbon, or over several rows. Readers hear the times from the ribbons. */
export function TimeAxis({
  ticks,
  fromS,
  toS,
  width,
  height = 18,
  snap = true,
  skip = null,
}: {
  ticks: readonly Tick[];
  fromS: number;
  toS: number;
  width: number;
  height?: number;
  snap?: boolean;
  /** No words this near to an instant: the now flag stands there. */
  skip?: { atS: number; withinS: number } | null;
}) {
  const { colors } = useTheme();
  return (
    <Svg width={width} height={height} viewBox={`0 0 ${width} ${height}`} fill="none" style={styles.open} aria-hidden>
      {ticks.map(({ s, text }) => {
        const x = n(((s - fromS) / (toS - fromS)) * width);
        const quiet = skip !== null && Math.abs(s - skip.atS) < skip.withinS;
        return (
          <G key={s}>
            <Path d={`M${x} 0v5`} stroke={colors.edge} strokeWidth={1} />
            {quiet ? null : (
              <SvgText
                x={x}
                y={height - 1}
                textAnchor={tickAnchor(x, width, snap)}
                fill={colors.ink2}
                fontFamily={faceStacks.text}
                fontSize={13}
              >
                {text}
              </SvgText>
            )}
          </G>
        );
      })}
    </Svg>
  );
}

const styles = StyleSheet.create({ open: { overflow: 'visible' } });
