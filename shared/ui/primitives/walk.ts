import type { WebKeyEvent } from '../theme/web-props';

/** The index the arrow, Home and End keys lead to, going round at the ends; null for other keys. */
export function steppedIndex(key: string, at: number, count: number): number | null {
  if (key === 'ArrowRight' || key === 'ArrowDown') return (at + 1) % count;
  if (key === 'ArrowLeft' || key === 'ArrowUp') return (at - 1 + count) % count;
  if (key === 'Home') return 0;
  return key === 'End' ? count - 1 : null;
}

/** Moves the focus to the sibling of that index within the element that holds the event's one. */
export function focusSibling(event: WebKeyEvent, index: number): void {
  const sibling = (event.currentTarget as HTMLElement | null)?.parentElement?.children[index];
  if (sibling instanceof HTMLElement) sibling.focus();
}
