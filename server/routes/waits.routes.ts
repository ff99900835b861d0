import { pipeline } from 'node:stream/promises';
import {
  compareWaitsQuerySchema,
  waitChargesQuerySchema,
  waitGroupsQuerySchema,
  waitsCsvQuerySchema,
  waitsQuerySchema,
} from '@/shared/contract/waits';
import { channelsNeededSchema, shelfSchema, whatIfSchema } from '@/shared/contract/waits-replay';
import { compareWaits } from '../services/waits/compare-waits.service';
import { waitCharges } from '../services/waits/wait-charges.service';
import { waitsCsv } from '../services/waits/waits-csv.service';
import { waitGroups, waits } from '../services/waits/waits.service';
import {
  beginChannelsNeeded,
  beginShelf,
  beginWhatIf,
  cancelReplay,
  replayJob,
} from '../services/waits/replays.service';
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
  // Calculations over the history: begun here, then asked for until they are over.
  route({
    method: 'post',
    path: '/waits/what-if',
    policy,
    body: whatIfSchema,
    status: 202,
    handle: ({ deps, member, body, now }) => beginWhatIf(deps, member, body, now),
  });
  route({
    method: 'post',
    path: '/waits/channels-needed',
    policy,
    body: channelsNeededSchema,
    status: 202,
    handle: ({ deps, member, body, now }) => beginChannelsNeeded(deps, member, body, now),
  });
  route({
    method: 'post',
    path: '/waits/shelf',
    policy,
    body: shelfSchema,
    status: 202,
    handle: ({ deps, member, body, now }) => beginShelf(deps, member, body, now),
  });
  route({
    method: 'get',
    path: '/waits/replays/:id',
    policy,
    handle: async ({ deps, member, params }) => replayJob(deps, member, params.id ?? ''),
  });
  route({
    method: 'post',
    path: '/waits/replays/:id/cancel',
    policy,
    handle: async ({ deps, member, params }) => cancelReplay(deps, member, params.id ?? ''),
  });
};
