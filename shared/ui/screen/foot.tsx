import type { ReactNode } from 'react';
import { View } from 'react-native';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { margin, touch, widths } from '../theme/tokens';

/**
 * The foot of a task with the one next step; it replaces the bottom bar. `note` stands small above the buttons: the
 * reason of a disabled one, or what the step will bring.
 */
export function Foot({ note, noteId, children }: { note?: ReactNode; noteId?: string; children: ReactNode }) {
  const styles = useStyles();
  return (
    <View style={styles.foot}>
      <View style={styles.inside}>
        {note ? (
          <View style={styles.note} nativeID={noteId}>
            {typeof note === 'string' ? (
              <Txt kind="small" tone="ink2">
                {note}
              </Txt>
            ) : (
              note
            )}
          </View>
        ) : null}
        {children}
      </View>
    </View>
  );
}

/** Buttons side by side, 8 px apart; give the primary `grow`. */
export function ButtonRow({ children }: { children: ReactNode }) {
  const styles = useStyles();
  return <View style={styles.row}>{children}</View>;
}

const useStyles = makeStyles(({ colors }) => ({
  foot: {
    flexShrink: 0,
    paddingTop: 12,
    paddingHorizontal: margin.phone,
    paddingBottom: 16,
    backgroundColor: colors.ground,
    borderTopWidth: 1.5,
    borderTopColor: colors.line,
  },
  // On a wide screen the step stands under the one column, not across the page.
  inside: { width: '100%', maxWidth: widths.single, marginHorizontal: 'auto', rowGap: touch.gap },
  note: {},
  row: { flexDirection: 'row', columnGap: touch.gap },
}));
