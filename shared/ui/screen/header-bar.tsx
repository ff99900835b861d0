import type { ReactNode } from 'react';
import { View } from 'react-native';
import { IconButton } from '../primitives/icon-button';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { margin } from '../theme/tokens';
import { useBreakpoint } from '../theme/use-breakpoint';
import { web } from '../theme/web-props';

export interface HeaderBarProps {
  title: string;
  /** One line under the title (phone) or beside it (desk). */
  sub?: string;
  /** Back is top left, 48 px. */
  onBack?: () => void;
  backLabel?: string;
  /** The workshop's clock, as text; ticks without being read out. */
  clock?: string;
  /** Sound, print, more: icon buttons before the clock. */
  tools?: ReactNode;
  /** Desk only: search and filters beside the title. */
  middle?: ReactNode;
  /** Desk only: the primary action, before the clock. */
  action?: ReactNode;
}

/** The top line of a screen: 64 px with the title over its sub line on the phone, 76 px in one row on the desk. */
export function HeaderBar({ title, sub, onBack, backLabel = 'Back', clock, tools, middle, action }: HeaderBarProps) {
  const styles = useStyles();
  const wide = useBreakpoint() === 'wide';
  return (
    <View style={[styles.bar, wide && styles.wideBar]}>
      {onBack ? (
        <View style={styles.back}>
          <IconButton icon="back" size={wide ? 30 : 28} label={backLabel} onPress={onBack} />
        </View>
      ) : null}
      {wide ? (
        <>
          <Txt kind="titleWide" heading={1} nowrap>
            {title}
          </Txt>
          {sub ? (
            <Txt tone="ink2" numberOfLines={1} style={styles.wideSub}>
              {sub}
            </Txt>
          ) : null}
          {middle}
          <View style={styles.grow} />
          {tools}
          {action}
        </>
      ) : (
        <>
          <View style={styles.names}>
            <Txt kind="title" heading={1} numberOfLines={1}>
              {title}
            </Txt>
            {sub ? (
              <Txt kind="small" tone="ink2" numberOfLines={1} style={styles.sub}>
                {sub}
              </Txt>
            ) : null}
          </View>
          {tools}
        </>
      )}
      {clock ? (
        <Txt kind="numM" nowrap {...web({ role: 'timer', 'aria-live': 'off' })} aria-label={`Workshop time ${clock}`}>
          {clock}
        </Txt>
      ) : null}
    </View>
  );
}

const useStyles = makeStyles(() => ({
  bar: {
    flexDirection: 'row',
    alignItems: 'center',
    columnGap: 12,
    height: 64,
    paddingHorizontal: margin.phone,
    flexShrink: 0,
  },
  wideBar: { height: 76, columnGap: 20, paddingHorizontal: 0 },
  back: { marginLeft: -16, marginRight: -8 },
  names: { flex: 1, minWidth: 0 },
  sub: { marginTop: -1 },
  wideSub: { flexShrink: 1 },
  grow: { flex: 1 },
}));
