import type { Ref, ReactNode } from 'react';
import { StyleSheet, Text, type StyleProp, type TextProps, type TextStyle } from 'react-native';
import { useTheme } from '../theme/theme';
import { faceStacks, typeScale, type ColorRole, type TypeRole } from '../theme/tokens';
import { web } from '../theme/web-props';

/** Colours words may take; stage colours only where a stage or a verdict speaks. Tapering is never a text colour. */
export type TextTone = Extract<
  ColorRole,
  'ink' | 'ink2' | 'ink3' | 'onInk' | 'alarm' | 'ready' | 'stopped' | 'onStage' | 'onCheckDue' | 'onAlarm' | 'ground'
>;

export interface TxtProps extends Omit<TextProps, 'role' | 'style'> {
  /** Role in the type scale; body when left out. */
  kind?: TypeRole;
  tone?: TextTone;
  /** Weight 600 for words of a 400 role. */
  bold?: boolean;
  /** 'right' for numbers in columns. */
  align?: 'left' | 'right' | 'center';
  /** Numbers and labels never break. */
  nowrap?: boolean;
  /** Level in the page's outline; the look stays that of `kind`. */
  heading?: 1 | 2 | 3;
  role?: string;
  style?: StyleProp<TextStyle>;
  ref?: Ref<Text>;
  children?: ReactNode;
}

const kinds = StyleSheet.create(
  Object.fromEntries(
    Object.entries(typeScale).map(([name, { face, weight, size, line }]) => [
      name,
      {
        fontFamily: faceStacks[face],
        fontWeight: weight,
        fontSize: size,
        lineHeight: line,
        // Neither face is tabular by itself.
        fontVariant: ['tabular-nums'],
      } satisfies TextStyle,
    ]),
  ) as Record<TypeRole, TextStyle>,
);

const own = StyleSheet.create({
  bold: { fontWeight: '600' },
  right: { textAlign: 'right' },
  center: { textAlign: 'center' },
  left: {},
  nowrap: { whiteSpace: 'nowrap' } as TextStyle,
});

/** All words and numbers of the screens. */
export function Txt({
  kind = 'body',
  tone = 'ink',
  bold,
  align,
  nowrap,
  heading,
  role,
  style,
  children,
  ...rest
}: TxtProps) {
  const { colors } = useTheme();
  return (
    <Text
      {...web(heading ? { role: 'heading', 'aria-level': heading } : role ? { role } : {})}
      {...rest}
      style={[kinds[kind], { color: colors[tone] }, bold && own.bold, align && own[align], nowrap && own.nowrap, style]}
    >
      {children}
    </Text>
  );
}

/** A stretch inside a `Txt`: keeps its size, changes weight or tone. */
export function Span({
  bold,
  tone,
  style,
  children,
}: {
  bold?: boolean;
  tone?: TextTone;
  style?: StyleProp<TextStyle>;
  children?: ReactNode;
}) {
  const { colors } = useTheme();
  return <Text style={[bold && own.bold, tone && { color: colors[tone] }, style]}>{children}</Text>;
}
