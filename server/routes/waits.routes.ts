import { pipeline } from 'node:stream/promises';
import {
  compareWaitsQuerySchema,
  waitChargesQuerySchema,
  waitGroupsQuerySchema,
  waitsCsvQuerySchema,
  waitsQuerySchema,
} from '@/shared/contract/waits';
import { compareWaits } from '../services/waits/compare-waits.service';
import { waitCharges } from '../services/waits/wait-charges.service';
import { waitsCsv } from '../services/waits/waits-csv.service';
import { waitGroups, waits } from '../services/waits/waits.service';
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
    path: '/waits/groups',
    policy,
    query: waitGroupsQuerySchema,
    handle: ({ deps, member, query, now }) => waitGroups(deps, member, query, now),
  });
  route({
    method: 'get',
    path: '/waits/charges',
    policy,
    query: waitChargesQuerySchema,
    handle: ({ deps, member, query, now }) => waitCharges(deps, member, query, now),
  });
  route({
    method: 'get',
    path: '/waits/compare',
    policy,
    query: compareWaitsQuerySchema,
    handle: ({ deps, member, query, now }) => compareWaits(deps, member, query, now),
  });
  route({
    method: 'get',
    path: '/waits.csv',
    policy,
    query: waitsCsvQuerySchema,
    handle: async ({ deps, member, query, now, response }) => {
      const file = await waitsCsv(deps, member, query, now);
      response.attachment(file.name).type('text/csv; charset=utf-8');
      await pipeline(file.lines, response);
    },
  });
};
