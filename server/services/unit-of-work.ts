import { AsyncLocalStorage } from 'node:async_hooks';
import type { Database } from 'better-sqlite3';
import type { EntityManager } from 'typeorm';
import type { Deps } from '../deps';
import { idempotencyContext, recordIdempotencyKey } from './idempotency-context';

const tails = new WeakMap<object, Promise<unknown>>();
const within = new AsyncLocalStorage<{ open: boolean }>();

/**
 * Runs one write after the other, each in a transaction of its own.
 *
 * SQLite has one connection here, and TypeORM shares its query runner: two transactions that overlap across awaits would
 * nest and commit or roll back each other's rows. Every write of the product goes through here; reads need not.
 * Where the request carries an Idempotency-Key, its row is committed with the first transaction of the request.
 * @returns what `work` gives, after the commit
 * @throws Error when called from within `work`: it would wait for itself
 */
export async function inTransaction<T>(
  deps: Pick<Deps, 'dataSource'>,
  work: (manager: EntityManager) => Promise<T>,
): Promise<T> {
  if (within.getStore()?.open)
    throw new Error('A transaction was asked for within a transaction. Pass the manager on.');
  const before = tails.get(deps.dataSource) ?? Promise.resolve();
  const run = before.catch(() => undefined).then(() => transact(deps, work));
  tails.set(deps.dataSource, run);
  return run;
}

async function transact<T>(deps: Pick<Deps, 'dataSource'>, work: (manager: EntityManager) => Promise<T>): Promise<T> {
  const scope = { open: true };
  const write = idempotencyContext.getStore();
  const recordedBefore = write?.recorded ?? false;
  try {
    return await within.run(scope, () =>
      deps.dataSource.transaction(async (manager) => {
        const result = await work(manager);
        await recordIdempotencyKey(manager);
        return result;
      }),
    );
  } catch (error) {
    if (write) write.recorded = recordedBefore;
    endLeftOver(deps);
    throw error;
  } finally {
    // What was started within and outlives it (a timer) is outside from now on.
    scope.open = false;
  }
}

/**
 * After some errors (a full disk, an error of the disk) SQLite rolls back by itself. TypeORM's own rollback then fails
 * and it goes on counting the transaction as open: the next ones would be savepoints within none, and once one of them is
 * rolled back, what comes after it would be committed never.
 */
function endLeftOver({ dataSource }: Pick<Deps, 'dataSource'>): void {
  // The one that all share.
  const runner = dataSource.createQueryRunner();
  const { databaseConnection } = dataSource.driver as unknown as { databaseConnection: Database };
  if (!runner.isTransactionActive || databaseConnection.inTransaction) return;
  Object.assign(runner, { isTransactionActive: false, transactionDepth: 0 });
}
