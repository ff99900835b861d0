import { estimateSchema } from '@/shared/contract/estimate';
import { planSchema } from '@/shared/contract/plan';
import { estimate } from '../services/estimates.service';
import { plan } from '../services/plans.service';
import type { RoutesModule } from './define-route';

export const plansRoutes: RoutesModule = (route) => {
  route({
    method: 'post',
    path: '/plans',
    policy: { kind: 'capability', capability: 'charge:plan' },
    body: planSchema,
    handle: ({ deps, member, body, now }) => plan(deps, member, body, now),
  });
  route({
    method: 'post',
    path: '/estimates',
    policy: { kind: 'public' },
    limit: 'estimate',
    body: estimateSchema,
    handle: async ({ body }) => estimate(body),
  });
};
