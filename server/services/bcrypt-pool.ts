import os from 'node:os';
import { DomainError } from '../errors/domain-error';
import { WorkerPool } from './worker-pool';

export type BcryptTask = { password: string } & ({ cost: number } | { hash: string });
export type BcryptPool = WorkerPool<BcryptTask, string | boolean>;

/** The threads that hash. On two cores one thread hashes, so that the other core serves. */
export const bcryptPool = (): BcryptPool =>
  new WorkerPool({
    entry: 'bcrypt',
    size: Math.max(1, Math.min(2, os.availableParallelism() - 1)),
    // More than this many waiting means minutes of waiting: say so instead.
    longestQueue: 100,
    tooMany: () =>
      new DomainError(503, 'busy', 'Too many people sign in at this moment. Try again shortly.', { retryAfterS: 10 }),
  });
