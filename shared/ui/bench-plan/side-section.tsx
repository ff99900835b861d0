import type { ReactNode } from 'react';
import { View } from 'react-native';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';

/** A part of the side column: heading, a small word at its right, what it holds. */
export function SideSection({
  title,
  aside,
  first = false,
  id,
  children,
}: {
  title: string;
  aside?: ReactNode;
  /** Nothing stands over it: no line. */
  first?: boolean;
  /** To scroll to it. */
  id?: string;
  children?: ReactNode;
}) {
  const styles = useStyles();
  return (
    <View role="region" nativeID={id} aria-label={title} style={[styles.section, !first && styles.line]}>
      <View style={styles.head}>
        <Txt kind="heading" heading={2} style={styles.title}>
          {title}
        </Txt>
        {typeof aside === 'string' ? (
          <Txt kind="small" tone="ink2" nowrap>
            {aside}
          </Txt>
        ) : (
          aside
        )}
      </View>
      {children}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  section: { paddingTop: 2 },
  line: { borderTopWidth: 1, borderTopColor: colors.line, paddingTop: 12 },
  head: {
    flexDirection: 'row',
    justifyContent: 'space-between',
    alignItems: 'baseline',
    columnGap: 12,
    flexWrap: 'wrap',
  },
  title: { flexShrink: 1 },
}));
