import type { ReactNode } from 'react';
import { Pressable, View } from 'react-native';
import { Icon } from '../icons/icon';
import type { IconName } from '../icons/icon-paths';
import { goInside } from '../primitives/pressable-link';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { touch } from '../theme/tokens';
import { web } from '../theme/web-props';

export interface MoreRowProps {
  title: string;
  /** What stands now: 'Petra Aldwin', '2 devices'. */
  value?: string;
  meaning?: string;
  icon?: IconName;
  /** A place to go; without it the row is a button. */
  href?: string;
  onPress: () => void;
  /** Instead of the arrow: a switch of its own. */
  children?: ReactNode;
}

/** A row of 56 px: the whole of it is the target. */
export function MoreRow({ title, value, meaning, icon, href, onPress }: MoreRowProps) {
  const styles = useStyles();
  return (
    <Pressable
      role={href ? 'link' : 'button'}
      {...web(href ? { href, dataSet: { press: '' } } : { dataSet: { press: '' } })}
      onPress={href ? goInside(onPress) : onPress}
      style={({ pressed }) => [styles.row, pressed && styles.pressed]}
    >
      {icon ? <Icon name={icon} size={24} tone="ink2" /> : null}
      <View style={styles.words}>
        <Txt numberOfLines={1}>{title}</Txt>
        {meaning ? (
          <Txt kind="small" tone="ink2">
            {meaning}
          </Txt>
        ) : null}
      </View>
      {value ? (
        <Txt tone="ink2" numberOfLines={1} style={styles.value}>
          {value}
        </Txt>
      ) : null}
      <Icon name="right" size={20} tone="ink2" />
    </Pressable>
  );
}

/** A titled group of rows. */
export function MoreGroup({ title, children }: { title: string; children: ReactNode }) {
  const styles = useStyles();
  return (
    <View style={styles.group}>
      <Txt kind="heading" heading={2} style={styles.title}>
        {title}
      </Txt>
      {children}
    </View>
  );
}

/** A setting with its control under its name. */
export function MoreSetting({ title, meaning, children }: { title: string; meaning?: string; children: ReactNode }) {
  const styles = useStyles();
  return (
    <View style={styles.setting}>
      <View style={styles.words}>
        <Txt>{title}</Txt>
        {meaning ? (
          <Txt kind="small" tone="ink2">
            {meaning}
          </Txt>
        ) : null}
      </View>
      {children}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  group: { paddingTop: 12 },
  title: { marginBottom: 4 },
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    columnGap: 12,
    minHeight: touch.primary,
    paddingVertical: 6,
    borderTopWidth: 1,
    borderTopColor: colors.line,
  },
  pressed: { backgroundColor: colors.well },
  words: { flexGrow: 1, flexShrink: 1, minWidth: 0 },
  value: { flexShrink: 1, maxWidth: '50%', textAlign: 'right' },
  setting: { borderTopWidth: 1, borderTopColor: colors.line, paddingVertical: 12, rowGap: 8 },
}));
