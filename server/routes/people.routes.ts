import { changePersonSchema, inviteSchema } from '@/shared/contract/people';
import { invite, pendingInvitations, recallInvitation, resetLink } from '../services/invitations.service';
import { changePerson, everybody } from '../services/people.service';
import { baseUrlOf } from './asking-device';
import type { Policy, RoutesModule } from './define-route';

const read: Policy = { kind: 'capability', capability: 'people:read' };
const write: Policy = { kind: 'capability', capability: 'people:write' };

export const peopleRoutes: RoutesModule = (route) => {
  route({ method: 'get', path: '/people', policy: read, handle: ({ deps, member }) => everybody(deps, member) });
  route({
    method: 'patch',
    path: '/people/:id',
    policy: write,
    ifMatch: true,
    body: changePersonSchema,
    handle: ({ deps, member, params, body, rev, now }) =>
      changePerson(deps, member, { ...body, id: params.id ?? '', rev }, now),
  });
  route({
    method: 'post',
    path: '/people/:id/reset-link',
    policy: write,
    status: 201,
    handle: ({ deps, member, params, request, now }) =>
      resetLink(deps, member, { personId: params.id ?? '', baseUrl: baseUrlOf(request, deps.config.publicUrl) }, now),
  });
  route({
    method: 'get',
    path: '/invitations',
    policy: write,
    handle: ({ deps, member, now }) => pendingInvitations(deps, member, now),
  });
  route({
    method: 'post',
    path: '/invitations',
    policy: write,
    status: 201,
    body: inviteSchema,
    handle: ({ deps, member, body, request, now }) =>
      invite(deps, member, { ...body, baseUrl: baseUrlOf(request, deps.config.publicUrl) }, now),
  });
  route({
    method: 'delete',
    path: '/invitations/:id',
    policy: write,
    handle: ({ deps, member, params, now }) => recallInvitation(deps, member, params.id ?? '', now),
  });
};
