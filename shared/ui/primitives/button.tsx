import { useImperativeHandle, type Ref } from 'react';
import { Pressable, type View, type StyleProp, type ViewStyle } from 'react-native';
import { Icon } from '../icons/icon';
import type { IconName } from '../icons/icon-paths';
import { innerFrame } from '../theme/frame';
import { makeStyles } from '../theme/make-styles';
import { radius, stroke, touch, type ColorRole } from '../theme/tokens';
import { web } from '../theme/web-props';
import { useSoftDisabled } from './pressing';
import { Txt, type TextTone } from './txt';

/** 'primary' is ink; 'line' stands beside it; 'danger' opens a confirm step, never acts by itself. */
export type ButtonLook = 'primary' | 'line' | 'danger';

export interface ButtonProps {
  /** A verb with its object: 'Enter the group voltages'. */
  title: string;
  onPress: () => void;
  look?: ButtonLook;
  /** 48 px instead of 56; 'gloved' is the 64 of the checks before clipping on. */
  size?: 'small' | 'normal' | 'gloved';
  icon?: IconName;
  iconAfter?: IconName;
  /** Stays where it will be, in the look of the well. Say why above the foot's buttons. */
  disabled?: boolean;
  /** Sent and not answered yet: no second press, the word stays. */
  busy?: boolean;
  /** Says more to a screen reader than the title: 'Give the fill to Bram'. */
  label?: string;
  /** Id of the sentence that says why it is disabled. */
  describedBy?: string;
  grow?: boolean;
  style?: StyleProp<ViewStyle>;
  ref?: Ref<View>;
}

const words: Record<ButtonLook, TextTone & ColorRole> = { primary: 'onInk', line: 'ink', danger: 'alarm' };
const heights = { small: touch.min, normal: touch.primary, gloved: touch.gloved } as const;

export function Button({
  title,
  onPress,
  look = 'primary',
  size = 'normal',
  icon,
  iconAfter,
  disabled = false,
  busy = false,
  label,
  describedBy,
  grow,
  style,
  ref,
}: ButtonProps) {
  const styles = useStyles();
  const still = disabled || busy;
  const own = useSoftDisabled(still);
  useImperativeHandle(ref, () => own.current as View, [own]);
  const iconSize = size === 'small' ? 20 : 24;
  return (
    <Pressable
      ref={own}
      role="button"
      aria-label={label}
      aria-busy={busy || undefined}
      {...web({ 'aria-describedby': describedBy, dataSet: { press: '' } })}
      onPress={still ? undefined : onPress}
      style={({ pressed }) => [
        styles.box,
        { minHeight: heights[size], paddingHorizontal: size === 'small' ? 14 : 18 },
        disabled ? styles.off : styles[look],
        pressed && !still && (look === 'primary' ? styles.primaryPressed : styles.pressed),
        grow && styles.grow,
        style,
      ]}
    >
      {({ pressed }) => {
        const tone = disabled ? 'ink3' : pressed && !still && look === 'primary' ? 'ground' : words[look];
        return (
          <>
            {icon ? <Icon name={icon} size={iconSize} tone={tone} /> : null}
            <Txt kind="button" tone={tone} align="center" style={size === 'small' ? styles.smallWord : null}>
              {title}
            </Txt>
            {iconAfter ? <Icon name={iconAfter} size={iconSize} tone={tone} /> : null}
          </>
        );
      }}
    </Pressable>
  );
}

const useStyles = makeStyles((theme) => ({
  box: {
    flexDirection: 'row',
    alignItems: 'center',
    justifyContent: 'center',
    columnGap: 10,
    borderRadius: radius.control,
    paddingVertical: 6,
  },
  grow: { flexGrow: 1, flexShrink: 1, flexBasis: 0 },
  primary: { backgroundColor: theme.colors.ink, ...(theme.forced && innerFrame(theme, 2, theme.colors.ink)) },
  primaryPressed: { backgroundColor: theme.colors.ink2 },
  line: innerFrame(theme, stroke.control, theme.colors.edge),
  danger: innerFrame(theme, stroke.control, theme.colors.alarm),
  pressed: { backgroundColor: theme.colors.well },
  off: theme.forced
    ? { borderWidth: stroke.control, borderStyle: 'dashed', borderColor: 'var(--bw-gray)' }
    : { backgroundColor: theme.colors.well },
  smallWord: { fontSize: 15, lineHeight: 20 },
}));
