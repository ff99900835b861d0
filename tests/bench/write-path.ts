import Database from 'better-sqlite3';
import type { DataSource } from 'typeorm';

interface Timed {
  sql: string;
  values: unknown[];
  ms: number;
}

export interface StatementTimes {
  /** What was asked of the database since it was last emptied, in order. */
  heard: Timed[];
}

/** Times every statement at the driver itself: what is between it and the product is not in it. */
export function timeStatements(dataSource: DataSource): StatementTimes {
  const { databaseConnection } = dataSource.driver as unknown as { databaseConnection: Database.Database };
  const times: StatementTimes = { heard: [] };
  const prepare = databaseConnection.prepare.bind(databaseConnection);
  const timed = (sql: string) => {
    const statement = prepare(sql);
    for (const name of ['run', 'all'] as const) {
      const original = statement[name].bind(statement) as (...values: unknown[]) => unknown;
      const around = (...values: unknown[]): unknown => {
        const started = performance.now();
        try {
          return original(...values);
        } finally {
          times.heard.push({ sql, values, ms: performance.now() - started });
        }
      };
      Object.defineProperty(statement, name, { value: around });
    }
    return statement;
  };
  Object.defineProperty(databaseConnection, 'prepare', { value: timed });
  return times;
}

export interface DatabaseMs {
  /** Of all statements of one act, the commit among them. */
  all: number;
  /** Its inserts, updates and deletes. */
  writes: number;
  /** Its commit alone: that is the disk's. */
  commit: number;
  statements: number;
}

export function databaseMs(heard: readonly Timed[]): DatabaseMs {
  const sum = (of: RegExp): number => heard.filter(({ sql }) => of.test(sql)).reduce((ms, one) => ms + one.ms, 0);
  return {
    all: sum(/./),
    writes: sum(/^\s*(INSERT|UPDATE|DELETE)/i),
    commit: sum(/^\s*COMMIT/i),
    statements: heard.length,
  };
}

/** The same statements once more through bare better-sqlite3, over the same file and as durable: whole and its commit, ms. */
export function bareAgain(file: string, acts: readonly (readonly Timed[])[]): Pick<DatabaseMs, 'all' | 'commit'>[] {
  const bare = new Database(file);
  bare.pragma('synchronous = FULL');
  bare.pragma('foreign_keys = ON');
  // Rows that are there already are written over: as many pages as when they came.
  const ready = acts.map((act) =>
    act
      .filter(({ sql }) => !/^\s*(BEGIN|COMMIT|PRAGMA|SAVEPOINT|RELEASE)/i.test(sql))
      .map(({ sql, values }) => ({
        statement: bare.prepare(sql.replace(/^\s*INSERT INTO/i, 'INSERT OR REPLACE INTO')),
        values,
      })),
  );
  const found = ready.map((act) => {
    const started = performance.now();
    bare.exec('BEGIN');
    for (const { statement, values } of act)
      if (statement.reader) statement.all(...(values as never[]));
      else statement.run(...(values as never[]));
    const done = performance.now();
    bare.exec('COMMIT');
    const ended = performance.now();
    return { all: ended - started, commit: ended - done };
  });
  bare.close();
  return found;
}
