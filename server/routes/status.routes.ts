import { pipeline } from 'node:stream/promises';
import { backUpNow, status } from '../services/status.service';
import { exportWorkshop } from '../services/workshop-export';
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
  route({
    method: 'get',
    path: '/export.zip',
    policy: { kind: 'capability', capability: 'workshop:write' },
    limit: 'backup',
    handle: async ({ deps, member, now, response }) => {
      const file = await exportWorkshop(deps, member, now);
      response.attachment(file.name).type('application/zip');
      await pipeline(file.bytes, response);
    },
  });
};
