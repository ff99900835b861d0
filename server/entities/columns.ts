/** Column option makers shared by all entities: types that SQLite and PostgreSQL both have. */
import type { ColumnOptions, ValueTransformer } from 'typeorm';

/** Instants are UTC epoch milliseconds; some drivers give a bigint as a string. */
const instantTransformer: ValueTransformer = {
  to: (value: number | null | undefined) => value,
  from: (value: string | number | null) => (value === null ? null : Number(value)),
};

export const instantColumn = (name: string): ColumnOptions & { nullable?: false } => ({
  type: 'bigint',
  name,
  transformer: instantTransformer,
});
export const optionalInstantColumn = (name: string): ColumnOptions => ({ ...instantColumn(name), nullable: true });

const jsonTransformer: ValueTransformer = {
  to: (value: unknown) => (value === null || value === undefined ? value : JSON.stringify(value)),
  from: (value: string | null) => (value === null ? null : (JSON.parse(value) as unknown)),
};

/** JSON kept as text. */
export const jsonColumn = (name: string): ColumnOptions => ({ type: 'text', name, transformer: jsonTransformer });
export const optionalJsonColumn = (name: string): ColumnOptions => ({ ...jsonColumn(name), nullable: true });

export const idColumn = (name: string): ColumnOptions & { nullable?: false } => ({
  type: 'varchar',
  length: '36',
  name,
});
export const optionalIdColumn = (name: string): ColumnOptions => ({ ...idColumn(name), nullable: true });
export const textColumn = (name: string): ColumnOptions => ({ type: 'varchar', name });
export const optionalTextColumn = (name: string): ColumnOptions => ({ type: 'varchar', name, nullable: true });
export const realColumn = (name: string): ColumnOptions => ({ type: 'double precision', name });
export const optionalRealColumn = (name: string): ColumnOptions => ({ type: 'double precision', name, nullable: true });
export const wholeColumn = (name: string): ColumnOptions => ({ type: 'integer', name });
export const optionalWholeColumn = (name: string): ColumnOptions => ({ type: 'integer', name, nullable: true });
export const flagColumn = (name: string): ColumnOptions => ({ type: 'boolean', name });
export const optionalFlagColumn = (name: string): ColumnOptions => ({ type: 'boolean', name, nullable: true });
