import type { IncomingMessage } from 'node:http';
import type { TLSSocket } from 'node:tls';
import type { Deps } from '../deps';
import { readCookie } from '../middleware/cookies';
import { askedBy, fromOwnPage } from '../middleware/same-origin';
import { memberOf, wallOf } from '../services/who-asks';
import type { SocketAsker } from './socket-handlers';

type HandshakeDeps = Pick<Deps, 'config' | 'dataSource' | 'secrets' | 'clock'>;

const first = (value: string | string[] | undefined): string | undefined =>
  (Array.isArray(value) ? value[0] : value)?.split(',')[0]?.trim();

/** How the browser reached us; the forwarded headers count only where a proxy is set to stand in front. */
function reachedBy(request: IncomingMessage, proxyHops: number): { host: string | undefined; secure: boolean } {
  const encrypted = (request.socket as Partial<TLSSocket>).encrypted === true;
  if (proxyHops === 0) return { host: request.headers.host, secure: encrypted };
  const proto = first(request.headers['x-forwarded-proto']);
  return {
    host: first(request.headers['x-forwarded-host']) ?? request.headers.host,
    secure: proto === undefined ? encrypted : proto === 'https',
  };
}

/** Whether a handshake comes from a page of ours. A browser sends cookies with any site's web socket, so this is the guard. */
export function handshakeFromOwnPage(deps: HandshakeDeps, request: IncomingMessage): boolean {
  const { host, secure } = reachedBy(request, deps.config.proxyHops);
  return fromOwnPage(askedBy(request, host, secure), deps.config.publicUrl);
}

/** Who connects: by the same cookies as over HTTP. @returns null for nobody */
export async function askerOf(deps: HandshakeDeps, request: IncomingMessage, as: unknown): Promise<SocketAsker | null> {
  const { secure } = reachedBy(request, deps.config.proxyHops);
  const now = deps.clock.now();
  if (as === 'wall') {
    const wall = await wallOf(deps, readCookie(request.headers.cookie, 'bidewell_wall', secure), now);
    return wall && { kind: 'wall', wall };
  }
  const found = await memberOf(deps, readCookie(request.headers.cookie, 'bidewell_access', secure), now);
  return found && { kind: 'member', member: found.member };
}
