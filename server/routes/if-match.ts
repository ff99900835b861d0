import { DomainError, invalid } from '../errors/domain-error';

/**
 * The revision in an If-Match header: `"3"`, `3` or `W/"3"`.
 * @throws DomainError 428 where it is missing, 400 where it is no revision of ours
 */
export function revisionOf(header: string | undefined): number {
  if (header === undefined)
    throw new DomainError(428, 'revision_missing', 'Say which revision you change: send its rev as If-Match.');
  const digits = /^(?:W\/)?"?(\d{1,9})"?$/.exec(header.trim())?.[1];
  if (digits === undefined) throw invalid({ 'If-Match': 'This is no revision. Send the rev you have read, like "3".' });
  return Number(digits);
}
