import { useEffect, useState, type ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '../primitives/button';
import { StatusRegion } from '../primitives/live-region';
import { Txt } from '../primitives/txt';
import { useTheme } from '../theme/theme';
import { radius } from '../theme/tokens';

/** Nothing for 300 ms, then bars, after 8 s a word and a way to try again. */
export type LoadingPhase = 'quiet' | 'bars' | 'slow';
export const loadingAfterMs = { bars: 300, slow: 8000 } as const;

/** How far a wait has come since this part appeared, or since `key` changed. */
export function useLoadingPhase(key: unknown = null): LoadingPhase {
  const [state, setState] = useState<{ key: unknown; phase: LoadingPhase }>({ key, phase: 'quiet' });
  useEffect(() => {
    const timers = (['bars', 'slow'] as const).map((phase) =>
      setTimeout(() => setState({ key, phase }), loadingAfterMs[phase]),
    );
    return () => timers.forEach(clearTimeout);
  }, [key]);
  return state.key === key ? state.phase : 'quiet';
}

/** A bar of the well where a number will come. No shimmer. */
export function WellBar({ width, height = 20 }: { width: number | `${number}%`; height?: number }) {
  const { colors } = useTheme();
  return <View aria-hidden style={{ width, height, borderRadius: radius.mark, backgroundColor: colors.well }} />;
}

/**
 * The frame of what is coming. `children` is the frame with `WellBar`s where numbers come; without it a plain list.
 */
export function Loading({
  what,
  onRetry,
  rows = 4,
  children,
}: {
  /** 'the bench': read out and shown when it takes long. */
  what: string;
  onRetry: () => void;
  rows?: number;
  children?: ReactNode;
}) {
  const phase = useLoadingPhase();
  if (phase === 'quiet') return <View aria-busy />;
  return (
    <View aria-busy style={styles.stack}>
      <StatusRegion text={phase === 'slow' ? `Still loading ${what}` : `Loading ${what}`} />
      {children ??
        Array.from({ length: rows }, (_, i) => (
          <View key={i} style={styles.row}>
            <WellBar width={i % 2 ? '38%' : '54%'} height={22} />
            <WellBar width={72} height={22} />
          </View>
        ))}
      {phase === 'slow' ? (
        <View style={styles.slow}>
          <Txt tone="ink2">{`Still loading ${what}.`}</Txt>
          <Button look="line" size="small" title="Try again" onPress={onRetry} />
        </View>
      ) : null}
    </View>
  );
}

const styles = StyleSheet.create({
  stack: { rowGap: 16, paddingVertical: 8 },
  row: { flexDirection: 'row', justifyContent: 'space-between', columnGap: 16, minHeight: 40, alignItems: 'center' },
  slow: { flexDirection: 'row', alignItems: 'center', justifyContent: 'space-between', columnGap: 16 },
});
