import { changeAlertSettingsSchema, pushDeviceSchema } from '@/shared/contract/alert-settings';
import {
  addPushDevice,
  alertSettings,
  changeAlertSettings,
  pushKey,
  removePushDevice,
} from '../services/alert-settings.service';
import { dropUndelivered, sendAgain, undelivered } from '../services/undelivered.service';
import type { RoutesModule } from './define-route';

export const alertSettingsRoutes: RoutesModule = (route) => {
  route({
    method: 'get',
    path: '/me/alert-settings',
    policy: { kind: 'member' },
    handle: ({ deps, member }) => alertSettings(deps, member),
  });
  route({
    method: 'patch',
    path: '/me/alert-settings',
    policy: { kind: 'member' },
    body: changeAlertSettingsSchema,
    handle: ({ deps, member, body, now }) => changeAlertSettings(deps, member, body, now),
  });
  route({
    method: 'get',
    path: '/push-key',
    policy: { kind: 'member' },
    handle: async ({ deps, member }) => pushKey(deps, member),
  });
  route({
    method: 'post',
    path: '/me/push-devices',
    policy: { kind: 'member' },
    body: pushDeviceSchema,
    status: 201,
    handle: ({ deps, member, body, request, now }) => addPushDevice(deps, member, body, request.get('user-agent'), now),
  });
  route({
    method: 'delete',
    path: '/me/push-devices/:id',
    policy: { kind: 'member' },
    handle: ({ deps, member, params }) => removePushDevice(deps, member, params.id ?? ''),
  });
  route({
    method: 'get',
    path: '/alerts/undelivered',
    policy: { kind: 'capability', capability: 'workshop:write' },
    handle: ({ deps, member }) => undelivered(deps, member),
  });
  route({
    method: 'post',
    path: '/alerts/undelivered/:id/again',
    policy: { kind: 'capability', capability: 'workshop:write' },
    handle: ({ deps, member, params, now }) => sendAgain(deps, member, params.id ?? '', now),
  });
  route({
    method: 'post',
    path: '/alerts/undelivered/:id/drop',
    policy: { kind: 'capability', capability: 'workshop:write' },
    handle: ({ deps, member, params, now }) => dropUndelivered(deps, member, params.id ?? '', now),
  });
};
