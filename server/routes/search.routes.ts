import { searchQuerySchema } from '@/shared/contract/search';
import { search } from '../services/search.service';
import type { RoutesModule } from './define-route';

export const searchRoutes: RoutesModule = (route) => {
  route({
    method: 'get',
    path: '/search',
    // Who reads repairs reads the stock and the board too.
    policy: { kind: 'capability', capability: 'repair:read' },
    query: searchQuerySchema,
    handle: ({ deps, member, query }) => search(deps, member, query),
  });
};
