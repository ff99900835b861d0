import { View } from 'react-native';
import { BrandMark } from '../icons/brand-mark';
import { Icon } from '../icons/icon';
import { Badge } from '../primitives/badge';
import { PressableLink } from '../primitives/pressable-link';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { widths } from '../theme/tokens';
import { useBreakpoint } from '../theme/use-breakpoint';
import { navLabel, type NavItem, type NavProps } from './nav-items';

/** The rail of tablet (72 px) and desk (92 px), words under the icons, the person at its foot. */
export function SideRail({ items, current, onGo, person }: NavProps & { person?: NavItem }) {
  const styles = useStyles();
  const wide = useBreakpoint() === 'wide';
  return (
    <View
      role="navigation"
      aria-label="Places"
      style={[styles.rail, { width: wide ? widths.rail : widths.railTablet }]}
    >
      <View style={styles.brand}>
        <BrandMark size={wide ? 46 : 38} />
      </View>
      {items.map((item) => (
        <RailItem key={item.key} item={item} on={item.key === current} onGo={onGo} />
      ))}
      <View style={styles.grow} />
      {person ? <RailItem item={person} on={person.key === current} onGo={onGo} /> : null}
    </View>
  );
}

function RailItem({ item, on, onGo }: { item: NavItem; on: boolean; onGo: NavProps['onGo'] }) {
  const styles = useStyles();
  // On the tablet's narrow rail two words stand under each other.
  const wide = useBreakpoint() === 'wide';
  return (
    <PressableLink
      href={item.href}
      onGo={() => onGo(item)}
      label={navLabel(item)}
      current={on}
      style={({ pressed }) => [styles.item, pressed && styles.pressed]}
    >
      {on ? <View style={styles.mark} /> : null}
      <Icon name={item.icon} size={26} tone={on ? 'ink' : 'ink2'} />
      {item.count ? (
        <View style={styles.badge}>
          <Badge count={item.count} />
        </View>
      ) : null}
      <Txt
        kind="small"
        tone={on ? 'ink' : 'ink2'}
        bold={on}
        align="center"
        numberOfLines={wide ? 1 : 2}
        style={styles.word}
      >
        {item.title}
      </Txt>
    </PressableLink>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  rail: {
    flexShrink: 0,
    borderRightWidth: 1.5,
    borderRightColor: colors.line,
    backgroundColor: colors.ground,
    paddingTop: 16,
    paddingBottom: 12,
  },
  brand: { height: 56, marginBottom: 12, alignItems: 'center', justifyContent: 'center' },
  grow: { flex: 1 },
  item: { minHeight: 68, alignItems: 'center', justifyContent: 'center', rowGap: 4, paddingHorizontal: 2 },
  pressed: { backgroundColor: colors.well },
  mark: { position: 'absolute', left: 0, top: 12, bottom: 12, width: 5, backgroundColor: colors.ink },
  badge: { position: 'absolute', top: 6, left: '50%', marginLeft: 8 },
  word: { lineHeight: 16 },
}));
