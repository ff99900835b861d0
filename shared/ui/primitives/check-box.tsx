import type { ReactNode } from 'react';
import { Pressable, StyleSheet, View } from 'react-native';
import { StageGlyph } from '../stage/stage-glyph';
import { touch } from '../theme/tokens';
import { web } from '../theme/web-props';
import { TickMark } from './choice-row';
import { pressOnSpace, useSoftDisabled } from './pressing';
import { Txt } from './txt';

/** A tick box with its sentence; the whole line is the target. Nothing is ever ticked before a person did it. */
export function CheckBox({
  checked,
  onChange,
  title,
  meaning,
  error,
  disabled = false,
  children,
}: {
  checked: boolean;
  onChange: (checked: boolean) => void;
  title: string;
  meaning?: string;
  error?: string;
  disabled?: boolean;
  /** Drawn in place of the title; `title` still names the box. */
  children?: ReactNode;
}) {
  const own = useSoftDisabled(disabled);
  const press = disabled ? undefined : () => onChange(!checked);
  return (
    <View>
      <Pressable
        ref={own}
        role="checkbox"
        aria-checked={checked}
        aria-label={children || meaning || error ? [title, meaning, error].filter(Boolean).join('. ') : undefined}
        {...web({
          'aria-invalid': error !== undefined || undefined,
          onKeyDown: (event) => pressOnSpace(event, press),
        })}
        onPress={press}
        style={styles.row}
      >
        <TickMark on={checked} disabled={disabled} />
        <View style={styles.words}>
          {children ?? (
            <Txt tone={disabled ? 'ink3' : 'ink'} style={styles.title}>
              {title}
            </Txt>
          )}
          {meaning ? (
            <Txt kind="small" tone={disabled ? 'ink3' : 'ink2'}>
              {meaning}
            </Txt>
          ) : null}
        </View>
      </Pressable>
      {error ? (
        <View style={styles.error}>
          <StageGlyph stage="overdue" size={18} />
          <Txt kind="label" tone="alarm" style={styles.words}>
            {error}
          </Txt>
        </View>
      ) : null}
    </View>
  );
}

const styles = StyleSheet.create({
  row: { flexDirection: 'row', alignItems: 'flex-start', columnGap: 12, minHeight: touch.min, paddingVertical: 11 },
  words: { flex: 1, minWidth: 0 },
  title: { lineHeight: 21, paddingTop: 2 },
  error: { flexDirection: 'row', columnGap: 4, paddingLeft: 38, marginTop: -4, marginBottom: 6 },
});
