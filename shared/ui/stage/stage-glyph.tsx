import { Path, Svg } from 'react-native-svg';
import { useTheme } from '../theme/theme';
import type { ColorRole } from '../theme/tokens';
import { stageGlyphs, stages, type StageMark } from './stages';

/** The silhouette of a stage, legible at 14 px. The word stands beside it, so it is hidden from readers. */
export function StageGlyph({ stage, size = 24, tone }: { stage: StageMark; size?: number; tone?: ColorRole }) {
  const { colors } = useTheme();
  const { d, stroke, dash } = stageGlyphs[stage];
  const color = colors[tone ?? stages[stage].color];
  return (
    <Svg width={size} height={size} viewBox="0 0 24 24" fill="none" aria-hidden>
      {stroke ? (
        <Path d={d} stroke={color} strokeWidth={stroke} strokeDasharray={dash ? [...dash] : undefined} />
      ) : (
        <Path d={d} fill={color} fillRule="evenodd" />
      )}
    </Svg>
  );
}
