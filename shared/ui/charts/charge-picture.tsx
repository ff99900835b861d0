import { useMemo } from 'react';
import { StyleSheet } from 'react-native';
import { Circle, G, Path, Svg, Text as SvgText } from 'react-native-svg';
import { useFormats } from '../format/formats';
import { stageGlyphs } from '../stage/stages';
import { useHalo } from '../theme/surface';
import { useTheme } from '../theme/theme';
import { faceStacks } from '../theme/tokens';
import type { Tick } from '../wait-ribbon/ticks';
import { layoutPicture, type PictureInput } from './charge-picture-layout';
import { Grid } from './grid';

export interface ChargePictureProps extends Omit<PictureInput, 'voltsHeight' | 'ampsHeight'> {
  voltsHeight?: number;
  ampsHeight?: number;
  /** Words under the time axis, on the trace's seconds (`clockTicks`). */
  ticks: readonly Tick[];
  /** The picture in one sentence; the values are in the table beside it (`PictureTable`). */
  twin: string;
}

/** The outline of the alarm's octagon, to cut it free from the lines under it. */
const octagon = 'M7.6 1.5h8.8l6.1 6.1v8.8l-6.1 6.1H7.6l-6.1-6.1V7.6z';

/** Volts and amps of a charge on one time axis. Solid at the clips, dashed rest voltage, tint the band. */
export function ChargePicture({ ticks, twin, voltsHeight = 150, ampsHeight = 66, ...input }: ChargePictureProps) {
  const { colors } = useTheme();
  const halo = useHalo();
  const { marks } = useFormats();
  const key = JSON.stringify({ marks, ...input, voltsHeight, ampsHeight });
  const drawing = useMemo(() => layoutPicture(JSON.parse(key) as PictureInput), [key]);
  const { width, left, baseY, targetY } = drawing;
  const height = baseY + 20;
  return (
    <Svg
      width={width}
      height={height}
      viewBox={`0 0 ${width} ${height}`}
      fill="none"
      {...(twin === '' ? { 'aria-hidden': true } : { role: 'img', 'aria-label': twin })}
      style={styles.open}
    >
      <Grid lines={drawing.voltLines} left={left} width={width} />
      <Grid lines={drawing.ampLines} left={left} width={width} />
      <Path d={drawing.bandArea} fill={colors.chargingTint} />
      {drawing.silhouette.map(({ d, color }) => (
        <Path key={d} d={d} fill={colors[color]} />
      ))}
      <Path d={`M${left} ${targetY}H${width}`} stroke={colors.ink} strokeWidth={3} />
      <Path d={drawing.targetTab} fill={colors.ink} />
      <Path d={drawing.restLine} stroke={colors.charging} strokeWidth={2.2} strokeDasharray={[6, 4]} />
      <Path d={drawing.clipLine} stroke={colors.charging} strokeWidth={2.6} strokeLinejoin="round" />
      {drawing.slats.map((d) => (
        <Path key={d} d={d} stroke={colors.ink} strokeWidth={2} />
      ))}
      <Path d={drawing.likely} stroke={colors.ink} strokeWidth={3} />
      {drawing.dots.map(({ x, y, odd }) =>
        odd ? (
          <G key={`${x} ${y}`} transform={`translate(${x - 7} ${y - 7}) scale(${14 / 24})`}>
            <Path d={octagon} fill={halo} stroke={halo} strokeWidth={4} />
            <Path d={stageGlyphs.overdue.d} fill={colors.alarm} fillRule="evenodd" />
          </G>
        ) : (
          <Circle key={`${x} ${y}`} cx={x} cy={y} r={3.5} fill={colors.ink} stroke={halo} strokeWidth={1} />
        ),
      )}
      {ticks.map(({ s, text }) => {
        const x = drawing.toX(s);
        return (
          <G key={s}>
            <Path d={`M${x} ${baseY}v5`} stroke={colors.edge} strokeWidth={1} />
            <SvgText
              x={x}
              y={baseY + 18}
              textAnchor={x > width - 14 ? 'end' : 'middle'}
              fill={colors.ink2}
              fontFamily={faceStacks.text}
              fontSize={13}
            >
              {text}
            </SvgText>
          </G>
        );
      })}
    </Svg>
  );
}

const styles = StyleSheet.create({ open: { overflow: 'visible' } });
