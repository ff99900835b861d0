import { dropWorkSchema, endStintSchema, takeWorkSchema, workQuerySchema, workSchema } from '@/shared/contract/work';
import { dropWork, reopenWork } from '../services/finish-work.service';
import { beginStint, endStint, giveBack } from '../services/stints.service';
import { takeWork } from '../services/take-work.service';
import { addWork, changeWork, oneWork, workList } from '../services/work.service';
import type { Policy, RoutesModule } from './define-route';

const read: Policy = { kind: 'capability', capability: 'work:read' };
const write: Policy = { kind: 'capability', capability: 'work:write' };

const idOf = (params: Record<string, string>): string => params.id ?? '';
const stintOf = (params: Record<string, string>): string => params.stintId ?? '';

export const workRoutes: RoutesModule = (route) => {
  route({
    method: 'get',
    path: '/work',
    policy: read,
    query: workQuerySchema,
    handle: ({ deps, member, query }) => workList(deps, member, query),
  });
  route({
    method: 'post',
    path: '/work',
    policy: write,
    body: workSchema,
    idempotent: true,
    status: 201,
    handle: ({ deps, member, body, now }) => addWork(deps, member, body, now),
  });
  route({
    method: 'get',
    path: '/work/:id',
    policy: read,
    handle: ({ deps, member, params }) => oneWork(deps, member, idOf(params)),
  });
  route({
    method: 'patch',
    path: '/work/:id',
    policy: write,
    body: workSchema,
    ifMatch: true,
    handle: ({ deps, member, params, rev, body, now }) => changeWork(deps, member, idOf(params), rev, body, now),
  });
  route({
    method: 'post',
    path: '/work/:id/take',
    policy: write,
    body: takeWorkSchema,
    idempotent: true,
    handle: ({ deps, member, params, body, now }) => takeWork(deps, member, idOf(params), body, now),
  });
  route({
    method: 'post',
    path: '/work/:id/stints/:stintId/begin',
    policy: write,
    idempotent: true,
    handle: ({ deps, member, params, now }) => beginStint(deps, member, idOf(params), stintOf(params), now),
  });
  route({
    method: 'post',
    path: '/work/:id/stints/:stintId/done',
    policy: write,
    body: endStintSchema,
    idempotent: true,
    handle: ({ deps, member, params, body, now }) => endStint(deps, member, idOf(params), stintOf(params), body, now),
  });
  route({
    method: 'post',
    path: '/work/:id/stints/:stintId/give-back',
    policy: write,
    idempotent: true,
    handle: ({ deps, member, params, now }) => giveBack(deps, member, idOf(params), stintOf(params), now),
  });
  route({
    method: 'post',
    path: '/work/:id/drop',
    policy: write,
    body: dropWorkSchema,
    handle: ({ deps, member, params, body, now }) => dropWork(deps, member, idOf(params), body, now),
  });
  route({
    method: 'post',
    path: '/work/:id/reopen',
    policy: write,
    handle: ({ deps, member, params, now }) => reopenWork(deps, member, idOf(params), now),
  });
};
