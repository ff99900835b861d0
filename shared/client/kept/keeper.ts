/** Keeps the answers of the running app and brings them back where there is no connection. Loaded late. */
import { hashKey, type QueryClient, type QueryKey } from '@tanstack/react-query';
import { clear, createStore, delMany, entries, setMany } from 'idb-keyval';
import type { SessionDto } from '@/shared/contract/session';
import { serverNow } from '../clock';
import { linkNow, linkOpenedWithout, onDown, onLive } from '../link';
import { runningBuild } from '../new-build';
import { roots } from '../query-keys';
import { signedInPerson } from '../session-state';
import { isKept, makeKeptAnswers, type AnswerStore, type KeptAnswer } from './kept-answers';

const database = () => createStore('bidewell-answers', 'answers');
let opened: ReturnType<typeof database> | null = null;
const store = () => (opened ??= database());

/** A browser that keeps nothing (a private window, a full disk) has the app as it was: with a connection. */
const quietly = async <T>(work: () => Promise<T>, otherwise: T): Promise<T> => {
  try {
    return await work();
  } catch {
    return otherwise;
  }
};
const inBrowser: AnswerStore = {
  all: () => quietly(() => entries<string, KeptAnswer>(store()), []),
  put: (list) => quietly(() => setMany(list, store()), undefined),
  drop: (ids) => quietly(() => delMany(ids, store()), undefined),
  clear: () => quietly(() => clear(store()), undefined),
};

const kept = makeKeptAnswers(inBrowser, runningBuild(), () => Date.now());

/** Everything kept goes: somebody has signed out, or another person came. */
export const forgetKept = (): Promise<void> => kept.clear();

const sessionKey: QueryKey = [roots.session];

/** Puts what was kept where nothing was asked for yet; never over an answer of this page. */
async function bringBack(client: QueryClient, owner: string): Promise<void> {
  for (const { key, at, data } of await kept.of(owner)) {
    if (key[0] === roots.session || signedInPerson() !== owner || client.getQueryData(key) !== undefined) continue;
    client.setQueryData(key, data, { updatedAt: at });
  }
}

/**
 * Opens the app from what was kept, for the person who is signed in on this device; null where nothing is kept for
 * them, or their session has run out since. Everything is asked for again once the server is heard.
 */
export async function openWithout(client: QueryClient): Promise<SessionDto | null> {
  const owner = signedInPerson();
  if (owner === null) return null;
  const session = (await kept.of(owner)).find(({ key }) => hashKey(key) === hashKey(sessionKey))?.data as
    SessionDto | null | undefined;
  if (!session || session.person.id !== owner || Date.parse(session.expiresAt) <= serverNow()) return null;
  await bringBack(client, owner);
  linkOpenedWithout();
  const stop = onLive(() => {
    stop();
    void client.invalidateQueries();
  });
  return session;
}

/** Answers of one moment are written together, ms. */
const gatherMs = 500;

/** Keeps what is answered to this person from now on. @returns stops it */
export function startKeeping(client: QueryClient, owner: string): () => void {
  const fresh = new Map<string, QueryKey>();
  let timer: ReturnType<typeof setTimeout> | undefined;
  const write = () => {
    clearTimeout(timer);
    timer = undefined;
    const answers = [...fresh.values()].flatMap((key) => {
      const state = client.getQueryState(key);
      return state?.data === undefined || state.data === null
        ? []
        : [{ key, at: state.dataUpdatedAt, data: state.data }];
    });
    fresh.clear();
    // Somebody may have signed out, here or in another tab, since it was answered.
    const session = client.getQueryData<SessionDto | null>(sessionKey);
    if (signedInPerson() === owner && session?.person.id === owner) void kept.keep(owner, answers);
  };
  const gather = (key: QueryKey) => {
    // What is shown without a connection was kept already, with its age.
    if (!isKept(key) || linkNow().state === 'down') return;
    fresh.set(hashKey(key), key);
    timer ??= setTimeout(write, gatherMs);
  };
  let bringing: ReturnType<typeof setTimeout> | undefined;
  const bring = () => {
    bringing ??= setTimeout(() => {
      bringing = undefined;
      void bringBack(client, owner);
    }, 0);
  };
  const offCache = client.getQueryCache().subscribe(({ type, query, ...event }) => {
    if (type === 'updated' && 'action' in event && event.action.type === 'success') gather(query.queryKey);
    // A screen asks for what was seen before: let go by the page, or in another.
    if (type === 'added' && isKept(query.queryKey) && linkNow().state === 'down') bring();
  });
  for (const query of client.getQueryCache().getAll()) gather(query.queryKey);
  // A page that is left may not come back to it.
  document.addEventListener('visibilitychange', write);
  const offDown = onDown(bring);
  return () => {
    clearTimeout(timer);
    clearTimeout(bringing);
    offCache();
    document.removeEventListener('visibilitychange', write);
    offDown();
  };
}
