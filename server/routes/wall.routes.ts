import { approveWallSchema, wallTokenSchema } from '@/shared/contract/wall';
import { cookieOf, setCookie } from '../middleware/cookies';
import { wallCookieLifeMs } from '../services/session-limits';
import {
  approveWall,
  askForCode,
  collectWallToken,
  describeRequest,
  refuseWall,
  revokeWall,
} from '../services/wall-pairing.service';
import { pairedWalls, wallMe } from '../services/walls.service';
import { baseUrlOf } from './asking-device';
import type { Policy, RoutesModule } from './define-route';

const approve: Policy = { kind: 'capability', capability: 'wall:approve' };

/** Pairing of wall screens, and what a wall asks of itself. The board it reads is in board.routes.ts. */
export const wallRoutes: RoutesModule = (route) => {
  route({
    method: 'post',
    path: '/wall/codes',
    policy: { kind: 'public' },
    limit: 'wallCode',
    status: 201,
    handle: ({ deps, request, now }) =>
      askForCode(
        deps,
        { userAgent: request.get('user-agent'), baseUrl: baseUrlOf(request, deps.config.publicUrl) },
        now,
      ),
  });
  route({
    method: 'post',
    path: '/wall/token',
    policy: { kind: 'public' },
    limit: 'wallToken',
    body: wallTokenSchema,
    handle: async ({ deps, body, response, now }) => {
      const { token } = await collectWallToken(deps, body.deviceCode, now);
      setCookie(response, 'bidewell_wall', token, wallCookieLifeMs);
    },
  });
  route({
    method: 'get',
    path: '/wall/me',
    policy: { kind: 'wall' },
    handle: async ({ deps, wall, request, response }) => {
      // Said again with every start of the screen, so that the cookie never runs out on a wall that is used.
      setCookie(response, 'bidewell_wall', cookieOf(request, 'bidewell_wall') ?? '', wallCookieLifeMs);
      return wallMe(deps, wall);
    },
  });
  route({
    method: 'get',
    path: '/wall/requests/:userCode',
    policy: approve,
    handle: ({ deps, member, params, now }) => describeRequest(deps, member, params.userCode ?? '', now),
  });
  route({
    method: 'delete',
    path: '/wall/requests/:userCode',
    policy: approve,
    handle: ({ deps, member, params, now }) => refuseWall(deps, member, params.userCode ?? '', now),
  });
  route({
    method: 'post',
    path: '/wall/approvals',
    policy: approve,
    status: 201,
    body: approveWallSchema,
    handle: ({ deps, member, body, now }) => approveWall(deps, member, body, now),
  });
  route({ method: 'get', path: '/walls', policy: approve, handle: ({ deps, member }) => pairedWalls(deps, member) });
  route({
    method: 'delete',
    path: '/walls/:id',
    policy: { kind: 'capability', capability: 'wall:revoke' },
    handle: ({ deps, member, params, now }) => revokeWall(deps, member, params.id ?? '', now),
  });
};
