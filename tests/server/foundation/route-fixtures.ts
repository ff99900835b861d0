/**
 * What each route of the API is for, by hand: who is meant to use it (the least role), and a request that fits. The access
 * test takes the routes from the running router and looks each up here; a route without an entry fails it.
 */
import { channelForm, chargerForm, moduleTypeForm, planForm, readingForm, spareForm } from '@/tests/support/forms';
import type { Furnished } from '@/tests/support/furnished';
import { twoHalves } from '@/tests/support/pictures';
import { advisedForm, packForm, packReadingForm, repairForm, secondSourceForm } from '@/tests/support/repaired';
import { testPassword } from '@/tests/support/server';
import type { Role } from '@/shared/contract/roles';
import { alertFixtures } from './route-fixtures-alerts';
import { waitsFixtures } from './route-fixtures-waits';
import { benchFixtures } from './route-fixtures-bench';

export interface Fit {
  /** Path parameters. */
  params?: Record<string, string>;
  body?: object;
  /** What is uploaded, where the route takes a file. */
  file?: Buffer;
  query?: string;
  /** Revision of what is changed; 1 where it is not said. */
  rev?: number;
}
export interface RouteFixture {
  /** 'anyone' without signing in; 'wall' a paired wall and nobody else; else the least role. */
  who: 'anyone' | 'wall' | Role;
  fit?: (f: Furnished) => Fit;
  /** Its parameter names nothing that belongs to a workshop yet (a code that a screen shows, a link's token). */
  nobodys?: true;
  /** What somebody without any cookie hears, where that is not a good answer. */
  anyoneHears?: number;
}

const technician = (fit?: RouteFixture['fit']): RouteFixture => ({ who: 'technician', fit });
const foreman = (fit?: RouteFixture['fit']): RouteFixture => ({ who: 'foreman', fit });
const manager = (fit?: RouteFixture['fit']): RouteFixture => ({ who: 'manager', fit });

const charge =
  (body: (f: Furnished) => object = () => ({})) =>
  (f: Furnished): Fit => ({ params: { id: f.chargeId }, body: body(f), rev: f.chargeRev });
const wish = (f: Furnished) => ({ ...planForm(f.spareId), meterId: f.meterId, readyBy: null, clipOnAt: null });
const charger = (f: Furnished) =>
  chargerForm({ name: 'One more', meterId: f.meterId, channels: [channelForm({ name: 'New 1' })] });
const booked = (f: Furnished) =>
  repairForm(f.typeId, { packTypeId: f.repairs.packTypeId, personIds: [f.workshop.people.technician.id] });
const repair =
  (body: (f: Furnished) => object = () => ({}), of: 'repairId' | 'waitingRepairId' = 'repairId') =>
  (f: Furnished): Fit => ({
    params: { id: f.repairs[of] },
    body: body(f),
    rev: of === 'repairId' ? f.repairs.repairRev : f.repairs.waitingRev,
  });
const jpeg = await twoHalves(40, 20).jpeg().toBuffer();
const photo =
  (body?: object) =>
  (f: Furnished): Fit => ({ params: { id: f.repairs.photoId }, body });
const resistor = { name: 'One more', ohm: '0.2', maxWatts: '25' };
const meter = { name: 'One more', offsetMillivolts: '1', checkedAt: null };

