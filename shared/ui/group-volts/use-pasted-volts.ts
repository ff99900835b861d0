import { useEffect, useRef, type RefObject } from 'react';
import type { View } from 'react-native';
import { pastedVolts } from './group-form';

/** What a paste event brings; the renderer has no prop for it. */
interface Paste {
  clipboardData: { getData(kind: 'text'): string } | null;
  preventDefault(): void;
}
interface Pasted {
  addEventListener?(name: 'paste', listener: (event: Paste) => void): void;
  removeEventListener?(name: 'paste', listener: (event: Paste) => void): void;
}

/**
 * Hears of a list pasted into what is inside the box, before the browser takes its line breaks out.
 *
 * @returns the ref of the box
 */
export function usePastedVolts(onMany: (values: string[]) => void): RefObject<View | null> {
  const box = useRef<View>(null);
  const spread = useRef(onMany);
  useEffect(() => {
    spread.current = onMany;
  }, [onMany]);
  useEffect(() => {
    const element = box.current as unknown as Pasted | null;
    const paste = (event: Paste) => {
      const many = pastedVolts(event.clipboardData?.getData('text') ?? '');
      if (!many) return;
      event.preventDefault();
      spread.current(many);
    };
    element?.addEventListener?.('paste', paste);
    return () => element?.removeEventListener?.('paste', paste);
  }, []);
  return box;
}
