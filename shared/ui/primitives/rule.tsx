import { View } from 'react-native';
import { useTheme } from '../theme/theme';

/** A hairline between parts. `strong` closes a group of rows. */
export function Rule({ gap = 12, strong = false }: { gap?: number; strong?: boolean }) {
  const { colors } = useTheme();
  return (
    <View
      style={{
        height: strong ? 1.5 : 1,
        backgroundColor: strong ? colors.edge : colors.line,
        marginVertical: gap,
        alignSelf: 'stretch',
      }}
    />
  );
}
