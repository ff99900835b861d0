import { backUpNow, status } from '../services/status.service';
import type { RoutesModule } from './define-route';

export const statusRoutes: RoutesModule = (route) => {
  route({
    method: 'get',
    path: '/status',
    policy: { kind: 'capability', capability: 'workshop:write' },
    handle: ({ deps, member, now }) => status(deps, member, now),
  });
  route({
    method: 'post',
    path: '/status/backup',
    policy: { kind: 'capability', capability: 'workshop:write' },
    limit: 'backup',
    handle: ({ deps, member, now }) => backUpNow(deps, member, now),
  });
};
