import { bcryptPool, type BcryptPool } from './bcrypt-pool';

/** Hashes passwords in worker threads: bcrypt at cost 12 takes a third of a second, in which nobody may wait. */
export interface Passwords {
  hash(password: string): Promise<string>;
  /** Takes as long for an unknown person (`null`) as for a wrong password, and says no. */
  matches(password: string, hash: string | null): Promise<boolean>;
  close(): Promise<void>;
}

export const bcryptCost = 12;

/** Hash of 256 random bits that were thrown away; what an unknown person's password is compared with. */
const nobodysHash = '$2b$12$zxjeZeDGgMFjr9x8Ozz74OGkH3id0uA.GhptDggT2Z/LybwXJ7DDy';

/** The same letters typed on another keyboard give the same bytes; otherwise a password is taken as it is. */
const normal = (password: string): string => password.normalize('NFKC');

export function makePasswords(pool: BcryptPool = bcryptPool()): Passwords {
  return {
    hash: async (password) => (await pool.run({ password: normal(password), cost: bcryptCost })) as string,
    async matches(password, hash) {
      const same = await pool.run({ password: normal(password), hash: hash ?? nobodysHash });
      return hash !== null && same === true;
    },
    close: () => pool.close(),
  };
}
