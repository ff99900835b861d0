import { useSyncExternalStore } from 'react';

const ask = (query: string) =>
  typeof window !== 'undefined' && typeof window.matchMedia === 'function' ? window.matchMedia(query) : null;

/** Whether a media query holds, kept current; `otherwise` where the device cannot say. */
export const useMediaQuery = (query: string, otherwise: boolean): boolean =>
  useSyncExternalStore(
    (changed) => {
      const list = ask(query);
      list?.addEventListener('change', changed);
      return () => list?.removeEventListener('change', changed);
    },
    () => ask(query)?.matches ?? otherwise,
    () => otherwise,
  );
