import {
  changeMeSchema,
  createWorkshopSchema,
  demoSignInSchema,
  joinSchema,
  resetSchema,
  signInSchema,
} from '@/shared/contract/session';
import { DomainError } from '../errors/domain-error';
import { cookieOf } from '../middleware/cookies';
import { frontDoor } from '../services/front-door.service';
import { describeLink } from '../services/invitations.service';
import { createWorkshop, join, resetPassword } from '../services/join.service';
import { changeMe } from '../services/me.service';
import {
  describeSession,
  endAllSessions,
  endSession,
  listSessions,
  refreshSession,
} from '../services/sessions.service';
import { demoSignIn, signIn } from '../services/sign-in.service';
import { askingDevice, beginSession, forgetSession } from './asking-device';
import type { Policy, RoutesModule } from './define-route';

const open: Policy = { kind: 'public' };
const member: Policy = { kind: 'member' };

/** Who is asking: sign-in, links, the session, one's own name and password. */
export const sessionRoutes: RoutesModule = (route) => {
  route({
    method: 'get',
    path: '/front-door',
    policy: open,
    handle: ({ deps }) => frontDoor(deps),
  });
  route({
    method: 'post',
    path: '/session',
    policy: open,
    body: signInSchema,
    // Throttled by account, address and device in the service.
    handle: async ({ deps, body, request, response, now }) =>
      beginSession(response, await signIn(deps, body, askingDevice(request), now), now),
  });
  route({
    method: 'post',
    path: '/demo/sign-in',
    policy: open,
    demoOnly: true,
    limit: 'open',
    body: demoSignInSchema,
    handle: async ({ deps, body, request, response, now }) =>
      beginSession(response, await demoSignIn(deps, body.role, askingDevice(request), now), now),
  });
  route({
    method: 'post',
    path: '/session/refresh',
    policy: open,
    limit: 'open',
    handle: async ({ deps, request, response, now }) => {
      try {
        return beginSession(response, await refreshSession(deps, cookieOf(request, 'bidewell_refresh'), now), now);
      } catch (error) {
        // A database that is busy for a moment ends nobody's session.
        if (error instanceof DomainError && error.status === 401) forgetSession(response);
        throw error;
      }
    },
  });
  route({
    method: 'get',
    path: '/session',
    policy: member,
    handle: ({ deps, member }) => describeSession(deps, member),
  });
  route({
    method: 'delete',
    path: '/session',
    policy: member,
    handle: async ({ deps, member, response, now }) => {
      await endSession(deps, member, now);
      forgetSession(response);
    },
  });
  route({
    method: 'get',
    path: '/sessions',
    policy: member,
    handle: ({ deps, member, now }) => listSessions(deps, member, now),
  });
  route({
    method: 'delete',
    path: '/sessions',
    policy: member,
    handle: async ({ deps, member, response, now }) => {
      await endAllSessions(deps, member, now);
      forgetSession(response);
    },
  });
  route({
    method: 'patch',
    path: '/me',
    policy: member,
    body: changeMeSchema,
    handle: ({ deps, member, body, now }) => changeMe(deps, member, body, now),
  });
  route({
    method: 'post',
    path: '/workshops',
    policy: open,
    limit: 'createWorkshop',
    status: 201,
    body: createWorkshopSchema,
    handle: async ({ deps, body, request, response, now }) =>
      beginSession(response, await createWorkshop(deps, body, askingDevice(request), now), now),
  });
  route({
    method: 'get',
    path: '/links/:token',
    policy: open,
    limit: 'join',
    handle: ({ deps, params, now }) => describeLink(deps, params.token ?? '', now),
  });
  route({
    method: 'post',
    path: '/join',
    policy: open,
    limit: 'join',
    status: 201,
    body: joinSchema,
    handle: async ({ deps, body, request, response, now }) =>
      beginSession(response, await join(deps, body, askingDevice(request), now), now),
  });
  route({
    method: 'post',
    path: '/reset',
    policy: open,
    limit: 'join',
    body: resetSchema,
    handle: async ({ deps, body, request, response, now }) =>
      beginSession(response, await resetPassword(deps, body, askingDevice(request), now), now),
  });
};
