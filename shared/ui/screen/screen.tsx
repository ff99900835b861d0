import { useContext, type ReactNode } from 'react';
import { ScrollView, View } from 'react-native';
import { makeStyles } from '../theme/make-styles';
import { margin, widths } from '../theme/tokens';
import { useBreakpoint } from '../theme/use-breakpoint';
import { useScrollFocus } from './scroll-focus';
import { ShellStrip } from './shell-strip';

/**
 * One screen: header, strip, scrolling body, foot. Rail and tab bar stand around it in `AppFrame`.
 *
 * On the phone the body is one column with 16 px margins; on the tablet one column of at most 680 px, centred; on the
 * desk as wide as the page, for `Columns`.
 */
export function Screen({
  header,
  strip,
  foot,
  single = false,
  children,
}: {
  header?: ReactNode;
  /** Under the header; left out, the shell's own (no connection). */
  strip?: ReactNode;
  foot?: ReactNode;
  /** One column of at most 680 px on the desk too: forms and short lists. */
  single?: boolean;
  children: ReactNode;
}) {
  const styles = useStyles();
  const at = useBreakpoint();
  const shellStrip = useContext(ShellStrip);
  const body = useScrollFocus();
  const narrow = at === 'tablet' || (at === 'wide' && single);
  return (
    <View role="main" style={styles.screen}>
      <View style={at === 'wide' ? [styles.wideEdge, styles.page] : at === 'tablet' && styles.singleHead}>
        {header}
      </View>
      {strip ?? shellStrip}
      <ScrollView
        ref={body}
        style={styles.scroll}
        contentContainerStyle={[styles.body, at === 'wide' && styles.wideEdge, at === 'wide' && styles.page]}
        keyboardShouldPersistTaps="handled"
      >
        <View style={[styles.column, narrow && styles.single]}>{children}</View>
      </ScrollView>
      {foot}
    </View>
  );
}

/** The app around its screens: rail at the left from the tablet up, bottom bar on the phone. Reading order = focus order. */
export function AppFrame({ rail, tabs, children }: { rail?: ReactNode; tabs?: ReactNode; children: ReactNode }) {
  const styles = useStyles();
  const phone = useBreakpoint() === 'phone';
  return (
    <View style={[styles.frame, !phone && styles.beside]}>
      {phone ? null : rail}
      <View style={styles.inside}>{children}</View>
      {phone ? tabs : null}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  frame: { flex: 1, backgroundColor: colors.ground },
  beside: { flexDirection: 'row' },
  inside: { flex: 1, minWidth: 0, minHeight: 0 },
  screen: { flex: 1, minHeight: 0, backgroundColor: colors.ground },
  scroll: { flex: 1 },
  body: { flexGrow: 1, paddingHorizontal: margin.phone, paddingBottom: 16 },
  wideEdge: { paddingHorizontal: margin.wide },
  page: { width: '100%', maxWidth: widths.page, marginHorizontal: 'auto' },
  column: { flexGrow: 1, width: '100%' },
  single: { maxWidth: widths.single, width: '100%', marginHorizontal: 'auto' },
  // The header keeps its own margins inside the column.
  singleHead: { maxWidth: widths.single + 2 * margin.phone, width: '100%', marginHorizontal: 'auto' },
}));
