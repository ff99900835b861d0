import { Pressable, StyleSheet, type StyleProp, type TextStyle, type ViewStyle } from 'react-native';
import { touch } from '../theme/tokens';
import { web } from '../theme/web-props';
import { goInside } from './pressable-link';
import { useSoftDisabled } from './pressing';
import { Txt, type TextTone } from './txt';

/**
 * An underlined word: a small action or a way to another screen. The target is 48 px high; in a row that is lower
 * give `tight`, which lets the target hang out over the row instead of growing it.
 */
export function Link({
  title,
  onPress,
  href,
  kind = 'body',
  tone = 'ink',
  label,
  tight = false,
  disabled = false,
  align = 'left',
  style,
}: {
  title: string;
  onPress?: () => void;
  /** A real address: opens in a new tab, can be copied. `onPress`, where given, goes first. */
  href?: string;
  kind?: 'body' | 'small' | 'label';
  tone?: TextTone;
  /** 'Edit Petra Aldwin' where the word alone would be one of many. */
  label?: string;
  tight?: boolean;
  disabled?: boolean;
  /** The side of the 48 px target its word stands at, where the word is shorter. */
  align?: 'left' | 'right';
  style?: StyleProp<ViewStyle>;
}) {
  const own = useSoftDisabled(disabled);
  const press = href ? (onPress ? goInside(onPress) : undefined) : onPress;
  return (
    <Pressable
      ref={own}
      role={href ? 'link' : 'button'}
      aria-label={label}
      onPress={disabled ? undefined : press}
      {...web(href && !disabled ? { href } : {})}
      style={[styles.target, tight && styles.tight, align === 'right' && styles.right, style]}
    >
      <Txt kind={kind} tone={disabled ? 'ink3' : tone} nowrap style={styles.word}>
        {title}
      </Txt>
    </Pressable>
  );
}

const styles = StyleSheet.create({
  target: { minHeight: touch.min, minWidth: touch.min, justifyContent: 'center' },
  tight: { marginVertical: -14 },
  right: { alignItems: 'flex-end' },
  word: { textDecorationLine: 'underline', textUnderlineOffset: 3 } as TextStyle,
});
