import type { Deps } from '../deps';

export interface Readiness {
  status: 'ready' | 'starting-or-stopping' | 'database-failed' | 'migrations-missing';
}

/** Whether the server can serve: started, not stopping, its database answers and has all migrations. */
export async function readiness(deps: Deps): Promise<Readiness> {
  if (!deps.lifecycle.ready) return { status: 'starting-or-stopping' };
  try {
    await deps.dataSource.query('SELECT 1');
    return { status: (await deps.dataSource.showMigrations()) ? 'migrations-missing' : 'ready' };
  } catch (error) {
    deps.log.error({ err: error }, 'database does not answer');
    return { status: 'database-failed' };
  }
}
