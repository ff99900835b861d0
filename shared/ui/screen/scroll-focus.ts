import { useEffect, useRef, type Ref } from 'react';
import type { ScrollView } from 'react-native';

const stops = 'a[href], button, input, select, textarea, [tabindex="0"]';

/**
 * A body that scrolls and holds nothing to tab to is a stop itself, so that the keyboard reaches all of it. Where a
 * control stands in it, that control is the stop and no other is added.
 */
export function useScrollFocus(): Ref<ScrollView> {
  const ref = useRef<ScrollView>(null);
  // After every drawing: what the body holds changes with it.
  useEffect(() => {
    const body = ref.current as unknown as HTMLElement | null;
    if (!body || typeof body.querySelector !== 'function') return;
    const alone = body.scrollHeight > body.clientHeight && body.querySelector(stops) === null;
    if (alone) body.tabIndex = 0;
    else body.removeAttribute('tabindex');
  });
  return ref;
}
