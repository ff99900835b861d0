/** Loaded into a server before anything else: it kills itself before the n-th statement from its first migration on. */
import Database from 'better-sqlite3';
import fs from 'node:fs';

const dieAt = Number(process.env.DIE_AT_STATEMENT);
let count = 0;

const memory = new Database(':memory:');
// The class of statements is not exported; every statement has it.
const statements = Object.getPrototypeOf(memory.prepare('BEGIN')) as Database.Statement;
memory.close();
const { run } = statements;
statements.run = function (this: Database.Statement, ...values: unknown[]) {
  if (count > 0 || this.source === 'BEGIN TRANSACTION') count += 1;
  if (count === dieAt) {
    fs.writeSync(2, `died before: ${this.source.replace(/\s+/g, ' ')}\n`);
    process.kill(process.pid, 'SIGKILL');
  }
  return run.apply(this, values);
};
