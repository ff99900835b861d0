import { passAlertSchema } from '@/shared/contract/alert';
import { alerts, passAlert, takeAlert } from '../services/alerts.service';
import type { RoutesModule } from './define-route';

export const alertsRoutes: RoutesModule = (route) => {
  route({
    method: 'get',
    path: '/alerts',
    policy: { kind: 'capability', capability: 'board:read' },
    handle: ({ deps, member, now }) => alerts(deps, member, now),
  });
  route({
    method: 'post',
    path: '/alerts/:id/take',
    policy: { kind: 'capability', capability: 'alert:take' },
    handle: ({ deps, member, params, now }) => takeAlert(deps, member, params.id ?? '', now),
  });
  route({
    method: 'post',
    path: '/alerts/:id/pass',
    policy: { kind: 'capability', capability: 'alert:take' },
    body: passAlertSchema,
    handle: ({ deps, member, params, body, now }) => passAlert(deps, member, params.id ?? '', body.personId, now),
  });
};
