/** What a person chose for this device. */
import { externalStore, useStore } from './external-store';
import { recallJson, rememberJson } from './storage';

export interface Preferences {
  theme: 'system' | 'paper' | 'night';
  sound: boolean;
  /** The question after the first charge: may the device tell when it is done? */
  noticeAsked: boolean;
}

const otherwise: Preferences = { theme: 'system', sound: true, noticeAsked: false };
const store = externalStore<Preferences>({ ...otherwise, ...recallJson<Partial<Preferences>>('preferences', {}) });

export const usePreferences = (): Preferences => useStore(store);
export const preferencesNow = (): Preferences => store.get();

export function prefer(change: Partial<Preferences>): void {
  const next = { ...store.get(), ...change };
  rememberJson('preferences', next);
  store.set(next);
}
