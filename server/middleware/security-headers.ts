import { createHash } from 'node:crypto';
import type { IncomingMessage, ServerResponse } from 'node:http';
import type { Request, RequestHandler } from 'express';
import helmet from 'helmet';

const yearS = 365 * 24 * 60 * 60;

/** CSP sources of the scripts that stand in the page itself; everything else comes from files of ours. */
export const inlineScriptHashes = (html: string): string[] =>
  [...html.matchAll(/<script(?![^>]*\ssrc=)[^>]*>([\s\S]*?)<\/script>/gi)]
    .map((match) => match[1] ?? '')
    .filter((script) => script !== '')
    .map((script) => `'sha256-${createHash('sha256').update(script).digest('base64')}'`);

/** The host a browser addressed as a socket source: older ones do not count web sockets as 'self'. */
function ownSockets(message: IncomingMessage): string {
  const request = message as Request;
  const host = request.host;
  return host && /^[A-Za-z0-9.:[\]-]+$/.test(host) ? `${request.secure ? 'wss' : 'ws'}://${host}` : "'self'";
}

const localHost = /^(localhost|127\.\d+\.\d+\.\d+|\[::1\])$/;

/**
 * The security headers of every answer. Over plain http those are left out that a browser heeds only over https, or
 * that would break it. HSTS is not sent for this machine's own name: it would hold for every other port of it too.
 * @param html the page of the web app; null while Metro serves it, whose scripts no policy could name
 */
export function securityHeaders(html: string | null): RequestHandler {
  const policy = (secure: boolean) =>
    html === null
      ? (false as const)
      : {
          useDefaults: false,
          directives: {
            'default-src': ["'self'"],
            'script-src': ["'self'", ...inlineScriptHashes(html)],
            'script-src-attr': ["'none'"],
            // react-native-web writes its styles into the page.
            'style-src': ["'self'", "'unsafe-inline'"],
            'img-src': ["'self'", 'data:', 'blob:'],
            'font-src': ["'self'", 'data:'],
            'media-src': ["'self'", 'data:', 'blob:'],
            'connect-src': ["'self'", (request: IncomingMessage, _response: ServerResponse) => ownSockets(request)],
            'worker-src': ["'self'"],
            'manifest-src': ["'self'"],
            'object-src': ["'none'"],
            'base-uri': ["'self'"],
            'form-action': ["'self'"],
            'frame-ancestors': ["'none'"],
            'upgrade-insecure-requests': secure ? [] : null,
          },
        };
  const make = (secure: boolean, local: boolean) =>
    helmet({
      contentSecurityPolicy: policy(secure),
      strictTransportSecurity: secure && !local ? { maxAge: yearS, includeSubDomains: false } : false,
      crossOriginOpenerPolicy: secure || local ? { policy: 'same-origin' } : false,
      originAgentCluster: false,
      crossOriginResourcePolicy: { policy: 'same-origin' },
      referrerPolicy: { policy: 'same-origin' },
      xFrameOptions: { action: 'deny' },
    });
  const made = new Map<string, ReturnType<typeof helmet>>();
  return (request, response, next) => {
    const local = localHost.test(request.hostname ?? '');
    const key = `${request.secure} ${local}`;
    const headers = made.get(key) ?? make(request.secure, local);
    made.set(key, headers);
    response.set(
      'Permissions-Policy',
      'camera=(self), screen-wake-lock=(self), geolocation=(), microphone=(), payment=()',
    );
    headers(request, response, next);
  };
}
