import type { ErrorBoundaryProps } from 'expo-router';
import { useEffect } from 'react';
import { ThemeProvider } from '../theme/theme';
import { WallStage } from './wall-stage';
import { WallText } from './wall-text';

/** Nobody stands by a wall to press a button: it loads itself anew. */
const reloadMs = 15_000;

/** What the wall shows when its code fails. */
export function ErrorBoundary({ error }: ErrorBoundaryProps) {
  useEffect(() => {
    const timer = setTimeout(() => globalThis.location?.reload(), reloadMs);
    return () => clearTimeout(timer);
  }, []);
  return (
    <ThemeProvider choice="night">
      <WallStage shift={{ x: 0, y: 0 }}>
        <WallText size={64} line={200} strong tone="checkDue" heading={1} style={{ marginLeft: 40 }}>
          This screen failed. It loads itself anew in a moment.
        </WallText>
        <WallText size={40} tone="ink3" style={{ marginLeft: 40 }}>
          {error.message.slice(0, 100)}
        </WallText>
      </WallStage>
    </ThemeProvider>
  );
}
