import type { RequestHandler } from 'express';
import { DomainError } from '../errors/domain-error';

/**
 * Answers a body of JSON at once that is announced as too large. The body's reader lets all of a body come before it says
 * so: whoever announces gigabytes and sends nothing would hold the connection until it times out. What becomes of the
 * rest of the body is `closeUnread`'s.
 * @param mostBytes as the reader of bodies has it
 */
export const refuseAnnounced =
  (mostBytes: number): RequestHandler =>
  (request, _response, next) => {
    const tooLarge = Number(request.headers['content-length'] ?? 0) > mostBytes && request.is('json');
    next(tooLarge ? new DomainError(413, 'too_large', 'This is too large to be taken.') : undefined);
  };
