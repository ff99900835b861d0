import { act, fireEvent } from '@testing-library/react';

/** Long enough for a check on leaving, were it not held back, to have drawn its sentence. */
const pause = (ms = 30) => act(() => new Promise<void>((resolve) => setTimeout(resolve, ms)));

/** What stands on the page, without the looks: focus frame and pressed colour move nothing. */
const page = () => document.body.innerHTML.replace(/ (class|style|aria-activedescendant)="[^"]*"/g, '');

/**
 * Presses a button straight from the field that has the focus, in the order of a browser: the focus leaves the field
 * while the pointer is down, and the click comes last. A touch has let go before the mouse events that follow it.
 * @returns what stood on the page when the pointer came down, and right before the click
 */
export async function pressFrom(
  field: HTMLElement,
  button: () => HTMLElement,
  pointer: 'mouse' | 'touch' = 'mouse',
): Promise<{ down: string; click: string }> {
  act(() => field.focus());
  const pressed = button();
  const down = page();
  fireEvent.pointerDown(pressed, { pointerType: pointer, buttons: 1 });
  if (pointer === 'touch') {
    fireEvent.pointerUp(pressed, { pointerType: pointer });
    await pause();
  }
  fireEvent.mouseDown(pressed, { buttons: 1 });
  act(() => field.blur());
  await pause();
  const click = page();
  // The browser clicks what lies under the pointer by then.
  if (pointer === 'mouse') fireEvent.pointerUp(pressed, { pointerType: pointer });
  fireEvent.mouseUp(pressed);
  fireEvent.click(pressed);
  await pause();
  return { down, click };
}
