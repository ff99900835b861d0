import {
  channelFaultSchema,
  chargerSchema,
  meterSchema,
  moduleTypeSchema,
  ownCurveSchema,
  resistorSchema,
} from '@/shared/contract/equipment';
import { channelFailed, channelWorks } from '../services/channel-faults.service';
import { addCharger, changeCharger, charger, chargers, retireCharger } from '../services/chargers.service';
import { addMeter, changeMeter, meters, removeMeter } from '../services/meters.service';
import {
  addModuleType,
  changeModuleType,
  moduleType,
  moduleTypes,
  removeModuleType,
} from '../services/module-types.service';
import { removeOwnCurve, saveOwnCurve } from '../services/own-curves.service';
import { addResistor, changeResistor, removeResistor, resistors } from '../services/resistors.service';
import type { Policy, RoutesModule } from './define-route';

const read: Policy = { kind: 'capability', capability: 'equipment:read' };
const write: Policy = { kind: 'capability', capability: 'equipment:write' };

export const equipmentRoutes: RoutesModule = (route) => {
  route({
    method: 'get',
    path: '/module-types',
    policy: read,
    handle: ({ deps, member }) => moduleTypes(deps, member),
  });
  route({
    method: 'post',
    path: '/module-types',
    policy: write,
    body: moduleTypeSchema,
    status: 201,
    handle: ({ deps, member, body, now }) => addModuleType(deps, member, body, now),
  });
  route({
    method: 'get',
    path: '/module-types/:id',
    policy: read,
    handle: ({ deps, member, params }) => moduleType(deps, member, params.id!),
  });
  route({
    method: 'patch',
    path: '/module-types/:id',
    policy: write,
    body: moduleTypeSchema,
    ifMatch: true,
    handle: ({ deps, member, params, rev, body, now }) => changeModuleType(deps, member, params.id!, rev, body, now),
  });
  route({
    method: 'delete',
    path: '/module-types/:id',
    policy: write,
    ifMatch: true,
    handle: ({ deps, member, params, rev, now }) => removeModuleType(deps, member, params.id!, rev, now),
  });
  route({
    method: 'put',
    path: '/module-types/:id/curve',
    policy: write,
    body: ownCurveSchema,
    ifMatch: true,
    handle: ({ deps, member, params, rev, body, now }) => saveOwnCurve(deps, member, params.id!, rev, body, now),
  });
  route({
    method: 'delete',
    path: '/module-types/:id/curve',
    policy: write,
    ifMatch: true,
    handle: ({ deps, member, params, rev, now }) => removeOwnCurve(deps, member, params.id!, rev, now),
  });

  route({
    method: 'get',
    path: '/chargers',
    policy: read,
    handle: ({ deps, member, now }) => chargers(deps, member, now),
  });
  route({
    method: 'post',
    path: '/chargers',
    policy: write,
    body: chargerSchema,
    status: 201,
    handle: ({ deps, member, body, now }) => addCharger(deps, member, body, now),
  });
  route({
    method: 'get',
    path: '/chargers/:id',
    policy: read,
    handle: ({ deps, member, params, now }) => charger(deps, member, params.id!, now),
  });
  route({
    method: 'patch',
    path: '/chargers/:id',
    policy: write,
    body: chargerSchema,
    ifMatch: true,
    handle: ({ deps, member, params, rev, body, now }) => changeCharger(deps, member, params.id!, rev, body, now),
  });
  route({
    method: 'delete',
    path: '/chargers/:id',
    policy: write,
    ifMatch: true,
    handle: ({ deps, member, params, rev, now }) => retireCharger(deps, member, params.id!, rev, now),
  });

  route({
    method: 'post',
    path: '/channels/:id/fault',
    policy: { kind: 'capability', capability: 'charge:run' },
    body: channelFaultSchema,
    handle: ({ deps, member, params, body, now }) => channelFailed(deps, member, params.id!, body, now),
  });
  route({
    method: 'post',
    path: '/channels/:id/works',
    policy: { kind: 'capability', capability: 'charge:assign' },
    handle: ({ deps, member, params, now }) => channelWorks(deps, member, params.id!, now),
  });

  route({ method: 'get', path: '/resistors', policy: read, handle: ({ deps, member }) => resistors(deps, member) });
  route({
    method: 'post',
    path: '/resistors',
    policy: write,
    body: resistorSchema,
    status: 201,
    handle: ({ deps, member, body, now }) => addResistor(deps, member, body, now),
  });
  route({
    method: 'patch',
    path: '/resistors/:id',
    policy: write,
    body: resistorSchema,
    ifMatch: true,
    handle: ({ deps, member, params, rev, body, now }) => changeResistor(deps, member, params.id!, rev, body, now),
  });
  route({
    method: 'delete',
    path: '/resistors/:id',
    policy: write,
    ifMatch: true,
    handle: ({ deps, member, params, rev, now }) => removeResistor(deps, member, params.id!, rev, now),
  });

  route({ method: 'get', path: '/meters', policy: read, handle: ({ deps, member }) => meters(deps, member) });
  route({
    method: 'post',
    path: '/meters',
    policy: write,
    body: meterSchema,
    status: 201,
    handle: ({ deps, member, body, now }) => addMeter(deps, member, body, now),
  });
  route({
    method: 'patch',
    path: '/meters/:id',
    policy: write,
    body: meterSchema,
    ifMatch: true,
    handle: ({ deps, member, params, rev, body, now }) => changeMeter(deps, member, params.id!, rev, body, now),
  });
  route({
    method: 'delete',
    path: '/meters/:id',
    policy: write,
    ifMatch: true,
    handle: ({ deps, member, params, rev, now }) => removeMeter(deps, member, params.id!, rev, now),
  });
};
