/**
 * What is typed and not yet sent, per person and form, so that it survives back, lock, reload and a new sign-in.
 * Passwords never come here. Drafts lapse after a week.
 */
import { keysUnder, recallJson, rememberJson } from './storage';

const lifetimeMs = 7 * 86_400_000;
interface StoredDraft<T> {
  at: number;
  value: T;
}

const keyOf = (personId: string | null, form: string) => `draft.${personId ?? 'nobody'}.${form}`;

/** The draft, or null. */
export function readDraft<T>(personId: string | null, form: string, now: number = Date.now()): T | null {
  const stored = recallJson<StoredDraft<T> | null>(keyOf(personId, form), null);
  if (!stored) return null;
  if (now - stored.at <= lifetimeMs) return stored.value;
  rememberJson(keyOf(personId, form), null);
  return null;
}

/** Keeps the draft; null drops it. */
export const writeDraft = <T>(personId: string | null, form: string, value: T | null, now: number = Date.now()): void =>
  rememberJson(keyOf(personId, form), value === null ? null : ({ at: now, value } satisfies StoredDraft<T>));

/** Drops every draft of a person who signs out here. */
export function forgetDrafts(personId: string): void {
  for (const key of keysUnder(`draft.${personId}.`)) rememberJson(key, null);
}
