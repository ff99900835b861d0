import type { ReactNode } from 'react';
import { useWindowDimensions, View } from 'react-native';
import { makeStyles } from '../theme/make-styles';
import { margin, widths } from '../theme/tokens';
import { useBreakpoint } from '../theme/use-breakpoint';

/** From this window on all three columns have their least width beside the rail, px. */
const THREE_FROM = widths.rail + 2 * margin.wide + widths.facts + widths.workMin + widths.sideMin + 2 * widths.gap;

/**
 * Two or three columns on the desk: facts 270, work 560–790 (to 960 on a large screen), side 292–340, gap 40; where
 * three have no room, the facts stand under the side. On tablet and phone all stand under each other in `order`; the
 * default puts the work first.
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
  const three = useWindowDimensions().width >= THREE_FROM;
  if (useBreakpoint() !== 'wide') {
    return (
      <View style={styles.stack}>
        {order.map((name) => (parts[name] ? <View key={name}>{parts[name]}</View> : null))}
      </View>
    );
  }
  if (facts && side && !three)
    return (
      <View style={styles.row}>
        <View style={styles.work}>{work}</View>
        <View style={[styles.side, styles.stack]}>
          {side}
          {facts}
        </View>
      </View>
    );
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
