import { RateLimiterMemory, type RateLimiterRes } from 'rate-limiter-flexible';
import { tooMany } from '../errors/domain-error';

export interface LimitRule {
  points: number;
  /** Length of the window, s. */
  durationS: number;
}

/** Throttles per asking address, named by what they protect. */
const addressRules = {
  /** Every refresh, link look-up and other open question. */
  open: { points: 300, durationS: 60 },
  estimate: { points: 120, durationS: 60 },
  /** Papers are drawn anew for every question. */
  papers: { points: 60, durationS: 60 },
  /** A log of a charge may be 64 MB, and is read anew with every change of its columns. */
  logFile: { points: 60, durationS: 600 },
  /** A copy of all data reads and writes all of it. */
  backup: { points: 6, durationS: 600 },
  createWorkshop: { points: 5, durationS: 3600 },
  join: { points: 20, durationS: 600 },
  wallCode: { points: 20, durationS: 600 },
  wallToken: { points: 120, durationS: 60 },
} satisfies Record<string, LimitRule>;
export type AddressLimit = keyof typeof addressRules;

/** Throttles of one key of another kind. */
const keyRules = {
  /** Failed sign-ins from one address, whichever account. */
  signInAddress: { points: 100, durationS: 900 },
  /** Failed sign-ins to one account from one address. */
  signInAccountAddress: { points: 10, durationS: 900 },
  /** The same once the account is under attack from anywhere. */
  signInAccountAddressUnderAttack: { points: 3, durationS: 900 },
  /** Failed sign-ins to one account from everywhere; beyond it, the tighter rule holds for devices not seen before. */
  signInAccount: { points: 30, durationS: 3600 },
  /** Failed sign-ins to one account from one device that has signed in to it before. */
  signInDevice: { points: 10, durationS: 900 },
  /** Failed looks at pairing codes by one person: they are guessable only by trying. */
  wallGuess: { points: 15, durationS: 600 },
} satisfies Record<string, LimitRule>;
export type KeyLimit = keyof typeof keyRules;
export type LimitName = AddressLimit | KeyLimit;

export interface Limits {
  /**
   * Counts one try.
   * @throws DomainError 429 with the seconds to wait
   */
  take(name: LimitName, key: string): Promise<void>;
  /** Counts one without refusing. */
  count(name: LimitName, key: string): Promise<void>;
  /** Gives one counted try back. */
  giveBack(name: LimitName, key: string): Promise<void>;
  /** Whether no further try would be let through. */
  spent(name: LimitName, key: string): Promise<boolean>;
  forget(name: LimitName, key: string): Promise<void>;
}

/** Throttles in memory: one process, and a restart is no way in, because nobody outside can cause one. */
export function makeLimits(changes: Partial<Record<LimitName, LimitRule>> = {}): Limits {
  const rules: Record<LimitName, LimitRule> = { ...addressRules, ...keyRules, ...changes };
  const limiters = new Map<LimitName, RateLimiterMemory>();
  const limiter = (name: LimitName): RateLimiterMemory => {
    const there = limiters.get(name);
    if (there) return there;
    const { points, durationS } = rules[name];
    const made = new RateLimiterMemory({ keyPrefix: name, points, duration: durationS });
    limiters.set(name, made);
    return made;
  };
  return {
    async take(name, key) {
      try {
        await limiter(name).consume(key);
      } catch (refused) {
        if (refused instanceof Error) throw refused;
        throw tooMany(Math.max(1, Math.ceil((refused as RateLimiterRes).msBeforeNext / 1000)));
      }
    },
    async count(name, key) {
      await limiter(name).penalty(key);
    },
    async giveBack(name, key) {
      await limiter(name).reward(key);
    },
    async spent(name, key) {
      const state = await limiter(name).get(key);
      return state !== null && state.consumedPoints >= rules[name].points;
    },
    async forget(name, key) {
      await limiter(name).delete(key);
    },
  };
}

/** The key of an address: an IPv6 household or office has a whole /64 to try from. */
export function addressKey(address: string | undefined): string {
  if (!address) return 'unknown';
  const plain = address.replace(/^::ffff:(?=\d+\.)/i, '');
  if (!plain.includes(':')) return plain;
  const [head = '', tail] = plain.split('%')[0]?.split('::') ?? [];
  const left = head ? head.split(':') : [];
  const right = tail ? tail.split(':') : [];
  const zeros = tail === undefined ? 0 : Math.max(0, 8 - left.length - right.length);
  const groups = [...left, ...Array<string>(zeros).fill('0'), ...right].map((group) =>
    parseInt(group, 16).toString(16),
  );
  return `${groups.slice(0, 4).join(':')}::/64`;
}
