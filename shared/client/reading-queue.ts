/**
 * Readings logged without a connection wait on this device and are sent once each when it is back: the key of a
 * reading is its idempotency key, so a second sending changes nothing.
 */
import { useCallback, useEffect, useMemo } from 'react';
import type { ChargeDto, ReadingInput } from '@/shared/contract/charge';
import { api, newKey, type Api } from './api';
import { isOffline, isPassing, isProblem } from './api-problem';
import { storeCharge } from './charges';
import { serverNow } from './clock';
import { externalStore, useStore } from './external-store';
import { onLive } from './link';
import { queryClient } from './query-client';
import { roots } from './query-keys';
import { useSession } from './session';
import { recallJson, rememberJson } from './storage';

export interface WaitingReading {
  /** Also its idempotency key. */
  key: string;
  chargeId: string;
  /** With `at`: when it was read, not when it is sent. */
  input: Partial<ReadingInput> & { at: string };
  /** Why the server did not take it; such a one is not sent again by itself. */
  refused: string | null;
}

const keyOf = (personId: string) => `readings.${personId}`;

export interface QueueEnvironment {
  post: Api['post'];
  load: (personId: string) => WaitingReading[];
  save: (personId: string, waiting: WaitingReading[]) => void;
  sent: (charge: ChargeDto) => void;
}

/** The queue of one device; per person. */
export function makeReadingQueue({ post, load, save, sent }: QueueEnvironment) {
  const store = externalStore<readonly WaitingReading[]>([]);
  let person: string | null = null;
  let flushing: Promise<void> | null = null;

  const put = (waiting: WaitingReading[]) => {
    if (person) save(person, waiting);
    store.set(waiting);
  };
  const send = (reading: WaitingReading) =>
    post<ChargeDto>(`/charges/${reading.chargeId}/readings`, reading.input, { idempotencyKey: reading.key });

  async function flushOnce(): Promise<void> {
    const owner = person;
    if (!owner) return;
    for (const reading of load(owner)) {
      if (reading.refused) continue;
      if (person !== owner) return;
      try {
        sent(await send(reading));
        put(load(owner).filter((other) => other.key !== reading.key));
      } catch (error) {
        // No connection, or no session: the rest waits too, in its order.
        if (!isProblem(error) || isPassing(error) || error.status === 401) return;
        const refused = error.message;
        put(load(owner).map((other) => (other.key === reading.key ? { ...other, refused } : other)));
      }
    }
  }

  const queue = {
    store,
    /** Whose readings; null: nobody is signed in, so nothing is shown and nothing is sent. */
    belongTo: (personId: string | null) => {
      person = personId;
      store.set(personId ? load(personId) : []);
    },
    /** Sends at once, or keeps it: gives the charge, or null when it waits. A refusal is thrown. */
    log: async (chargeId: string, input: Partial<ReadingInput>): Promise<ChargeDto | null> => {
      const at = input.at ?? new Date(serverNow()).toISOString();
      const reading: WaitingReading = { key: newKey(), chargeId, input: { ...input, at }, refused: null };
      // Those that wait already go first: the finish moves with each reading in its order.
      if (store.get().some((other) => !other.refused)) await queue.flush();
      if (!store.get().some((other) => !other.refused)) {
        try {
          const charge = await send(reading);
          sent(charge);
          return charge;
        } catch (error) {
          if (!isOffline(error)) throw error;
        }
      }
      put([...(person ? load(person) : []), reading]);
      return null;
    },
    /** Sends what waits; one run at a time. */
    flush: (): Promise<void> => {
      flushing ??= flushOnce().finally(() => {
        flushing = null;
      });
      return flushing;
    },
    remove: (key: string) => {
      if (person) put(load(person).filter((other) => other.key !== key));
    },
  };
  return queue;
}

export const readingQueue = makeReadingQueue({
  post: api.post,
  load: (personId) => recallJson<WaitingReading[]>(keyOf(personId), []),
  save: (personId, waiting) => rememberJson(keyOf(personId), waiting.length > 0 ? waiting : null),
  sent: (charge) => {
    storeCharge(queryClient, charge);
    for (const root of [roots.charges, roots.board, roots.alerts])
      void queryClient.invalidateQueries({ queryKey: [root] });
  },
});

/** Sends what waits whenever the connection comes back. Once, in the shell. */
export function useReadingQueueRunner(): void {
  const personId = useSession().data?.person.id ?? null;
  useEffect(() => {
    readingQueue.belongTo(personId);
    if (!personId) return;
    void readingQueue.flush();
    return onLive(() => void readingQueue.flush());
  }, [personId]);
}

/** How many readings wait on this device. */
export const useWaitingReadingCount = (): number => useStore(readingQueue.store).length;

/** Readings of a charge that wait on this device, and the way to log one that survives a lost connection. */
export function useReadingQueue(chargeId: string) {
  const all = useStore(readingQueue.store);
  const waiting = useMemo(() => all.filter((reading) => reading.chargeId === chargeId), [all, chargeId]);
  return {
    waiting,
    /** The charge as it stands then; null: it waits here. Throws ApiProblem where the server refuses it. */
    log: useCallback((input: Partial<ReadingInput>) => readingQueue.log(chargeId, input), [chargeId]),
    remove: readingQueue.remove,
  };
}
