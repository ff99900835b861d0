/**
 * When a control counts as left. A press on a button takes the focus from the field before it is a click; were the
 * field checked at that moment, a sentence that comes or goes could move the button from under the finger and the press
 * would be lost. So the leaving waits until the press is over. Without a pointer (Tab, a reader's own click) and
 * without a document it is at once.
 */
import { useCallback, useLayoutEffect, useRef } from 'react';

let pressing = false;
let listening = false;
let over: ReturnType<typeof setTimeout> | undefined;
const waiting: (() => void)[] = [];

function begin(): void {
  clearTimeout(over);
  pressing = true;
}

/** The click comes in the same task as the pointer's end, so the press is over in the next one. */
function end(): void {
  if (!pressing) return;
  clearTimeout(over);
  over = setTimeout(() => {
    pressing = false;
    for (const leave of waiting.splice(0)) leave();
  }, 0);
}

/** Its end went unheard: a native list or menu took it, or it was out of the window. */
const endUnheard = (event: { buttons: number }): void => {
  if (event.buttons === 0) end();
};

function listen(): void {
  if (listening || typeof document === 'undefined') return;
  listening = true;
  const inCapture = { capture: true, passive: true };
  // On a touch screen the focus moves with the mouse events that follow the touch: a second, short press.
  for (const name of ['pointerdown', 'mousedown'] as const) document.addEventListener(name, begin, inCapture);
  for (const name of ['pointerup', 'pointercancel', 'mouseup', 'dragend', 'keydown'] as const)
    document.addEventListener(name, end, inCapture);
  document.addEventListener('pointermove', endUnheard, inCapture);
}

/** Runs it now, or right after the press that is under way and its click. */
function whenPressIsOver(leave: () => void): void {
  if (pressing) waiting.push(leave);
  else leave();
}

/**
 * What a control calls on losing the focus. `onLeave` runs once the press that took the focus is over, as it was given
 * in the last render; not at all where the control is gone by then.
 */
export function useLeaving(onLeave: (() => void) | undefined): () => void {
  const last = useRef(onLeave);
  useLayoutEffect(() => {
    last.current = onLeave;
  });
  useLayoutEffect(() => {
    listen();
    return () => {
      last.current = undefined;
    };
  }, []);
  return useCallback(() => whenPressIsOver(() => last.current?.()), []);
}
