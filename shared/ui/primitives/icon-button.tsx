import { Pressable, View } from 'react-native';
import { Icon } from '../icons/icon';
import type { IconName } from '../icons/icon-paths';
import { innerFrame } from '../theme/frame';
import { makeStyles } from '../theme/make-styles';
import { radius, stroke, touch } from '../theme/tokens';
import { web } from '../theme/web-props';
import { Badge } from './badge';
import { useSoftDisabled } from './pressing';

/** 48 px, an icon and a name for readers. `framed` where it stands alone among text. */
export function IconButton({
  icon,
  label,
  onPress,
  size = 26,
  framed = false,
  disabled = false,
  count,
  expanded,
}: {
  icon: IconName;
  label: string;
  onPress: () => void;
  size?: number;
  framed?: boolean;
  disabled?: boolean;
  count?: number;
  expanded?: boolean;
}) {
  const styles = useStyles();
  const own = useSoftDisabled(disabled);
  return (
    <Pressable
      ref={own}
      role="button"
      aria-label={count ? `${label}, ${count}` : label}
      aria-expanded={expanded}
      {...web({ dataSet: { press: '' } })}
      onPress={disabled ? undefined : onPress}
      style={({ pressed }) => [styles.box, framed && styles.framed, pressed && !disabled && styles.pressed]}
    >
      <Icon name={icon} size={size} tone={disabled ? 'ink3' : 'ink'} />
      {count ? (
        <View style={styles.badge}>
          <Badge count={count} />
        </View>
      ) : null}
    </Pressable>
  );
}

const useStyles = makeStyles((theme) => ({
  box: {
    width: touch.min,
    height: touch.min,
    alignItems: 'center',
    justifyContent: 'center',
    borderRadius: radius.control,
  },
  framed: innerFrame(theme, stroke.control, theme.colors.edge),
  pressed: { backgroundColor: theme.colors.well },
  badge: { position: 'absolute', top: 2, right: 0 },
}));
