import type { ReactNode } from 'react';
import { View } from 'react-native';
import { makeStyles } from '../theme/make-styles';
import { widths } from '../theme/tokens';
import { useBreakpoint } from '../theme/use-breakpoint';

/**
 * Two or three columns on the desk: facts 270, work 560–790 (to 960 on a large screen), side 292–340, gap 40. On
 * tablet and phone they stand under each other in `order`; the default puts the work first.
 */
export function Columns({
  facts,
  work,
  side,
  order = ['work', 'facts', 'side'],
}: {
  facts?: ReactNode;
  work: ReactNode;
  side?: ReactNode;
  order?: readonly ('facts' | 'work' | 'side')[];
}) {
  const styles = useStyles();
  const parts = { facts, work, side };
  if (useBreakpoint() !== 'wide') {
    return (
      <View style={styles.stack}>
        {order.map((name) => (parts[name] ? <View key={name}>{parts[name]}</View> : null))}
      </View>
    );
  }
  return (
    <View style={styles.row}>
      {facts ? <View style={styles.facts}>{facts}</View> : null}
      <View style={[styles.work, !side && styles.workAlone]}>{work}</View>
      {side ? <View style={styles.side}>{side}</View> : null}
    </View>
  );
}

const useStyles = makeStyles(() => ({
  stack: { rowGap: 24 },
  row: { flexDirection: 'row', columnGap: widths.gap, alignItems: 'flex-start' },
  facts: { width: widths.facts, flexShrink: 0 },
  work: { flexGrow: 790, flexShrink: 1, flexBasis: widths.workMin, minWidth: 0, maxWidth: widths.workGrown },
  workAlone: { flexGrow: 1 },
  side: { flexGrow: 340, flexShrink: 1, flexBasis: widths.sideMin, minWidth: widths.sideMin, maxWidth: widths.sideMax },
}));
