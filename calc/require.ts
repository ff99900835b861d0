import { CalcInputError } from './errors';

/** Throws unless `value` is a finite number; gives it back. */
export function requireFinite(field: string, value: number): number {
  if (typeof value !== 'number' || !Number.isFinite(value)) throw new CalcInputError(field, value, 'a number');
  return value;
}

/** Throws unless `value` is a finite number above zero; gives it back. */
export function requirePositive(field: string, value: number): number {
  if (typeof value !== 'number' || !(value > 0) || value === Infinity)
    throw new CalcInputError(field, value, 'a number above 0');
  return value;
}

/** Throws unless `value` is a finite number, 0 or above; gives it back. */
export function requireNotNegative(field: string, value: number): number {
  if (typeof value !== 'number' || !(value >= 0) || value === Infinity)
    throw new CalcInputError(field, value, 'a number, 0 or above');
  return value;
}

/** The same for what may be left out. */
export function requirePositiveOrNull(field: string, value: number | null | undefined): void {
  if (isGiven(value)) requirePositive(field, value);
}

/** A value that may be left out, and was not. */
export function isGiven(value: number | null | undefined): value is number {
  return value !== null && value !== undefined;
}
