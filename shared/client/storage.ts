/** The browser's stores behind one door: a private window or a full disk must not break a screen. */
type Kind = 'local' | 'session';

const memory: Record<Kind, Map<string, string>> = { local: new Map(), session: new Map() };

function area(kind: Kind): Storage | null {
  try {
    return kind === 'local' ? globalThis.localStorage : globalThis.sessionStorage;
  } catch {
    return null;
  }
}

/** Every key of ours begins with this. */
export const storagePrefix = 'bw.';

/** The stored text, or null. */
export function recall(key: string, kind: Kind = 'local'): string | null {
  try {
    return area(kind)?.getItem(storagePrefix + key) ?? memory[kind].get(key) ?? null;
  } catch {
    return memory[kind].get(key) ?? null;
  }
}

/** Stores a text; null removes it. What the browser refuses is kept until the page closes. */
export function remember(key: string, value: string | null, kind: Kind = 'local'): void {
  if (value === null) memory[kind].delete(key);
  try {
    const store = area(kind);
    if (value === null) store?.removeItem(storagePrefix + key);
    else if (store) store.setItem(storagePrefix + key, value);
    else memory[kind].set(key, value);
  } catch {
    if (value !== null) memory[kind].set(key, value);
  }
}

/** A stored value of any shape; `otherwise` where there is none or it cannot be read. */
export function recallJson<T>(key: string, otherwise: T, kind: Kind = 'local'): T {
  const text = recall(key, kind);
  if (text === null) return otherwise;
  try {
    return JSON.parse(text) as T;
  } catch {
    return otherwise;
  }
}

export const rememberJson = (key: string, value: unknown, kind: Kind = 'local'): void =>
  remember(key, value === null || value === undefined ? null : JSON.stringify(value), kind);

/** All our keys that begin so, without the prefix. */
export function keysUnder(start: string, kind: Kind = 'local'): string[] {
  const names = [...memory[kind].keys()];
  try {
    const store = area(kind);
    for (let i = 0; store && i < store.length; i++) {
      const name = store.key(i);
      if (name?.startsWith(storagePrefix)) names.push(name.slice(storagePrefix.length));
    }
  } catch {
    // What memory holds is all there is.
  }
  return [...new Set(names)].filter((name) => name.startsWith(start));
}
