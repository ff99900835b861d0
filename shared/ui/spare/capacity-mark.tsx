import { Path, Rect, Svg, Text as SvgText } from 'react-native-svg';
import { multiples } from '../charts/axis-steps';
import { useHalo } from '../theme/surface';
import { useTheme } from '../theme/theme';
import { faceStacks } from '../theme/tokens';

export interface CapacityMarkProps {
  low: number;
  likely: number;
  high: number;
  /** Rated capacity, the dashed tick; null where the type is not known. */
  labelAh: number | null;
  /** Off the label or guessed: the box is dashed. */
  dashed: boolean;
  /** Ends of the axis, Ah. */
  fromAh: number;
  toAh: number;
  width: number;
  height?: number;
  /** Numbers under the axis: for the page, not for tables. */
  ticks?: boolean;
}

/** Ends of an axis, in fives, that holds all of these values. Never from 0: a box would be lost on it. */
export function capacityAxis(values: readonly number[]): { fromAh: number; toAh: number } {
  const [low, high] = [Math.min(...values), Math.max(...values)];
  const beyond = Math.max(1, (high - low) * 0.12);
  return { fromAh: Math.floor((low - beyond) / 5) * 5, toAh: Math.ceil((high + beyond) / 5) * 5 };
}

/** A capacity measured with doubt: box from low to high with its likely mark, the label's value as a dashed tick. */
export function CapacityMark({
  low,
  likely,
  high,
  labelAh,
  dashed,
  fromAh,
  toAh,
  width,
  height = 22,
  ticks = false,
}: CapacityMarkProps) {
  const { colors } = useTheme();
  const halo = useHalo();
  const x = (ah: number) => Math.round(((ah - fromAh) / (toAh - fromAh)) * (width - 2) * 10) / 10 + 1;
  const top = ticks ? 22 : 0;
  const mid = top + height / 2;
  const box = { x: x(low), w: Math.max(4, x(high) - x(low)), y: mid - height * 0.27, h: height * 0.54 };
  const step =
    [1, 2, 5, 10, 20, 50, 100, 200].find(
      (each) => (each / (toAh - fromAh)) * width >= 56 && (toAh - fromAh) / each <= 8,
    ) ?? 500;
  const labelX = labelAh === null ? null : x(labelAh);
  return (
    <Svg
      width={width}
      height={ticks ? top + height + 22 : height}
      viewBox={`0 0 ${width} ${ticks ? top + height + 22 : height}`}
      fill="none"
      aria-hidden
    >
      <Path d={`M0 ${mid}H${width}`} stroke={ticks ? colors.edge : colors.line} strokeWidth={1.5} />
      <Rect x={box.x} y={box.y} width={box.w} height={box.h} fill={halo} />
      <Rect
        x={box.x}
        y={box.y}
        width={box.w}
        height={box.h}
        fill={colors.well}
        stroke={colors.ink}
        strokeWidth={1.5}
        strokeDasharray={dashed ? [3, 2.5] : undefined}
      />
      <Path d={`M${x(likely)} ${mid - height / 2}v${height}`} stroke={colors.ink} strokeWidth={3} />
      {labelX === null ? null : (
        <Path
          d={`M${labelX} ${mid - height / 2}v${height}`}
          stroke={colors.ink2}
          strokeWidth={2}
          strokeDasharray={[3, 3]}
        />
      )}
      {ticks && labelX !== null ? (
        <SvgText
          x={labelX}
          y={13}
          textAnchor={labelX > width - 20 ? 'end' : labelX < 20 ? 'start' : 'middle'}
          fill={colors.ink2}
          fontFamily={faceStacks.text}
          fontSize={13}
        >
          label
        </SvgText>
      ) : null}
      {ticks
        ? multiples(fromAh, toAh, step).flatMap((ah) => [
            <Path key={`t${ah}`} d={`M${x(ah)} ${mid}v5`} stroke={colors.edge} strokeWidth={1} />,
            <SvgText
              key={ah}
              x={x(ah)}
              y={top + height + 19}
              textAnchor={x(ah) < 12 ? 'start' : x(ah) > width - 12 ? 'end' : 'middle'}
              fill={colors.ink2}
              fontFamily={faceStacks.text}
              fontSize={13}
            >
              {String(ah)}
            </SvgText>,
          ])
        : null}
    </Svg>
  );
}
