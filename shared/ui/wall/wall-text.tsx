import type { ReactNode } from 'react';
import { StyleSheet, Text, type StyleProp, type TextStyle } from 'react-native';
import { useTheme } from '../theme/theme';
import { faceStacks, type ColorRole } from '../theme/tokens';
import { web } from '../theme/web-props';

/** Numbers and words of the wall: one face, one line, no wrap. Sizes in px of the picture. */
export function WallText({
  size,
  line = size,
  strong = false,
  tone = 'ink',
  heading,
  align,
  style,
  children,
}: {
  size: number;
  line?: number;
  /** 600 instead of 500. */
  strong?: boolean;
  tone?: ColorRole;
  heading?: 1 | 2;
  align?: 'left' | 'right' | 'center';
  style?: StyleProp<TextStyle>;
  children?: ReactNode;
}) {
  const { colors } = useTheme();
  return (
    <Text
      {...web(heading ? { role: 'heading', 'aria-level': heading } : {})}
      style={[
        styles.text,
        { fontSize: size, lineHeight: line, fontWeight: strong ? '600' : '500', color: colors[tone], textAlign: align },
        style,
      ]}
    >
      {children}
    </Text>
  );
}

/** A part in a share of the size around it: the unit behind a number, the letters before it. */
export function WallPart({
  share,
  size,
  tone,
  children,
}: {
  share: number;
  size: number;
  tone?: ColorRole;
  children: ReactNode;
}) {
  const { colors } = useTheme();
  return (
    <Text style={{ fontSize: size * share, lineHeight: 0, color: tone ? colors[tone] : undefined }}>{children}</Text>
  );
}

const styles = StyleSheet.create({
  text: { fontFamily: faceStacks.num, fontVariant: ['tabular-nums'], whiteSpace: 'nowrap' } as TextStyle,
});
