import { View } from 'react-native';
import { Icon } from '../icons/icon';
import { Badge } from '../primitives/badge';
import { PressableLink } from '../primitives/pressable-link';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { navLabel, type NavProps } from './nav-items';

/** The phone's bottom bar: 72 px, five places. Not shown inside a task. */
export function TabBar({ items, current, onGo }: NavProps) {
  const styles = useStyles();
  return (
    <View role="navigation" aria-label="Places" style={styles.bar}>
      {items.map((item) => {
        const on = item.key === current;
        return (
          <PressableLink
            key={item.key}
            href={item.href}
            onGo={() => onGo(item)}
            label={navLabel(item)}
            current={on}
            style={({ pressed }) => [styles.tab, pressed && styles.pressed]}
          >
            {on ? <View style={styles.mark} /> : null}
            <Icon name={item.icon} size={26} tone={on ? 'ink' : 'ink2'} />
            {item.count ? (
              <View style={styles.badge}>
                <Badge count={item.count} />
              </View>
            ) : null}
            <Txt kind="small" tone={on ? 'ink' : 'ink2'} bold={on} nowrap style={styles.word}>
              {item.title}
            </Txt>
          </PressableLink>
        );
      })}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  bar: {
    flexDirection: 'row',
    height: 72,
    flexShrink: 0,
    backgroundColor: colors.ground,
    borderTopWidth: 1.5,
    borderTopColor: colors.line,
  },
  tab: { flexGrow: 1, flexShrink: 1, flexBasis: 0, alignItems: 'center', justifyContent: 'center', rowGap: 3 },
  pressed: { backgroundColor: colors.well },
  mark: { position: 'absolute', top: -1.5, left: 14, right: 14, height: 4, backgroundColor: colors.ink },
  badge: { position: 'absolute', top: 6, left: '50%', marginLeft: 8 },
  word: { lineHeight: 16 },
}));
