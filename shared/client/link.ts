/** How well the server is heard: what makes a screen say 'old' instead of showing an old number as a new one. */
import { deadMs, quietMs } from '@/shared/contract/live';
import { api } from './api';
import { serverClock, serverNow } from './clock';
import { externalStore, useStore } from './external-store';
import { recall, remember } from './storage';

export interface LinkFacts {
  /** The socket is connected. */
  connected: boolean;
  /** Last word of the server by any way, server's epoch ms. */
  heardAt: number | null;
  /** The connection broke, or a call found nobody, and nothing was heard since. */
  lostAt: number | null;
}

export interface Link {
  /** connecting: not heard yet. live. quiet: not heard for 30 s. down: no connection, or not heard for 2 min. */
  state: 'connecting' | 'live' | 'quiet' | 'down';
  /** Last heard, server's epoch ms, while it is quiet or down. */
  since: number | null;
}

/** A broken connection is mended within this time without a word on screen. */
export const graceMs = 5000;

/** The state of the link at an instant. */
export function linkOf({ heardAt, lostAt }: LinkFacts, now: number): Link {
  if (lostAt !== null && now - lostAt >= graceMs) return { state: 'down', since: heardAt ?? lostAt };
  if (heardAt === null) return { state: 'connecting', since: null };
  const silent = now - heardAt;
  if (silent >= deadMs) return { state: 'down', since: heardAt };
  return silent >= quietMs ? { state: 'quiet', since: heardAt } : { state: 'live', since: null };
}

/** Nobody was heard yet. */
const unheard: LinkFacts = { connected: false, heardAt: null, lostAt: null };
let facts = unheard;
/** The page was opened without a connection and shows what was kept: the link is down until the server is heard. */
let openedWithout: LinkFacts | null = null;
const linkStore = externalStore<Link>(linkOf(facts, 0));
const heardStore = externalStore<number | null>(null);
let timer: ReturnType<typeof setTimeout> | undefined;

function renew(): void {
  const now = serverNow();
  const next = linkOf(facts, now);
  const last = linkStore.get();
  if (next.state !== last.state || next.since !== last.since) linkStore.set(next);
  clearTimeout(timer);
  const turns = [
    facts.lostAt === null ? Infinity : facts.lostAt + graceMs,
    ...(facts.heardAt === null ? [] : [facts.heardAt + quietMs, facts.heardAt + deadMs]),
  ].filter((at) => at > now);
  const soonest = Math.min(...turns);
  if (Number.isFinite(soonest)) timer = setTimeout(renew, soonest - now + 20);
}

/** The server was heard. An answer to a call alone does not mend a broken socket. */
export function heard(bySocket: boolean): void {
  const now = serverNow();
  openedWithout = null;
  keepHeard(now);
  facts = { ...facts, heardAt: now, lostAt: bySocket || facts.connected ? null : facts.lostAt };
  heardStore.set(now);
  renew();
}
export function connected(): void {
  facts = { ...facts, connected: true };
  heard(true);
}
export function lost(): void {
  if (facts.connected && facts.heardAt !== null) {
    heardKept = -Infinity;
    keepHeard(facts.heardAt);
  }
  facts = { ...facts, connected: false, lostAt: facts.lostAt ?? serverNow() };
  renew();
}
/** Nobody is signed in and nothing is listened to: no link, no loss. */
export function linkIdle(): void {
  facts = openedWithout ?? unheard;
  heardStore.set(facts.heardAt);
  renew();
}

const heardKey = 'heard-at';
const keepHeardEveryMs = 15_000;
let heardKept = -Infinity;
/** For a page that is opened later without a connection: since when there is none. */
function keepHeard(now: number): void {
  if (Math.abs(now - heardKept) < keepHeardEveryMs) return;
  heardKept = now;
  remember(heardKey, String(now));
}

/** The page shows what was kept on this device: the link is down, since the server was last heard by an earlier page. */
export function linkOpenedWithout(): void {
  const now = serverNow();
  const last = Number(recall(heardKey) ?? Number.NaN);
  openedWithout = {
    connected: false,
    heardAt: Number.isFinite(last) && last <= now ? last : now,
    lostAt: now - graceMs,
  };
  linkIdle();
}

api.on({
  heard: (serverDate) => {
    if (serverDate !== null) serverClock.rough(serverDate);
    heard(false);
  },
  unheard: lost,
  sessionEnded: () => {},
});
// A stepped clock moves the instants that were taken before it.
serverClock.onStep(() => {
  if (facts.heardAt !== null) facts = { ...facts, heardAt: serverNow() };
  if (facts.lostAt !== null) facts = { ...facts, lostAt: serverNow() };
  renew();
});

/**
 * Since when what a screen shows is old, server's epoch ms; null while the server is heard. An answer may be older than
 * the last word of the server: what nobody looks at is not asked for again.
 * @param asOf instant of the answer, server's epoch ms
 */
export const knownAt = ({ state, since }: Link, asOf: number): number | null =>
  state === 'down' && since !== null ? Math.min(since, asOf) : null;

/** State of the link; changes only when the state does. */
export const useLink = (): Link => useStore(linkStore);
/** When the server was last heard, server's epoch ms; changes with every word. */
export const useHeardAt = (): number | null => useStore(heardStore);
export const linkNow = (): Link => linkStore.get();
function onTurn(to: Link['state'], listener: () => void): () => void {
  let last = linkStore.get().state;
  return linkStore.subscribe(() => {
    const { state } = linkStore.get();
    if (state === to && last !== to) listener();
    last = state;
  });
}
/** Calls back when the link becomes live again. */
export const onLive = (listener: () => void): (() => void) => onTurn('live', listener);
/** Calls back when the link goes down. */
export const onDown = (listener: () => void): (() => void) => onTurn('down', listener);
