import type { ChangedDto } from '@/shared/contract/common';

/** Errors the rules of the product raise; one middleware turns them into problem details. */
export class DomainError extends Error {
  constructor(
    readonly status: number,
    readonly code: string,
    message: string,
    readonly extra: {
      fields?: Record<string, string>;
      present?: unknown;
      changed?: ChangedDto;
      retryAfterS?: number;
    } = {},
  ) {
    super(message);
    this.name = 'DomainError';
  }
}

export const notFound = (what: string): DomainError =>
  new DomainError(404, 'not_found', `${what} is not here. It may have been removed.`);
export const forbidden = (message: string): DomainError => new DomainError(403, 'forbidden', message);
export const invalid = (
  fields: Record<string, string>,
  message = 'Some of this cannot be taken as it is.',
): DomainError => new DomainError(400, 'invalid', message, { fields });
export const conflict = (code: string, message: string, present?: unknown, changed?: ChangedDto): DomainError =>
  new DomainError(409, code, message, { present, changed });
export const stale = (present: unknown): DomainError =>
  new DomainError(412, 'stale', 'Somebody else has changed this meanwhile. Here is how it stands now.', { present });
export const tooMany = (retryAfterS: number): DomainError =>
  new DomainError(429, 'too_many', `Too many tries. Wait ${Math.ceil(retryAfterS)} s.`, { retryAfterS });
