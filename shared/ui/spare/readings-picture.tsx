import { Circle, G, Path, Svg, Text as SvgText } from 'react-native-svg';
import type { SpareReadingDto } from '@/shared/contract/spare';
import { multiples } from '../charts/axis-steps';
import { useFormats } from '../format/formats';
import { fixed } from '../format/number';
import { useHalo } from '../theme/surface';
import { useTheme } from '../theme/theme';
import { faceStacks } from '../theme/tokens';

/** What is drawn of the groups: both of two, of more the lowest and the highest of each reading. */
export function drawnSeries(readings: readonly SpareReadingDto[]): {
  names: [string] | [string, string];
  values: number[][];
} {
  const groups = readings[0]?.groupVolts.length ?? 0;
  if (groups <= 1) return { names: ['G1'], values: readings.map(({ groupVolts }) => groupVolts) };
  if (groups === 2) return { names: ['G1', 'G2'], values: readings.map(({ groupVolts }) => groupVolts) };
  return {
    names: ['highest', 'lowest'],
    values: readings.map(({ groupVolts }) => [Math.max(...groupVolts), Math.min(...groupVolts)]),
  };
}

/** Readings of a spare over the time, oldest left. Dots are readings; the line between them is no measurement. */
export function ReadingsPicture({
  readings,
  width,
  height = 130,
  dayOf,
}: {
  /** At least two, oldest first. */
  readings: readonly SpareReadingDto[];
  width: number;
  height?: number;
  /** '14 May' */
  dayOf: (at: number) => string;
}) {
  const { colors } = useTheme();
  const halo = useHalo();
  const { marks } = useFormats();
  const { values } = drawnSeries(readings);
  const all = values.flat();
  const pad = Math.max(0.003, (Math.max(...all) - Math.min(...all)) * 0.15);
  const [low, high] = [Math.min(...all) - pad, Math.max(...all) + pad];
  // Readings of a spare lie a few millivolts apart: the lines follow them down to single ones.
  const step = [0.001, 0.002, 0.005, 0.01, 0.02, 0.05, 0.1, 0.2, 0.5, 1].find(
    (each) => multiples(low, high, each).length <= 4,
  );
  const lines = multiples(low, high, step ?? 2);
  const decimals = (step ?? 1) < 0.01 ? 3 : 2;
  const [left, right, base] = [44, width - 10, height - 24];
  const times = readings.map(({ at }) => Date.parse(at));
  const [first, last] = [times[0] ?? 0, times.at(-1) ?? 1];
  const x = (at: number) => left + 10 + ((at - first) / Math.max(1, last - first)) * (right - left - 20);
  const y = (volts: number) => 8 + ((high - volts) / (high - low)) * (base - 16);
  return (
    <Svg width={width} height={height} viewBox={`0 0 ${width} ${height}`} fill="none" aria-hidden>
      {lines.map((line) => (
        <G key={line}>
          <Path d={`M${left} ${y(line)}H${width}`} stroke={colors.line} strokeWidth={1} />
          <SvgText
            x={left - 7}
            y={y(line) + 4}
            textAnchor="end"
            fill={colors.ink2}
            fontFamily={faceStacks.text}
            fontSize={13}
          >
            {fixed(line, decimals, marks)}
          </SvgText>
        </G>
      ))}
      {(values[0] ?? []).map((_, series) => (
        <G key={series}>
          <Path
            d={values.map((row, i) => `${i === 0 ? 'M' : 'L'}${x(times[i] ?? 0)} ${y(row[series] ?? 0)}`).join('')}
            stroke={colors.ink3}
            strokeWidth={1.5}
          />
          {values.map((row, i) => (
            <Circle
              key={readings[i]?.id}
              cx={x(times[i] ?? 0)}
              cy={y(row[series] ?? 0)}
              r={4}
              fill={series === 0 ? colors.ink : halo}
              stroke={colors.ink}
              strokeWidth={2}
            />
          ))}
        </G>
      ))}
      <SvgText x={left} y={height - 4} fill={colors.ink2} fontFamily={faceStacks.text} fontSize={13}>
        {dayOf(first)}
      </SvgText>
      <SvgText x={width} y={height - 4} textAnchor="end" fill={colors.ink2} fontFamily={faceStacks.text} fontSize={13}>
        {dayOf(last)}
      </SvgText>
    </Svg>
  );
}
