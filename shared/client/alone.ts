/**
 * One page of this browser at a time. Web Locks where the browser has them (secure contexts); over plain http a lease in
 * the browser's storage, which a page that is closed or put to sleep loses after some seconds.
 */
import { recallJson, rememberJson } from './storage';

/** Runs the work while no other page of this browser runs work of the same name. */
export type Alone = <T>(name: string, work: () => Promise<T>) => Promise<T>;

interface Lease {
  by: string;
  until: number;
}

export interface LeaseEnvironment {
  read: (name: string) => Lease | null;
  write: (name: string, lease: Lease | null) => void;
  now: () => number;
  wait: (ms: number) => Promise<void>;
  newId: () => string;
}

const leaseMs = 8000;
const renewMs = 2000;
/** Two pages that find the lease free at once both write it; after this the one that wrote last has it. */
const settleMs = 60;
const askMs = 150;

/** Without locks: good against two pages that are both awake; what must not happen twice carries a key of its own. */
export function makeLease(env: LeaseEnvironment): Alone {
  return async (name, work) => {
    const by = env.newId();
    const take = () => env.write(name, { by, until: env.now() + leaseMs });
    const mine = () => env.read(name)?.by === by;
    for (;;) {
      const held = env.read(name);
      const left = held ? held.until - env.now() : 0;
      // One that runs far ahead was written before the device's clock was set.
      if (left <= 0 || left > leaseMs) {
        take();
        await env.wait(settleMs);
        if (mine()) break;
      } else await env.wait(askMs);
    }
    const renewing = setInterval(() => {
      if (mine()) take();
    }, renewMs);
    try {
      return await work();
    } finally {
      clearInterval(renewing);
      if (mine()) env.write(name, null);
    }
  };
}

const lease = makeLease({
  read: (name) => recallJson<Lease | null>(`lease.${name}`, null),
  write: (name, held) => rememberJson(`lease.${name}`, held),
  now: () => Date.now(),
  wait: (ms) => new Promise((resolve) => setTimeout(resolve, ms)),
  newId: () => Math.random().toString(36).slice(2),
});

export const alone: Alone = async <T>(name: string, work: () => Promise<T>): Promise<T> => {
  const locks = (globalThis.navigator as Partial<Navigator> | undefined)?.locks;
  return locks ? ((await locks.request(name, work)) as T) : lease(name, work);
};
