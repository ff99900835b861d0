import { useEffect } from 'react';

/** Names the page in the browser's tab, its history and to screen readers. */
export function usePageTitle(title: string): void {
  useEffect(() => {
    if (typeof document !== 'undefined') document.title = title;
  }, [title]);
}
