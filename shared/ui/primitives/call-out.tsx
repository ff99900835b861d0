import type { ReactNode } from 'react';
import { StyleSheet, View, type StyleProp, type ViewStyle } from 'react-native';
import { standingLine } from '@/shared/contract/standing-line';
import { StageGlyph } from '../stage/stage-glyph';
import { innerFrame } from '../theme/frame';
import { Surface } from '../theme/surface';
import { useTheme } from '../theme/theme';
import { radius, stroke } from '../theme/tokens';
import { Txt } from './txt';

/**
 * A framed box on a tint: amber needs you, red is an alarm or a refusal. At most two on a screen.
 *
 * @param announce reads its text out at once; only for an alert that has just come up, never for one that stood there.
 */
export function CallOut({
  tone,
  announce = false,
  label,
  style,
  children,
}: {
  tone: 'amber' | 'red';
  announce?: boolean;
  label?: string;
  style?: StyleProp<ViewStyle>;
  children: ReactNode;
}) {
  const theme = useTheme();
  const red = tone === 'red';
  return (
    <Surface
      tone={red ? 'alarmTint' : 'checkDueTint'}
      role={announce ? 'alert' : label ? 'region' : undefined}
      aria-label={label}
      style={[styles.box, innerFrame(theme, stroke.control, red ? theme.colors.alarm : theme.colors.ink), style]}
    >
      {children}
    </Surface>
  );
}

/** A standing caution without a frame: octagon and one small sentence on amber. */
export function Caution({ children, style }: { children: ReactNode; style?: StyleProp<ViewStyle> }) {
  return (
    <Surface tone="checkDueTint" style={[styles.caution, style]}>
      <StageGlyph stage="overdue" size={22} tone="ink" />
      <View style={styles.words}>{typeof children === 'string' ? <Txt kind="small">{children}</Txt> : children}</View>
    </Surface>
  );
}

/** The sentence that stands on every plan and sheet. */
export const StandingLine = ({ style }: { style?: StyleProp<ViewStyle> }) => (
  <Caution style={style}>{standingLine}</Caution>
);

const styles = StyleSheet.create({
  box: { borderRadius: radius.sheet, padding: 14 },
  caution: {
    flexDirection: 'row',
    alignItems: 'center',
    columnGap: 12,
    borderRadius: radius.control,
    paddingVertical: 10,
    paddingHorizontal: 12,
  },
  words: { flex: 1 },
});
