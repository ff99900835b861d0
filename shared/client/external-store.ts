import { useSyncExternalStore } from 'react';

/** A value outside React that screens can follow. */
export interface ExternalStore<T> {
  get: () => T;
  set: (next: T) => void;
  subscribe: (changed: () => void) => () => void;
}

/** Makes one; listeners hear only of changes. */
export function externalStore<T>(initial: T): ExternalStore<T> {
  let value = initial;
  const listeners = new Set<() => void>();
  return {
    get: () => value,
    set: (next) => {
      if (Object.is(next, value)) return;
      value = next;
      for (const listener of [...listeners]) listener();
    },
    subscribe: (changed) => {
      listeners.add(changed);
      return () => listeners.delete(changed);
    },
  };
}

/** The store's value, kept current in a component. */
export const useStore = <T>(store: ExternalStore<T>): T => useSyncExternalStore(store.subscribe, store.get, store.get);
