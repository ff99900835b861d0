import { useEffect, useState } from 'react';
import { missingHere } from './secure-context';

/** asking; held; off: the browser refused or cannot, `sentence` says which. */
export interface Awake {
  state: 'asking' | 'held' | 'off';
  sentence: string | null;
}

const tag = 'wall';

/** Keeps this screen from sleeping as long as the page is shown; asks again whenever it is shown anew. */
export function useAwake(): Awake {
  const [awake, setAwake] = useState<Awake>({ state: 'asking', sentence: null });
  useEffect(() => {
    let over = false;
    const ask = async () => {
      const [missing] = missingHere(['wake-lock']);
      if (missing) {
        setAwake({ state: 'off', sentence: missing.sentence });
        return;
      }
      try {
        const { activateKeepAwakeAsync } = await import('expo-keep-awake');
        if (over || document.visibilityState !== 'visible') return;
        await activateKeepAwakeAsync(tag);
        if (!over) setAwake({ state: 'held', sentence: null });
      } catch {
        if (!over)
          setAwake({
            state: 'off',
            sentence: 'This screen may fall asleep: the browser refused. Switch the sleep timer off in the device.',
          });
      }
    };
    // A browser lets go whenever the page is hidden.
    const shown = () => {
      if (document.visibilityState === 'visible') void ask();
    };
    document.addEventListener('visibilitychange', shown);
    void ask();
    return () => {
      over = true;
      document.removeEventListener('visibilitychange', shown);
      void import('expo-keep-awake').then(
        ({ deactivateKeepAwake }) => deactivateKeepAwake(tag),
        () => undefined,
      );
    };
  }, []);
  return awake;
}
