import type { RequestHandler } from 'express';
import type { Logger } from 'pino';

/**
 * Says once in the log that a proxy seems to stand in front whose forwarded addresses are not believed: all who come
 * through it share one address, and with it the throttle of sign-ins from devices not seen before.
 * @param hops proxies whose forwarded headers are believed
 */
export function unbelievedProxy(log: Logger, hops: number): RequestHandler {
  let said = hops > 0;
  return (request, _response, next) => {
    if (!said && request.headers['x-forwarded-for'] !== undefined) {
      said = true;
      log.warn(
        { ip: request.ip },
        'X-Forwarded-For arrives, but no proxy is believed: everybody behind it counts as one address. Set BIDEWELL_PROXY_HOPS to the number of proxies in front.',
      );
    }
    next();
  };
}
