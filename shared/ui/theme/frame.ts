import type { ViewStyle } from 'react-native';
import type { Theme } from './theme';

/**
 * A frame inside a box, of any width, that never moves what is inside when it grows. Drawn as an inner shadow, which
 * holds half pixels where a border would be rounded down; the system's own colours draw no shadows, so there it is a
 * border.
 */
export const innerFrame = (theme: Theme, width: number, color: string): ViewStyle =>
  theme.forced ? { borderWidth: width, borderColor: color } : { boxShadow: `inset 0 0 0 ${width}px ${color}` };