export const routeFixtures: Record<string, RouteFixture> = {
  'GET /healthz': { who: 'anyone' },
  'GET /readyz': { who: 'anyone' },
  'GET /metrics': { who: 'anyone', anyoneHears: 404 },
  'GET /api/status': manager(),
  'POST /api/status/backup': manager(),
  'GET /api/export.zip': manager(),

  'GET /api/front-door': { who: 'anyone' },
  'POST /api/session': {
    who: 'anyone',
    fit: (f) => ({ body: { email: f.workshop.people.technician.email, password: testPassword } }),
  },
  'POST /api/session/refresh': { who: 'anyone', anyoneHears: 401 },
  'POST /api/workshops': {
    who: 'anyone',
    fit: () => ({
      body: {
        workshopName: 'Quay Street Cells',
        zone: 'Europe/Lisbon',
        name: 'Alva Reis',
        email: 'alva@example.com',
        password: 'seven lamps over the slipway',
      },
    }),
  },
  'GET /api/links/:token': { who: 'anyone', fit: (f) => ({ params: { token: f.invitationToken } }), nobodys: true },
  'POST /api/join': {
    who: 'anyone',
    fit: (f) => ({ body: { token: f.invitationToken, name: 'Nell', password: 'seven lamps over the slipway' } }),
  },
  'POST /api/reset': {
    who: 'anyone',
    fit: () => ({ body: { token: 'none', password: 'seven lamps over the slipway' } }),
    anyoneHears: 404,
  },
  'POST /api/demo/sign-in': { who: 'anyone', fit: () => ({ body: { role: 'technician' } }), anyoneHears: 404 },
  'GET /api/session': technician(),
  'DELETE /api/session': technician(),
  'GET /api/sessions': technician(),
  'DELETE /api/sessions': technician(),
  'PATCH /api/me': technician(() => ({ body: { name: 'New name' } })),

  'GET /api/people': technician(),
  'PATCH /api/people/:id': manager((f) => ({
    params: { id: f.workshop.people.technician.id },
    body: { name: 'New name', role: 'foreman' },
  })),
  'POST /api/people/:id/reset-link': manager((f) => ({ params: { id: f.workshop.people.technician.id } })),
  'GET /api/invitations': manager(),
  'POST /api/invitations': manager(() => ({ body: { email: 'new@example.com', role: 'foreman' } })),
  'DELETE /api/invitations/:id': manager((f) => ({ params: { id: f.invitationId } })),

  'GET /api/workshop': technician(),
  'PATCH /api/workshop': manager(() => ({ body: { toleranceMillivolts: '4' } })),

  'POST /api/wall/codes': { who: 'anyone' },
  'POST /api/wall/token': {
    who: 'anyone',
    fit: (f) => ({ body: { deviceCode: f.waiting.deviceCode } }),
    anyoneHears: 400,
  },
  'GET /api/wall/me': { who: 'wall' },
  'GET /api/wall/board': { who: 'wall' },
  'GET /api/wall/requests/:userCode': {
    who: 'foreman',
    fit: (f) => ({ params: { userCode: f.waiting.userCode } }),
    nobodys: true,
  },
  'DELETE /api/wall/requests/:userCode': {
    who: 'foreman',
    fit: (f) => ({ params: { userCode: f.waiting.userCode } }),
    nobodys: true,
  },
  'POST /api/wall/approvals': foreman((f) => ({
    body: { userCode: f.waiting.userCode, name: 'Office', diagonalInches: null, distanceMetres: null },
  })),
  'GET /api/walls': foreman(),
  'DELETE /api/walls/:id': foreman((f) => ({ params: { id: f.wallId } })),

  'GET /api/module-types': technician(),
  'POST /api/module-types': manager(() => ({ body: moduleTypeForm({ name: 'One more' }) })),
  'GET /api/module-types/:id': technician((f) => ({ params: { id: f.typeId } })),
  'PATCH /api/module-types/:id': manager((f) => ({ params: { id: f.typeId }, body: moduleTypeForm({ note: 'new' }) })),
  'DELETE /api/module-types/:id': manager((f) => ({ params: { id: f.spareTypeId } })),
  'PUT /api/module-types/:id/curve': manager((f) => ({
    params: { id: f.typeId },
    body: { csv: Array.from({ length: 11 }, (_, at) => `${at * 10};${3 + at / 10}`).join('\n') },
  })),
  'DELETE /api/module-types/:id/curve': manager((f) => ({ params: { id: f.typeId } })),
  'GET /api/chargers': technician(),
  'POST /api/chargers': manager((f) => ({ body: charger(f) })),
  'GET /api/chargers/:id': technician((f) => ({ params: { id: f.chargerId } })),
  'PATCH /api/chargers/:id': manager((f) => ({
    params: { id: f.chargerId },
    body: { ...charger(f), channels: [channelForm({ id: f.channelId, name: 'New 1' })] },
  })),
  'DELETE /api/chargers/:id': manager((f) => ({ params: { id: f.chargerId } })),
  'POST /api/channels/:id/fault': technician((f) => ({ params: { id: f.channelId }, body: { seen: 'No current' } })),
  'POST /api/channels/:id/works': foreman((f) => ({ params: { id: f.faultyChannelId } })),
  'GET /api/resistors': technician(),
  'POST /api/resistors': manager(() => ({ body: resistor })),
  'PATCH /api/resistors/:id': manager((f) => ({ params: { id: f.resistorId }, body: resistor })),
  'DELETE /api/resistors/:id': manager((f) => ({ params: { id: f.resistorId } })),
  'GET /api/meters': technician(),
  'POST /api/meters': manager(() => ({ body: meter })),
  'PATCH /api/meters/:id': manager((f) => ({ params: { id: f.meterId }, body: meter })),
  'DELETE /api/meters/:id': manager((f) => ({ params: { id: f.meterId } })),

  'GET /api/spares': technician(),
  'POST /api/spares': technician((f) => ({
    body: { ...spareForm(f.typeId, { label: 'One more' }), reading: readingForm({ meterId: f.meterId }) },
  })),
  'GET /api/spares/:id': technician((f) => ({ params: { id: f.spareId } })),
  'PATCH /api/spares/:id': technician((f) => ({ params: { id: f.spareId }, body: spareForm(f.typeId) })),
  'POST /api/spares/:id/readings': technician((f) => ({
    params: { id: f.spareId },
    body: readingForm({ meterId: f.meterId }),
  })),
  'POST /api/spares/:id/quarantine': technician((f) => ({
    params: { id: f.spareId },
    body: { reason: 'Dropped.', condition: 'dented', shelfPlace: 'box', charge: null },
  })),
  'POST /api/spares/:id/release': foreman((f) => ({ params: { id: f.spareId } })),
  'POST /api/spares/:id/capacities/:capacityId': technician((f) => ({
    params: { id: f.spareId, capacityId: f.capacityId },
    body: { answer: 'take' },
  })),
  'GET /api/spares/:id/history': technician((f) => ({ params: { id: f.spareId } })),

  'POST /api/estimates': {
    who: 'anyone',
    fit: () => ({
      body: {
        chemistry: 'nmc',
        groups: '2',
        ratedAh: '66',
        healthPercent: '90',
        spareVolts: '3.60',
        targetVolts: '3.95',
        amps: '10',
      },
    }),
  },
  'POST /api/plans': technician((f) => ({ body: wish(f) })),
  'GET /api/charges': technician(() => ({ query: 'open=1' })),
  'POST /api/charges': technician((f) => ({
    body: { ...wish(f), optionId: f.optionId, topUpOf: f.chargeId, repairId: f.repairs.waitingRepairId },
  })),
  'GET /api/charges/:id': technician(charge()),
  'GET /api/charges/:id/label.pdf': technician((f) => ({ params: { id: f.provenId } })),
  'DELETE /api/charges/:id': technician(charge()),
  'POST /api/charges/:id/checks': technician(charge(() => ({ code: 'isolation', answer: 'yes' }))),
  'POST /api/charges/:id/queue': technician(charge(() => ({ clipOnAt: null }))),
  'POST /api/charges/:id/start': technician(charge()),
  'POST /api/charges/:id/hold': technician(charge(() => ({ reason: 'Fan off.' }))),
  'POST /api/charges/:id/resume': technician(charge()),
  'POST /api/charges/:id/stop': technician(charge(() => ({ reason: 'Wrong spare.' }))),
  'POST /api/charges/:id/current-off': technician(charge()),
  'POST /api/charges/:id/next-step': technician(charge()),
  'POST /api/charges/:id/readings': technician(
    charge((f) => ({ terminalVolts: '7.61', amps: '20', celsius: '22', meterId: f.meterId })),
  ),
  'POST /api/charges/:id/log-preview': technician(charge()),
  'POST /api/charges/:id/log-file': technician(charge()),
  'PATCH /api/charges/:id/readings/:readingId': technician((f) => ({
    params: { id: f.chargeId, readingId: f.readingId },
    body: { terminalVolts: '7.62', amps: '20', celsius: '22', meterId: f.meterId, reason: 'Mistyped.' },
  })),
  'POST /api/charges/:id/look-ins': technician(charge(() => ({ note: 'Clips cool.' }))),
  'POST /api/charges/:id/hand-over': technician(charge((f) => ({ personId: f.workshop.people.foreman.id }))),
  'POST /api/charges/:id/rest-check': technician((f) => ({
    params: { id: f.restedId },
    body: { groupVolts: ['3.968', '3.967'], celsius: '22', meterId: f.meterId },
    rev: f.restedRev,
  })),
  'POST /api/charges/:id/fit': technician(charge()),
  'POST /api/charges/:id/shelve': technician(charge(() => ({ shelfPlace: 'D4' }))),

  'GET /api/pack-types': technician(),
  'POST /api/pack-types': manager((f) => ({ body: { name: 'One more', pack: packForm(f.typeId), note: null } })),
  'PATCH /api/pack-types/:id': manager((f) => ({
    params: { id: f.repairs.packTypeId },
    body: { name: 'Renamed', pack: packForm(f.typeId), note: null },
  })),
  'GET /api/repairs': technician(),
  'POST /api/repairs': technician((f) => ({ body: booked(f) })),
  'GET /api/repairs/:id': technician(repair()),
  'GET /api/repairs/:id/season': technician(repair()),
  'PATCH /api/repairs/:id': technician(repair(booked)),
  'POST /api/repairs/:id/readings': technician(repair((f) => packReadingForm({ meterId: f.meterId }))),
  'POST /api/repairs/:id/readings/:readingId/set-aside': technician((f) => ({
    params: { id: f.repairs.repairId, readingId: f.repairs.packReadingId },
    body: { reason: 'Another pack.' },
  })),
  'POST /api/repairs/:id/second-source': technician(repair((f) => secondSourceForm(f.repairs.packReadingId))),
  'POST /api/repairs/:id/second-source/:sourceId/decision': foreman((f) => ({
    params: { id: f.repairs.repairId, sourceId: f.repairs.sourceId },
    body: { decision: 'module', modulePosition: '2', reason: 'Read at the busbar.' },
  })),
  'POST /api/repairs/:id/target': technician(
    repair(
      (f) => ({ readingId: f.repairs.waitingReadingId, volts: null, toleranceMillivolts: '4', reason: '' }),
      'waitingRepairId',
    ),
  ),
  'GET /api/repairs/:id/candidates': technician(repair(undefined, 'waitingRepairId')),
  'POST /api/repairs/:id/spare': technician(repair((f) => ({ spareId: f.spareId }), 'waitingRepairId')),
  'DELETE /api/repairs/:id/spare': technician(repair(undefined, 'waitingRepairId')),
  'POST /api/repairs/:id/fit': technician((f) => ({
    params: { id: f.repairs.waitingRepairId },
    body: { note: '' },
    rev: f.repairs.waitingRev,
  })),
  'POST /api/repairs/:id/removed': technician(
    repair(() => ({ modulePosition: '2', fate: 'scrap', note: '' }), 'waitingRepairId'),
  ),
  'POST /api/repairs/:id/advised': technician(repair(() => advisedForm())),
  'PATCH /api/repairs/:id/advised/:itemId': technician((f) => ({
    params: { id: f.repairs.waitingRepairId, itemId: f.repairs.advisedId },
    body: advisedForm({ outcome: 'booked' }),
    rev: f.repairs.waitingRev,
  })),
  'DELETE /api/repairs/:id/advised/:itemId': technician((f) => ({
    params: { id: f.repairs.waitingRepairId, itemId: f.repairs.advisedId },
    rev: f.repairs.waitingRev,
  })),
  'GET /api/repairs/:id/hand-over.pdf': technician(repair()),
  'POST /api/repairs/:id/hand-over': technician(repair(() => ({ note: 'Taken along unfinished.' }))),
  'POST /api/repairs/:id/archive': technician((f) => ({
    params: { id: f.repairs.handedOverId },
    body: { archived: true },
  })),
  'POST /api/repairs/:id/delete': manager(repair(() => ({ reason: 'Booked twice.' }))),
  'POST /api/repairs/:id/restore': manager((f) => ({ params: { id: f.repairs.deletedId } })),
  'PATCH /api/repairs/:id/wait/:waitId': technician((f) => ({
    params: { id: f.repairs.waitingRepairId, waitId: f.repairs.waitId },
    body: { from: '2026-06-09T09:00:00Z', to: null, reason: 'The lid was off earlier.' },
    rev: f.repairs.waitingRev,
  })),

  'POST /api/repairs/:id/photos': technician((f) => ({ params: { id: f.repairs.repairId }, file: jpeg })),
  'GET /api/photos/:id': technician(photo()),
  'GET /api/photos/:id/thumbnail': technician(photo()),
  'PATCH /api/photos/:id': technician(
    photo({ caption: 'The lower edge', seen: 'damage', modulePosition: '2', spareId: null }),
  ),
  'DELETE /api/photos/:id': technician(photo()),

  'GET /api/repairs.csv': foreman(),
  'GET /api/repairs/:id/customer.json': manager(repair()),
  'POST /api/repairs/:id/customer/erase': manager(repair(() => ({ reason: 'Asked for by the customer.' }))),

  'GET /api/search': technician(() => ({ query: 'q=van' })),

  'GET /api/board': technician(),
  ...waitsFixtures,
  ...benchFixtures,
  ...alertFixtures,
};
