/** Loaded into a server before anything else: while the named file is there, its database gets no further page, as on a full disk. */
import Database from 'better-sqlite3';
import fs from 'node:fs';

const flag = process.env.DISK_FULL_WHILE ?? '';
const ofSqlite = 1_073_741_823;

const memory = new Database(':memory:');
// The class of statements is not exported; every statement has it.
const statements = Object.getPrototypeOf(memory.prepare('BEGIN')) as Database.Statement;
memory.close();
const { run } = statements;
statements.run = function (this: Database.Statement, ...values: unknown[]) {
  // Every write of the product is a transaction.
  if (this.source.startsWith('BEGIN')) {
    const full = fs.existsSync(flag);
    const most = full ? Number(this.database.pragma('page_count', { simple: true })) : ofSqlite;
    this.database.pragma(`max_page_count = ${most}`);
  }
  return run.apply(this, values);
};
