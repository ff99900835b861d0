import type { EntityManager } from 'typeorm';
import type { Deps } from '../deps';

const tails = new WeakMap<object, Promise<unknown>>();

/**
 * Runs one write after the other, each in a transaction of its own.
 *
 * SQLite has one connection here, and TypeORM shares its query runner: two transactions that overlap across awaits would
 * nest and commit or roll back each other's rows. Every write of the product goes through here; reads need not.
 * @returns what `work` gives, after the commit
 */
export async function inTransaction<T>(
  deps: Pick<Deps, 'dataSource'>,
  work: (manager: EntityManager) => Promise<T>,
): Promise<T> {
  const before = tails.get(deps.dataSource) ?? Promise.resolve();
  const run = before.catch(() => undefined).then(() => deps.dataSource.transaction(work));
  tails.set(deps.dataSource, run);
  return run;
}
