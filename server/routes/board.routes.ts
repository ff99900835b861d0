import { benchBoard } from '../services/board.service';
import { sendBoard } from './send-board';
import type { RoutesModule } from './define-route';

export const boardRoutes: RoutesModule = (route) => {
  route({
    method: 'get',
    path: '/board',
    policy: { kind: 'capability', capability: 'board:read' },
    handle: ({ deps, member, now }) => benchBoard(deps, member.workshopId, now),
  });
  route({
    method: 'get',
    path: '/wall/board',
    policy: { kind: 'wall' },
    handle: async ({ deps, wall, now, request, response }) =>
      sendBoard(request, response, await deps.wallBoards.read(wall.workshopId, now)),
  });
};
