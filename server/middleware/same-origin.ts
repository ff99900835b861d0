import type { IncomingMessage } from 'node:http';
import type { RequestHandler } from 'express';
import { DomainError } from '../errors/domain-error';

interface Asked {
  origin: string | undefined;
  fetchSite: string | undefined;
  /** Host the browser addressed, with its port. */
  host: string | undefined;
  secure: boolean;
}

/**
 * Whether a browser's request comes from a page of ours: its Origin names the host it was sent to, or the address the
 * operator has set. A request that names no origin comes from no page of a present browser (curl, a script); cookies
 * are SameSite=Strict beside this.
 */
export function fromOwnPage(asked: Asked, publicUrl: string | null): boolean {
  if (asked.origin === undefined)
    return asked.fetchSite === undefined || asked.fetchSite === 'same-origin' || asked.fetchSite === 'none';
  let origin: URL;
  try {
    origin = new URL(asked.origin);
  } catch {
    return false; // 'null' of a sandboxed page, or rubbish
  }
  if (publicUrl !== null && origin.origin === new URL(publicUrl).origin) return true;
  if (asked.host === undefined) return false;
  const own = `${asked.secure ? 'https' : 'http'}://${asked.host}`;
  try {
    return origin.origin === new URL(own).origin;
  } catch {
    return false;
  }
}

const single = (value: string | string[] | undefined): string | undefined => (Array.isArray(value) ? value[0] : value);

/** The parts of the check out of the headers of a request or a handshake. */
export const askedBy = (
  request: Pick<IncomingMessage, 'headers'>,
  host: string | undefined,
  secure: boolean,
): Asked => ({
  origin: single(request.headers.origin),
  fetchSite: single(request.headers['sec-fetch-site']),
  host,
  secure,
});

/** Refuses every write that another site's page makes a browser send. */
export const sameOrigin =
  (publicUrl: string | null): RequestHandler =>
  (request, _response, next) => {
    if (request.method === 'GET' || request.method === 'HEAD' || request.method === 'OPTIONS') {
      next();
      return;
    }
    if (fromOwnPage(askedBy(request, request.host, request.secure), publicUrl)) {
      next();
      return;
    }
    request.log?.warn({ origin: request.headers.origin }, 'refused: another origin');
    throw new DomainError(403, 'other_origin', 'This came from a page of another address. Open Bidewell itself.');
  };
