import type { ErrorRequestHandler, RequestHandler, Response } from 'express';
import type { Logger } from 'pino';
import type { ProblemDto } from '@/shared/contract/common';
import { CalcInputError } from '@/calc/errors';
import { DomainError } from '../errors/domain-error';

const titles: Record<number, string> = {
  400: 'Not usable as it is',
  401: 'Not signed in',
  403: 'Not allowed',
  404: 'Not here',
  405: 'Not possible here',
  409: 'Taken or already done',
  412: 'Changed meanwhile',
  413: 'Too large',
  415: 'Not understood',
  422: 'Not possible as it is',
  428: 'Revision missing',
  429: 'Too many tries',
  503: 'Not ready',
};

const unexpected = 'Something failed on the server. Nothing of what you typed is lost; try again.';

/** What an error means for the one who asked; null for one that nobody foresaw. */
function foreseen(error: unknown): DomainError | null {
  if (error instanceof DomainError) return error;
  if (error instanceof CalcInputError)
    return new DomainError(400, 'invalid', error.message, { fields: { [error.field]: error.message } });
  const { status, type } = error as { status?: unknown; type?: unknown };
  // Errors of express and its body reader carry a status of their own.
  if (type === 'entity.parse.failed') return new DomainError(400, 'not_json', 'The body is no JSON.');
  if (type === 'entity.too.large') return new DomainError(413, 'too_large', 'This is too large to be taken.');
  if (type === 'charset.unsupported' || type === 'encoding.unsupported')
    return new DomainError(415, 'not_understood', 'Send JSON in UTF-8.');
  if (error instanceof URIError || status === 400)
    return new DomainError(400, 'bad_request', 'This address cannot be read.');
  const { code } = error as { code?: unknown };
  if (code === 'SQLITE_FULL' || code === 'ENOSPC')
    return new DomainError(
      503,
      'disk_full',
      'The disk of the server is full, so nothing was written. What was written before is safe. Tell whoever runs the server, then try again.',
      { retryAfterS: 60 },
    );
  // With their extended forms: SQLITE_BUSY_SNAPSHOT, SQLITE_IOERR_WRITE.
  if (typeof code === 'string' && /^SQLITE_(BUSY|LOCKED|READONLY|IOERR)(_|$)/.test(code))
    return new DomainError(503, 'database_busy', 'The database could not be written just now. Try again.', {
      retryAfterS: 2,
    });
  return null;
}

function sendProblem(response: Response, error: DomainError, requestId: string | undefined): void {
  const { fields, present, changed, retryAfterS } = error.extra;
  const problem: ProblemDto = {
    type: 'about:blank',
    title: titles[error.status] ?? 'Failed',
    status: error.status,
    detail: error.message,
    code: error.code,
    ...(requestId ? { requestId } : {}),
    ...(fields ? { fields } : {}),
    ...(present !== undefined ? { present } : {}),
    ...(changed ? { changed } : {}),
  };
  if (retryAfterS !== undefined) response.set('Retry-After', String(Math.max(1, Math.ceil(retryAfterS))));
  response.status(error.status).type('application/problem+json').send(JSON.stringify(problem));
}

/** The one place where errors become answers (RFC 9457). What nobody foresaw is logged and tells the asker nothing. */
export const problems =
  (log: Logger): ErrorRequestHandler =>
  (error: unknown, request, response, next) => {
    if (response.headersSent) {
      next(error);
      return;
    }
    const known = foreseen(error);
    const { code } = error as { code?: unknown };
    if (!known || known.status >= 500) (request.log ?? log).error({ err: error, code }, 'request failed');
    sendProblem(response, known ?? new DomainError(500, 'failed', unexpected), requestIdOf(request.id));
  };

const requestIdOf = (id: unknown): string | undefined =>
  typeof id === 'string' || typeof id === 'number' ? String(id) : undefined;

/** For addresses of the API and for files that are not there. */
export const notHere: RequestHandler = (request) => {
  throw new DomainError(404, 'not_found', `Nothing is at ${request.method} ${request.path}.`);
};
