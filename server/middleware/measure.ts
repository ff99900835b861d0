import type { RequestHandler } from 'express';
import type { Metrics } from '../services/metrics';

/** Times every request until its answer is out, under the path its route declares. */
export const measure =
  (metrics: Metrics): RequestHandler =>
  (request, response, next) => {
    const begun = process.hrtime.bigint();
    response.once('finish', () => {
      const { path } = (request.route ?? {}) as { path?: unknown };
      // Files of the web app and addresses that nobody has are one line each: a scanner must not fill the memory.
      const route = typeof path === 'string' ? path : response.statusCode === 404 ? '(not here)' : '(file)';
      metrics.request(request.method, route, response.statusCode, Number(process.hrtime.bigint() - begun) / 1e9);
    });
    next();
  };
