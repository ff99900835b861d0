import { createHash, timingSafeEqual } from 'node:crypto';
import { DomainError } from '../errors/domain-error';
import type { RoutesModule } from './define-route';

const digest = (text: string): Buffer => createHash('sha256').update(text).digest();

/** For the monitoring of whoever runs the server: only where a token was set, and only with it. */
export const metricsRoutes: RoutesModule = (route) => {
  route({
    method: 'get',
    path: '//metrics',
    policy: { kind: 'public' },
    limit: 'open',
    handle: async ({ deps, request, response }) => {
      const { metricsToken } = deps.config;
      if (metricsToken === null) throw new DomainError(404, 'not_found', 'Nothing is at GET /metrics.');
      const given = /^Bearer (.+)$/.exec(request.get('authorization') ?? '')?.[1] ?? '';
      if (!timingSafeEqual(digest(given), digest(metricsToken)))
        throw new DomainError(401, 'signed_out', 'Send the token of BIDEWELL_METRICS_TOKEN as a bearer token.');
      const { type, body } = await deps.metrics.text();
      response.set('Cache-Control', 'no-store').set('Content-Type', type).send(body);
    },
  });
};
