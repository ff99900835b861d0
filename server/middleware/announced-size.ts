import type { RequestHandler } from 'express';
import { DomainError } from '../errors/domain-error';

/**
 * Answers a body of JSON at once that is announced as far too large, and closes its connection. The body's reader lets
 * all of a body come before it says that it is too large: right for one somewhat above its limit, whose sender hears the
 * answer that way; whoever announces gigabytes and sends nothing would hold the connection until it times out.
 * @param mostBytes larger ones are not waited for
 */
export const refuseAnnounced =
  (mostBytes: number): RequestHandler =>
  (request, response, next) => {
    const announced = Number(request.headers['content-length'] ?? 0);
    if (announced <= mostBytes || !request.is('json')) {
      next();
      return;
    }
    // Node ends the connection with the answer, whatever of the body is still to come.
    response.set('Connection', 'close');
    next(new DomainError(413, 'too_large', 'This is too large to be taken.'));
  };
