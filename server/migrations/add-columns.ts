import type { QueryRunner } from 'typeorm';

/** Columns by table, each with its type; all of them may be empty. */
export type NewColumns = Record<
  string,
  Record<string, 'boolean' | 'double precision' | 'text' | 'varchar' | 'bigint' | 'integer'>
>;

/** Plain statements, which both databases have: the Table API would build a table anew on SQLite. */
export async function addColumns(runner: QueryRunner, columns: NewColumns): Promise<void> {
  for (const [table, own] of Object.entries(columns))
    for (const [name, type] of Object.entries(own))
      await runner.query(`ALTER TABLE ${table} ADD COLUMN ${name} ${type}`);
}

export async function dropColumns(runner: QueryRunner, columns: NewColumns): Promise<void> {
  for (const [table, own] of Object.entries(columns))
    for (const name of Object.keys(own)) await runner.query(`ALTER TABLE ${table} DROP COLUMN ${name}`);
}
