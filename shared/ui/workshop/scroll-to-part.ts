import { useEffect } from 'react';
import type { SectionKey } from './sections';

/** Brings a part of the page to its head; the first one is there already. */
export function useScrollToPart(part: SectionKey | null, ready: boolean): void {
  useEffect(() => {
    if (part === null || !ready) return;
    document.getElementById(`part-${part}`)?.scrollIntoView({ block: 'start' });
  }, [part, ready]);
}
