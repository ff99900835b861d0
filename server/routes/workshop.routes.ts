import { changeWorkshopSchema } from '@/shared/contract/workshop';
import { changeSettings, settings } from '../services/workshop.service';
import type { RoutesModule } from './define-route';

export const workshopRoutes: RoutesModule = (route) => {
  route({
    method: 'get',
    path: '/workshop',
    policy: { kind: 'member' },
    handle: ({ deps, member }) => settings(deps, member),
  });
  route({
    method: 'patch',
    path: '/workshop',
    policy: { kind: 'capability', capability: 'workshop:write' },
    ifMatch: true,
    body: changeWorkshopSchema,
    handle: ({ deps, member, body, rev, now }) => changeSettings(deps, member, { ...body, rev }, now),
  });
};
