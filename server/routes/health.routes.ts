import { readiness } from '../services/health.service';
import type { RoutesModule } from './define-route';

/** For whatever watches the process: alive, and able to serve. */
export const healthRoutes: RoutesModule = (route) => {
  route({
    method: 'get',
    path: '//healthz',
    policy: { kind: 'public' },
    handle: async () => ({ status: 'alive' }),
  });
  route({
    method: 'get',
    path: '//readyz',
    policy: { kind: 'public' },
    handle: async ({ deps, response }) => {
      const state = await readiness(deps);
      response.status(state.status === 'ready' ? 200 : 503).json(state);
    },
  });
};
