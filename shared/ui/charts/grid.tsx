import { G, Path, Text as SvgText } from 'react-native-svg';
import { useTheme } from '../theme/theme';
import { faceStacks } from '../theme/tokens';

export interface GridLine {
  y: number;
  text: string;
}

/** Hairlines with their number at the left. */
export function Grid({ lines, left, width }: { lines: readonly GridLine[]; left: number; width: number }) {
  const { colors } = useTheme();
  return (
    <>
      {lines.map(({ y, text }) => (
        <G key={text}>
          <Path d={`M${left} ${y}H${width}`} stroke={colors.line} strokeWidth={1} />
          <SvgText
            x={left - 7}
            y={y + 4}
            textAnchor="end"
            fill={colors.ink2}
            fontFamily={faceStacks.text}
            fontSize={13}
          >
            {text}
          </SvgText>
        </G>
      ))}
    </>
  );
}
