/** An input the calculation refuses, with what it would accept; never answered by a NaN. */
export class CalcInputError extends Error {
  readonly code = 'calc-input';
  readonly field: string;
  readonly value: unknown;
  readonly allowed: string;

  constructor(field: string, value: unknown, allowed: string) {
    super(`${field} is ${describe(value)}; it must be ${allowed}.`);
    this.name = 'CalcInputError';
    this.field = field;
    this.value = value;
    this.allowed = allowed;
  }
}

function describe(value: unknown): string {
  if (Array.isArray(value)) return value.length === 0 ? 'an empty list' : `a list of ${value.length}`;
  if (value === null || value === undefined) return 'missing';
  if (typeof value === 'object') return 'an object';
  return String(value);
}
