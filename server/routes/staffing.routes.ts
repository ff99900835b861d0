import { placeSchema, skillSchema, staffingSchema } from '@/shared/contract/staffing';
import { addPlace, changePlace, removePlace } from '../services/places.service';
import { addSkill, changeSkill, removeSkill } from '../services/skills.service';
import { changeStaffing, staffing } from '../services/staffing.service';
import type { Policy, RoutesModule } from './define-route';

const read: Policy = { kind: 'capability', capability: 'work:read' };
const people: Policy = { kind: 'capability', capability: 'people:write' };
const write: Policy = { kind: 'capability', capability: 'workshop:write' };

const idOf = (params: Record<string, string>): string => params.id ?? '';

export const staffingRoutes: RoutesModule = (route) => {
  route({ method: 'get', path: '/staffing', policy: read, handle: ({ deps, member }) => staffing(deps, member) });
  route({
    method: 'patch',
    path: '/staffing/:personId',
    policy: people,
    body: staffingSchema,
    ifMatch: true,
    handle: ({ deps, member, params, rev, body, now }) =>
      changeStaffing(deps, member, params.personId ?? '', rev, body, now),
  });

  route({
    method: 'post',
    path: '/skills',
    policy: write,
    body: skillSchema,
    status: 201,
    handle: ({ deps, member, body, now }) => addSkill(deps, member, body, now),
  });
  route({
    method: 'patch',
    path: '/skills/:id',
    policy: write,
    body: skillSchema,
    ifMatch: true,
    handle: ({ deps, member, params, rev, body, now }) => changeSkill(deps, member, idOf(params), rev, body, now),
  });
  route({
    method: 'delete',
    path: '/skills/:id',
    policy: write,
    ifMatch: true,
    handle: ({ deps, member, params, rev, now }) => removeSkill(deps, member, idOf(params), rev, now),
  });

  route({
    method: 'post',
    path: '/places',
    policy: write,
    body: placeSchema,
    status: 201,
    handle: ({ deps, member, body, now }) => addPlace(deps, member, body, now),
  });
  route({
    method: 'patch',
    path: '/places/:id',
    policy: write,
    body: placeSchema,
    ifMatch: true,
    handle: ({ deps, member, params, rev, body, now }) => changePlace(deps, member, idOf(params), rev, body, now),
  });
  route({
    method: 'delete',
    path: '/places/:id',
    policy: write,
    ifMatch: true,
    handle: ({ deps, member, params, rev, now }) => removePlace(deps, member, idOf(params), rev, now),
  });
};
