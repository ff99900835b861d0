import { useCallback, useState } from 'react';
import { useSession } from './session';
import { recall, remember } from './storage';

const keyOf = (personId: string): string => `meter.${personId}`;

/** The meter this person last read with on this device: where a new reading begins. */
export function useLastMeter(): {
  /**
   * What stands in a new reading.
   * @param meters those of the workshop; of none there is nothing to choose, so that null, not known, stands there
   * @returns '' where nothing was read here yet, or the meter is gone: one chooses
   */
  firstOf: (meters: readonly { id: string }[]) => string | null;
  /** A reading was taken with it. Not known (null) is a choice for once. */
  keep: (meterId: string | null | undefined) => void;
} {
  const personId = useSession().data?.person.id ?? null;
  // Read once: a form that is open does not change by what is sent elsewhere.
  const [last] = useState(() => (personId === null ? null : recall(keyOf(personId))));
  return {
    firstOf: (meters) => {
      if (meters.length === 0) return null;
      return meters.find(({ id }) => id === last)?.id ?? '';
    },
    keep: useCallback(
      (meterId) => {
        if (personId !== null && meterId) remember(keyOf(personId), meterId);
      },
      [personId],
    ),
  };
}
