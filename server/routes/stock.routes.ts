import {
  capacityAnswerSchema,
  newSpareSchema,
  quarantineSchema,
  spareReadingSchema,
  spareSchema,
  sparesQuerySchema,
} from '@/shared/contract/spare';
import { answerCapacity } from '../services/capacity-answers.service';
import { quarantineSpare, releaseSpare } from '../services/quarantine.service';
import { addSpareReading } from '../services/spare-readings.service';
import { addSpare, changeSpare, spare, spareHistory, spares } from '../services/spares.service';
import type { Policy, RoutesModule } from './define-route';

const read: Policy = { kind: 'capability', capability: 'stock:read' };
const write: Policy = { kind: 'capability', capability: 'stock:write' };

export const stockRoutes: RoutesModule = (route) => {
  route({
    method: 'get',
    path: '/spares',
    policy: read,
    query: sparesQuerySchema,
    handle: ({ deps, member, query }) => spares(deps, member, query),
  });
  route({
    method: 'post',
    path: '/spares',
    policy: write,
    body: newSpareSchema,
    status: 201,
    handle: ({ deps, member, body, now }) => addSpare(deps, member, body, now),
  });
  route({
    method: 'get',
    path: '/spares/:id',
    policy: read,
    handle: ({ deps, member, params }) => spare(deps, member, params.id!),
  });
  route({
    method: 'patch',
    path: '/spares/:id',
    policy: write,
    body: spareSchema,
    ifMatch: true,
    handle: ({ deps, member, params, rev, body, now }) => changeSpare(deps, member, params.id!, rev, body, now),
  });
  route({
    method: 'post',
    path: '/spares/:id/readings',
    policy: write,
    body: spareReadingSchema,
    status: 201,
    handle: ({ deps, member, params, body, now }) => addSpareReading(deps, member, params.id!, body, now),
  });
  route({
    method: 'post',
    path: '/spares/:id/quarantine',
    policy: { kind: 'capability', capability: 'spare:quarantine' },
    body: quarantineSchema,
    ifMatch: true,
    handle: ({ deps, member, params, rev, body, now }) => quarantineSpare(deps, member, params.id!, rev, body, now),
  });
  route({
    method: 'post',
    path: '/spares/:id/release',
    policy: { kind: 'capability', capability: 'spare:release' },
    ifMatch: true,
    handle: ({ deps, member, params, rev, now }) => releaseSpare(deps, member, params.id!, rev, now),
  });
  route({
    method: 'post',
    path: '/spares/:id/capacities/:capacityId',
    policy: write,
    body: capacityAnswerSchema,
    ifMatch: true,
    handle: ({ deps, member, params, rev, body, now }) =>
      answerCapacity(deps, member, { spareId: params.id!, capacityId: params.capacityId! }, rev, body, now),
  });
  route({
    method: 'get',
    path: '/spares/:id/history',
    policy: read,
    handle: ({ deps, member, params }) => spareHistory(deps, member, params.id!),
  });
};
