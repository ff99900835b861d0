/**
 * Lists on this device that must not get lost: in IndexedDB, each changed in one transaction, so that two pages of a
 * browser do not overwrite each other. What the browser refuses to take there lies in its small storage instead.
 */
import { createStore, get, update } from 'idb-keyval';
import { recallJson, rememberJson } from '../storage';

interface Keyed {
  key: string;
}

const database = () => createStore('bidewell-waiting', 'lists');
let opened: ReturnType<typeof database> | null = null;
const store = () => (opened ??= database());

const placeOf = (name: string) => `list.${name}`;
const beside = <T extends Keyed>(name: string) => recallJson<T[]>(placeOf(name), []);
const together = <T extends Keyed>(stored: T[], more: T[]): T[] => [
  ...stored,
  ...more.filter(({ key }) => !stored.some((one) => one.key === key)),
];

/** The list; empty where there is none. */
export async function readList<T extends Keyed>(name: string): Promise<T[]> {
  try {
    return together((await get<T[]>(name, store())) ?? [], beside<T>(name));
  } catch {
    return beside<T>(name);
  }
}

/** Changes the list and gives what it is then. */
export async function changeList<T extends Keyed>(name: string, change: (list: T[]) => T[]): Promise<T[]> {
  const more = beside<T>(name);
  let next: T[] = [];
  try {
    await update<T[]>(name, (stored) => (next = change(together(stored ?? [], more))), store());
    if (more.length > 0) rememberJson(placeOf(name), null);
  } catch {
    next = change(more);
    rememberJson(placeOf(name), next.length > 0 ? next : null);
  }
  return next;
}
