import { pipeline } from 'node:stream/promises';
import { waitsQuerySchema } from '@/shared/contract/waits';
import { waits, waitsCsv } from '../services/waits.service';
import type { Policy, RoutesModule } from './define-route';

const policy: Policy = { kind: 'capability', capability: 'waits:read' };

export const waitsRoutes: RoutesModule = (route) => {
  route({
    method: 'get',
    path: '/waits',
    policy,
    query: waitsQuerySchema,
    handle: ({ deps, member, query, now }) => waits(deps, member, query, now),
  });
  route({
    method: 'get',
    path: '/waits.csv',
    policy,
    query: waitsQuerySchema,
    handle: async ({ deps, member, query, now, response }) => {
      const file = await waitsCsv(deps, member, query, now);
      response.attachment(file.name).type('text/csv; charset=utf-8');
      await pipeline(file.lines, response);
    },
  });
};
