import { benchBoard, wallBoard } from '../services/board.service';
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
    handle: ({ deps, wall, now }) => wallBoard(deps, wall.workshopId, now),
  });
};
