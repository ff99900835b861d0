import { useId, type ReactNode } from 'react';
import { Modal, ScrollView, View } from 'react-native';
import { makeStyles } from '../theme/make-styles';
import { OnSurface } from '../theme/surface';
import { motion, radius } from '../theme/tokens';
import { web, webStyle } from '../theme/web-props';
import { IconButton } from './icon-button';
import { Txt } from './txt';

/**
 * A sheet from the foot of the screen over a scrim: for logging, stopping, quarantine. At most 82 % high, then it
 * scrolls inside; the screen's number stays visible above. Focus stays in it, goes back where it came from, and Esc
 * closes.
 */
export function BottomSheet({
  open,
  onClose,
  title,
  aside,
  cross = true,
  scrimCloses = true,
  actions,
  children,
}: {
  open: boolean;
  /** Esc, the cross and (unless switched off) a tap on the scrim. Always the safe way out. */
  onClose: () => void;
  title: string;
  /** Beside the title: '13:42'. */
  aside?: string;
  /** false where a safe button stands at the foot instead. */
  cross?: boolean;
  /** false where something typed would be lost by a stray tap. */
  scrimCloses?: boolean;
  /** Buttons at the foot; they do not scroll away. */
  actions?: ReactNode;
  children?: ReactNode;
}) {
  const styles = useStyles();
  const id = useId();
  return (
    <Modal visible={open} transparent animationType="none" onRequestClose={onClose} {...web({ 'aria-labelledby': id })}>
      <View style={styles.place}>
        <View style={styles.scrim} aria-hidden {...web(scrimCloses ? { onClick: onClose } : {})} />
        <View style={[styles.sheet, rising]} {...web({ tabIndex: -1, dataSet: { focus: 'none' } })}>
          <OnSurface tone="sheet">
            <View style={styles.head}>
              <View style={styles.names}>
                <Txt kind="title" heading={2} nativeID={id}>
                  {title}
                </Txt>
                {aside ? <Txt tone="ink2">{aside}</Txt> : null}
              </View>
              {cross ? <IconButton icon="cross" label="Close" onPress={onClose} /> : null}
            </View>
            <ScrollView
              style={styles.scroll}
              contentContainerStyle={styles.content}
              keyboardShouldPersistTaps="handled"
            >
              {children}
            </ScrollView>
            {actions ? <View style={styles.actions}>{actions}</View> : null}
          </OnSurface>
        </View>
      </View>
    </Modal>
  );
}

const rising = webStyle({
  animationKeyframes: [{ from: { transform: 'translateY(48px)', opacity: 0 }, to: { transform: 'none', opacity: 1 } }],
  animationDuration: `${motion.sheet}ms`,
  animationTimingFunction: motion.ease,
});

const useStyles = makeStyles(({ colors, name }) => ({
  place: { flex: 1, justifyContent: 'flex-end', alignItems: 'center' },
  scrim: { position: 'absolute', top: 0, right: 0, bottom: 0, left: 0, backgroundColor: scrims[name] },
  sheet: {
    width: '100%',
    maxWidth: 680,
    maxHeight: '82%',
    backgroundColor: colors.sheet,
    borderTopLeftRadius: radius.sheet,
    borderTopRightRadius: radius.sheet,
    borderTopWidth: 1,
    borderTopColor: colors.line,
    paddingTop: 10,
    // Outside the margin: the strip a phone keeps for its own gesture.
    paddingBottom: 'calc(16px + env(safe-area-inset-bottom))' as unknown as number,
    boxShadow: '0 -8px 24px rgba(28,26,21,0.10)',
  },
  head: {
    flexDirection: 'row',
    alignItems: 'center',
    justifyContent: 'space-between',
    minHeight: 48,
    paddingLeft: 16,
    paddingRight: 4,
  },
  names: { flexDirection: 'row', alignItems: 'baseline', columnGap: 12, flexShrink: 1 },
  // Fields draw their focus frame inside, but a chosen row's frame stands 14 px outside the text column.
  scroll: { flexGrow: 0, flexShrink: 1 },
  content: { paddingHorizontal: 16, paddingTop: 4 },
  actions: { paddingHorizontal: 16, paddingTop: 12, rowGap: 8 },
}));

/** 42 % of the ink; on night a dark scrim, since light ink would lighten what it should put back. */
const scrims = { paper: 'rgba(28,26,21,0.42)', night: 'rgba(0,0,0,0.62)' } as const;
