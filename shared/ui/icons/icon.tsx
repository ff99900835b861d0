import { Path, Svg } from 'react-native-svg';
import { useTheme } from '../theme/theme';
import type { ColorRole } from '../theme/tokens';
import { iconPaths, type IconName } from './icon-paths';

/** A line icon. It never stands for a word alone: the control or the text beside it names it. */
export function Icon({ name, size = 24, tone = 'ink' }: { name: IconName; size?: number; tone?: ColorRole }) {
  const { colors } = useTheme();
  return (
    <Svg width={size} height={size} viewBox="0 0 24 24" fill="none" aria-hidden>
      <Path d={iconPaths[name]} stroke={colors[tone]} strokeWidth={2} strokeLinejoin="round" strokeLinecap="round" />
    </Svg>
  );
}
