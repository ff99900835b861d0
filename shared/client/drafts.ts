import { useCallback, useState } from 'react';
import { readDraft, writeDraft } from './draft-store';
import { useSession } from './session';

export interface Draft<T> {
  value: T;
  set: (next: T | ((last: T) => T)) => void;
  /** Call when it has been sent or thrown away. */
  clear: () => void;
  /** It was brought back from an earlier visit. */
  restored: boolean;
}

/**
 * Typed data that survives back, lock, reload and a new sign-in, kept per person and form.
 *
 * @param form name of the form with its object: `plan`, `log.${chargeId}`
 * @param initial what stands there without a draft
 */
export function useDraft<T>(form: string, initial: T): Draft<T> {
  const personId = useSession().data?.person.id ?? null;
  const place = `${personId ?? ''} ${form}`;
  const read = (): { place: string; value: T; restored: boolean } => {
    const kept = readDraft<T>(personId, form);
    return { place, value: kept ?? initial, restored: kept !== null };
  };
  const [held, setHeld] = useState(read);
  // Another form or another person in the same component: theirs is read at once.
  const now = held.place === place ? held : read();
  if (now !== held) setHeld(now);

  const set = useCallback(
    (next: T | ((last: T) => T)) =>
      setHeld((last) => {
        const value = next instanceof Function ? next(last.value) : next;
        writeDraft(personId, form, value);
        return { ...last, value };
      }),
    [personId, form],
  );
  const clear = useCallback(() => {
    writeDraft(personId, form, null);
    setHeld({ place, value: initial, restored: false });
  }, [personId, form, place, initial]);
  return { value: now.value, set, clear, restored: now.restored };
}
