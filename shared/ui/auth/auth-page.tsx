import type { ReactNode } from 'react';
import { ScrollView, View } from 'react-native';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { useBreakpoint } from '../theme/use-breakpoint';
import { SignInPicture } from './sign-in-picture';

/** The page of the sign-in: the picture above the form on a phone, at its left on a desk. */
export function AuthPage({ low = false, children }: { low?: boolean; children: ReactNode }) {
  const styles = useStyles();
  const wide = useBreakpoint() === 'wide';
  const words = (
    <>
      <Txt heading={1} style={styles.name}>
        Bidewell
      </Txt>
      <Txt tone="ink2" style={styles.claim}>
        Know the wait, and use it.
      </Txt>
      <View style={styles.form}>{children}</View>
    </>
  );
  return (
    <View role="main" style={styles.page}>
      {wide ? (
        <View style={styles.beside}>
          <View style={styles.left}>
            <SignInPicture height={620} />
          </View>
          <ScrollView style={styles.right} contentContainerStyle={styles.rightInside}>
            <View style={styles.column}>{words}</View>
          </ScrollView>
        </View>
      ) : (
        <ScrollView style={styles.scroll} keyboardShouldPersistTaps="handled">
          <SignInPicture low={low} />
          <View style={[styles.column, styles.under]}>{words}</View>
        </ScrollView>
      )}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  page: { flex: 1, backgroundColor: colors.ground },
  scroll: { flex: 1 },
  beside: { flex: 1, flexDirection: 'row' },
  left: { flex: 1, overflow: 'hidden' },
  right: { flexGrow: 0, flexBasis: 520, borderLeftWidth: 1.5, borderLeftColor: colors.line },
  rightInside: { flexGrow: 1, justifyContent: 'center', paddingVertical: 32 },
  column: { width: '100%', maxWidth: 440, marginHorizontal: 'auto', paddingHorizontal: 24 },
  // The picture's vessels end 30 px over its foot; the name stands close under them.
  under: { marginTop: -8, paddingBottom: 24 },
  name: {
    fontFamily: '"Barlow Condensed", "Arial Narrow", sans-serif',
    fontWeight: '600',
    fontSize: 60,
    lineHeight: 56,
  },
  claim: { fontSize: 18, lineHeight: 26, marginTop: 6 },
  form: { marginTop: 22, rowGap: 12 },
}));
