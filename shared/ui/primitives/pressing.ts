import { useLayoutEffect, useRef, type RefObject } from 'react';
import type { View } from 'react-native';
import type { WebKeyEvent } from '../theme/web-props';

/**
 * A ref that marks its element as disabled for readers without the browser's own `disabled`: it keeps its place in the
 * tab order, so that the reason can be read where it stands, and a button that is sending does not lose the focus.
 * (`Pressable` writes `aria-disabled` itself and would make it the hard one.)
 */
export function useSoftDisabled(disabled: boolean): RefObject<View | null> {
  const own = useRef<View>(null);
  useLayoutEffect(() => {
    const element = own.current as unknown as Partial<HTMLElement> | null;
    if (disabled) element?.setAttribute?.('aria-disabled', 'true');
    else element?.removeAttribute?.('aria-disabled');
  }, [disabled]);
  return own;
}

/** The space key for what is no button to the renderer (radio, tick box): chooses, and does not scroll the page. */
export function pressOnSpace(event: WebKeyEvent, press: (() => void) | undefined): void {
  if (event.key !== ' ') return;
  event.preventDefault();
  press?.();
}
