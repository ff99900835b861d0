import { useId } from 'react';
import { StyleSheet, View } from 'react-native';
import { Defs, G, Path, Pattern, Rect, Svg, Text as SvgText } from 'react-native-svg';
import { fixed } from '../format/number';
import { useFormats } from '../format/formats';
import { Table } from '../primitives/table';
import { Txt } from '../primitives/txt';
import { useTheme } from '../theme/theme';
import { faceStacks } from '../theme/tokens';
import { layoutBars, type WaitBar } from './bar-layout';
import { Grid } from './grid';

export interface BarChartProps {
  bars: readonly WaitBar[];
  width: number;
  height?: number;
  /** In one sentence what is seen; empty where it stands beside it: 'Lost hours fell from 76 to 49 in eight weeks.' */
  twin: string;
}

/** Waits as bars: used solid, lost hatched, numbers printed. Statistics are ink and hatch, never a hue. */
export function BarChart({ bars, width, height = 190, twin }: BarChartProps) {
  const { colors } = useTheme();
  const id = `hat${useId().replace(/[^a-zA-Z0-9]/g, '')}`;
  const { left, lines, bars: drawn } = layoutBars(bars, width, height);
  return (
    <Svg
      width={width}
      height={height + 26}
      viewBox={`0 0 ${width} ${height + 26}`}
      fill="none"
      {...(twin === '' ? { 'aria-hidden': true } : { role: 'img', 'aria-label': twin })}
      style={styles.open}
    >
      <HatchPattern id={id} />
      <Grid lines={lines} left={left} width={width} />
      {drawn.map(({ bar, used, lost, centre, usedTextY, lostTextY }) => (
        <G key={bar.key}>
          <Rect {...used} fill={colors.ink2} />
          <Rect {...lost} fill={`url(#${id})`} stroke={colors.ink2} strokeWidth={lost.height > 0 ? 1.5 : 0} />
          {usedTextY === null ? null : (
            <Figure x={centre} y={usedTextY} fill={colors.ground} text={String(Math.round(bar.used))} />
          )}
          {lostTextY === null ? null : (
            <Figure x={centre} y={lostTextY} fill={colors.ink} text={String(Math.round(bar.lost))} />
          )}
          <SvgText
            x={centre}
            y={height + 18}
            textAnchor="middle"
            fill={bar.present ? colors.ink : colors.ink2}
            fontFamily={faceStacks.text}
            fontSize={13}
            fontWeight={bar.present ? '600' : '400'}
          >
            {bar.label}
          </SvgText>
        </G>
      ))}
    </Svg>
  );
}

const Figure = ({ x, y, fill, text }: { x: number; y: number; fill: string; text: string }) => (
  <SvgText x={x} y={y} textAnchor="middle" fill={fill} fontFamily={faceStacks.num} fontSize={18} fontWeight="600">
    {text}
  </SvgText>
);

/** The hatch of lost time, for `fill="url(#id)"` inside the same drawing. */
export function HatchPattern({ id }: { id: string }) {
  const { colors } = useTheme();
  return (
    <Defs>
      <Pattern id={id} width={7} height={7} patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
        <Rect width={7} height={7} fill={colors.sheet} />
        <Path d="M0 0V7" stroke={colors.ink3} strokeWidth={3} />
      </Pattern>
    </Defs>
  );
}

/** What solid and hatched mean. */
export function BarKey({ used = 'used', lost = 'lost' }: { used?: string; lost?: string }) {
  const { colors } = useTheme();
  const id = `key${useId().replace(/[^a-zA-Z0-9]/g, '')}`;
  return (
    <View style={styles.key}>
      <View style={styles.entry}>
        <View style={{ width: 16, height: 16, backgroundColor: colors.ink2 }} />
        <Txt kind="small">{used}</Txt>
      </View>
      <View style={styles.entry}>
        <Svg width={16} height={16} viewBox="0 0 16 16" fill="none" aria-hidden>
          <HatchPattern id={id} />
          <Rect
            x={0.75}
            y={0.75}
            width={14.5}
            height={14.5}
            fill={`url(#${id})`}
            stroke={colors.ink2}
            strokeWidth={1.5}
          />
        </Svg>
        <Txt kind="small">{lost}</Txt>
      </View>
    </View>
  );
}

/** The table twin of the bars. */
export function BarTable({
  bars,
  label,
  of,
  used = 'Used',
  lost = 'Lost',
  decimals = 0,
}: {
  bars: readonly WaitBar[];
  label: string;
  /** Heading of the first column: 'Week'. */
  of: string;
  used?: string;
  lost?: string;
  decimals?: number;
}) {
  const { marks } = useFormats();
  return (
    <Table
      label={label}
      keepOnPhone
      rows={bars}
      rowKey={(bar) => bar.key}
      columns={[
        { key: 'of', title: of, cell: (bar) => bar.label },
        { key: 'used', title: used, numeric: true, cell: (bar) => fixed(bar.used, decimals, marks) },
        { key: 'lost', title: lost, numeric: true, cell: (bar) => fixed(bar.lost, decimals, marks) },
      ]}
    />
  );
}

const styles = StyleSheet.create({
  open: { overflow: 'visible' },
  key: { flexDirection: 'row', columnGap: 16 },
  entry: { flexDirection: 'row', alignItems: 'center', columnGap: 8 },
});
