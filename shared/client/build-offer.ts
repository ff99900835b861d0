/** Notices a new build of the app while a page is open and offers it. A person takes it, or not now. */
import { useEffect } from 'react';
import { externalStore, useStore } from './external-store';
import { onLive } from './link';
import { newBuildThere } from './new-build';
import { serviceWorker } from './service-worker';

/** After *Later* it is quiet for so long, ms. */
const quietMs = 4 * 3600_000;
/** Looked for at most so often when the page is shown again, ms. */
const lookEveryMs = 10 * 60_000;

const offered = externalStore(false);
let quietUntil = -Infinity;
let lookedAt = -Infinity;

/** Asks the server, and lets the browser fetch the new worker meanwhile. */
async function look(): Promise<void> {
  lookedAt = performance.now();
  const yes = await newBuildThere();
  const registration = 'serviceWorker' in navigator ? await navigator.serviceWorker.getRegistration() : undefined;
  if (yes) {
    void registration?.update().catch(() => undefined);
    if (performance.now() >= quietUntil) offered.set(true);
  } else registration?.waiting?.postMessage({ type: 'take-over-alone' });
}

/** Waits until the page has come to rest: keeping the app must not slow its first screen. */
function afterFirstScreen(work: () => void): () => void {
  const timer = setTimeout(() => {
    if ('requestIdleCallback' in globalThis) requestIdleCallback(work, { timeout: 5000 });
    else work();
  }, 3000);
  return () => clearTimeout(timer);
}

/**
 * Keeps the app on this device (where the browser can), so that it opens without a connection, and looks for new
 * builds. Once, around the screens of somebody signed in.
 */
export function useKeptApp(): void {
  useEffect(() => {
    const again = () => {
      if (document.visibilityState === 'visible' && performance.now() - lookedAt > lookEveryMs) void look();
    };
    const stops = [
      afterFirstScreen(() => void serviceWorker().then(look)),
      // The server was away: it may have come back as another.
      onLive(() => void look()),
    ];
    document.addEventListener('visibilitychange', again);
    return () => {
      for (const stop of stops) stop();
      document.removeEventListener('visibilitychange', again);
    };
  }, []);
}

/** Whether a new build is on offer; `later` hides it for some hours. */
export function useBuildOffer(): { there: boolean; later: () => void } {
  const there = useStore(offered);
  return {
    there,
    later: () => {
      quietUntil = performance.now() + quietMs;
      offered.set(false);
    },
  };
}
