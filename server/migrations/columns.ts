/** Column makers of the migrations: the types that SQLite and PostgreSQL both have. Never changed, because migrations never change. */
import type { TableColumnOptions } from 'typeorm';

type Maker = (name: string, nullable?: 'optional') => TableColumnOptions;
const column =
  (type: string, length?: string): Maker =>
  (name, nullable) => ({ name, type, ...(length ? { length } : {}), isNullable: nullable === 'optional' });

export const primary = (): TableColumnOptions => ({ name: 'id', type: 'varchar', length: '36', isPrimary: true });
export const idOf = column('varchar', '36');
export const text = column('varchar');
export const json = column('text');
export const real = column('double precision');
export const whole = column('integer');
export const instant = column('bigint');
export const flag = column('boolean');

export interface TableParts {
  columns: TableColumnOptions[];
  /** Constraint name → columns. */
  uniques?: Record<string, string[]>;
  /** Index name → columns. */
  indices?: Record<string, string[]>;
  /** Unique among the rows that the condition selects. */
  partial?: Record<string, { columns: string[]; where: string }>;
  checks?: Record<string, string>;
  /** Column → the table its id is of; `cascade` where the row goes with its parent. */
  references?: Record<string, string | { table: string; cascade: true }>;
}

/** Table options with our names of constraints: `fk_<table>_<column without _id>`. */
export function table(name: string, parts: TableParts) {
  const columnsOf = (names: Record<string, string[]> = {}) => Object.entries(names);
  return {
    name,
    columns: parts.columns,
    uniques: columnsOf(parts.uniques).map(([unique, columnNames]) => ({ name: unique, columnNames })),
    indices: [
      ...columnsOf(parts.indices).map(([index, columnNames]) => ({ name: index, columnNames })),
      ...Object.entries(parts.partial ?? {}).map(([index, { columns, where }]) => ({
        name: index,
        columnNames: columns,
        isUnique: true,
        where,
      })),
    ],
    checks: Object.entries(parts.checks ?? {}).map(([check, expression]) => ({ name: check, expression })),
    foreignKeys: Object.entries(parts.references ?? {}).map(([columnName, to]) => ({
      name: `fk_${name}_${columnName.replace(/_id$/, '')}`,
      columnNames: [columnName],
      referencedTableName: typeof to === 'string' ? to : to.table,
      referencedColumnNames: ['id'],
      ...(typeof to === 'string' ? {} : { onDelete: 'CASCADE' }),
    })),
  };
}
