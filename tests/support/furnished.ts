/** Two workshops with one of everything, made over the API as their people do it: for tests that walk all routes. */
import { Alert } from '@/server/entities/alert';
import { Charge } from '@/server/entities/charge';
import { RestCheck } from '@/server/entities/rest-check';
import { SpareCapacity } from '@/server/entities/spare-capacity';
import { OutboxEntry } from '@/server/entities/outbox-entry';
import { PushDevice } from '@/server/entities/push-device';
import { makeSleeper } from '@/server/live/sleeper-loop';
import { digestToken } from '@/server/services/waits/digest-letter';
import type { ChargeDto } from '@/shared/contract/charge';
import type { ChargerDto, MeterDto, ModuleTypeDto, ResistorDto } from '@/shared/contract/equipment';
import type { OneUseLinkDto } from '@/shared/contract/people';
import type { PlanDto } from '@/shared/contract/plan';
import type { SpareDto } from '@/shared/contract/spare';
import type { WallCodeDto, WallDto } from '@/shared/contract/wall';
import { addBrokenChannel } from './broken-channel';
import { channelForm, chargerForm, moduleTypeForm, planForm, readingForm, spareForm } from './forms';
import { addBench, type Benched } from './benched';
import { addRepairs, type Repaired } from './repaired';
import { created } from './stocked';
import type { TestAgent, TestServer, TestWorkshop } from './server';

export interface Furnished {
  name: string;
  workshop: TestWorkshop;
  typeId: string;
  /** A type that nothing uses. */
  spareTypeId: string;
  meterId: string;
  resistorId: string;
  chargerId: string;
  channelId: string;
  /** Out of order, of a charger that nothing is planned on. */
  faultyChannelId: string;
  /** A spare in a charge that runs, with a reading, for the technician. */
  chargedSpareId: string;
  chargeId: string;
  chargeRev: number;
  readingId: string;
  /** A charge that has rested and waits for its check. */
  restedId: string;
  restedRev: number;
  /** A charge that was proven and fitted. */
  provenId: string;
  /** A spare on the shelf, and a plan's option for it. */
  spareId: string;
  optionId: string;
  alertId: string;
  /** A push of that alert that was given up, and a device of its person. */
  undeliveredId: string;
  deviceId: string;
  /** A spare reserved for a repair. */
  reservedSpareId: string;
  repairs: Repaired;
  /** Hours, skills, places and other work. */
  bench: Benched;
  /** A capacity of the spare on the shelf that waits for an answer. */
  capacityId: string;
  /** Ends the manager's weekly digest. */
  digestToken: string;
  /** A calculation over the waits. */
  replayId: string;
  invitationId: string;
  invitationToken: string;
  wallId: string;
  wallCookie: string;
  /** A screen that waits for somebody's answer. It belongs to nobody yet. */
  waiting: WallCodeDto;
}

/** Every id of a workshop's rows that a request could name. */
export const idsOf = (furnished: Furnished): string[] => [
  furnished.workshop.id,
  ...Object.values(furnished.workshop.people).flatMap(({ id, sessionId }) => [id, sessionId]),
  furnished.typeId,
  furnished.spareTypeId,
  furnished.meterId,
  furnished.resistorId,
  furnished.chargerId,
  furnished.channelId,
  furnished.faultyChannelId,
  furnished.chargedSpareId,
  furnished.chargeId,
  furnished.readingId,
  furnished.restedId,
  furnished.provenId,
  furnished.spareId,
  furnished.alertId,
  furnished.undeliveredId,
  furnished.deviceId,
  furnished.capacityId,
  furnished.reservedSpareId,
  ...Object.values(furnished.repairs).filter((id) => typeof id === 'string'),
  ...Object.values(furnished.bench).filter((id) => typeof id === 'string'),
  furnished.replayId,
  furnished.invitationId,
  furnished.wallId,
];

const bodyOf = async <Dto>(test: ReturnType<TestAgent['get']>, status = 200): Promise<Dto> => {
  const answer = await test;
  if (answer.status !== status)
    throw new Error(`${answer.status} instead of ${status}: ${JSON.stringify(answer.body)}`);
  return answer.body as Dto;
};

let keys = 0;
export const newKey = (): string => `furnishing-key-${(keys += 1)}`;

/** Plans, answers the checks and clips on. */
async function startCharge(server: TestServer, technician: TestAgent, spareId: string, channelId: string) {
  const wish = { ...planForm(spareId), readyBy: null, clipOnAt: null };
  const { plan } = await bodyOf<PlanDto>(technician.post('/api/plans', wish));
  const optionId = plan.options.find(({ channelIds }) => channelIds.includes(channelId))?.id ?? '';
  const kept = technician.post('/api/charges', { ...wish, optionId }).set('Idempotency-Key', newKey());
  let charge = await bodyOf<ChargeDto>(kept, 201);
  for (const { code, by } of charge.checks)
    if (by === 'person')
      charge = await bodyOf<ChargeDto>(
        technician.post(`/api/charges/${charge.id}/checks`, { code, answer: 'yes' }).set('Idempotency-Key', newKey()),
      );
  server.clock.advance(1000);
  const start = technician
    .post(`/api/charges/${charge.id}/start`)
    .set({ 'If-Match': `"${charge.rev}"`, 'Idempotency-Key': newKey() });
  return bodyOf<ChargeDto>(start);
}

/** Pairs a wall. */
export async function addWall(server: TestServer, foreman: TestAgent, name: string) {
  const asked = await bodyOf<WallCodeDto>(server.anyone.post('/api/wall/codes'), 201);
  const { userCode, deviceCode } = asked;
  const form = { userCode, name: `Wall of ${name}`, diagonalInches: '55', distanceMetres: '7' };
  const { id } = await created<WallDto>(foreman, '/api/wall/approvals', form);
  const collected = await server.anyone.post('/api/wall/token', { deviceCode });
  const [cookie = ''] = (collected.headers['set-cookie'] ?? []) as unknown as string[];
  return { wallId: id, wallCookie: cookie.split(';')[0] ?? '' };
}

/** Stock, equipment, and a charge that is clipped on. Texts all hold '<name>'s', so that a leak shows. */
async function begin(server: TestServer, name: 'own' | 'other') {
  const workshop = server[name];
  const technician = server.agentFor('technician', workshop);
  const manager = server.agentFor('manager', workshop);
  const named = (what: string) => ({ name: `${name}’s ${what}` });
  const meter = await created<MeterDto>(manager, '/api/meters', {
    ...named('meter'),
    offsetMillivolts: '0',
    checkedAt: '2026-05-12T08:00:00Z',
  });
  const type = await created<ModuleTypeDto>(manager, '/api/module-types', moduleTypeForm(named('type')));
  const unused = await created<ModuleTypeDto>(manager, '/api/module-types', moduleTypeForm(named('unused type')));
  const resistor = await created<ResistorDto>(manager, '/api/resistors', {
    ...named('resistor'),
    ohm: '0,1',
    maxWatts: '50',
  });
  const channels = ['1', '2'].map((number) => channelForm({ name: `${name}’s ${number}` }));
  const charger = await created<ChargerDto>(
    manager,
    '/api/chargers',
    chargerForm({ ...named('charger'), place: `${name}’s bench`, meterId: meter.id, channels }),
  );
  const reading = readingForm({ meterId: meter.id });
  const addSpare = (label: string) =>
    created<SpareDto>(technician, '/api/spares', { ...spareForm(type.id, { label: `${name}’s ${label}` }), reading });
  const rested = await addSpare('S-0');
  const charged = await addSpare('S-1');
  const spare = await addSpare('S-2');
  const reserved = await addSpare('S-3');
  const [first, second] = charger.channels.map(({ id }) => id);
  const charge = await startCharge(server, technician, rested.id, first ?? '');
  return {
    ...{ name, workshop, technician, manager, channelId: second ?? '' },
    ...{ typeId: type.id, spareTypeId: unused.id, meterId: meter.id, resistorId: resistor.id, chargerId: charger.id },
    ...{ chargedSpareId: charged.id, spareId: spare.id, restedId: charge.id },
    ...{ reservedSpareId: reserved.id },
  };
}

/** A charge that is over, as the rested one would stand after its check and its fit. */
async function addProven(server: TestServer, restedId: string, id: string, personId: string): Promise<string> {
  const { manager } = server.deps.dataSource;
  const rested = await manager.findOneByOrFail(Charge, { id: restedId });
  const { workshopId } = rested;
  const at = server.clock.now();
  await manager.insert(Charge, { ...rested, id, number: `${rested.number}-P`, stage: 'fitted', closedAt: at });
  const groups = [0, 1].map((group) => ({ group, volts: 3.968, deviationVolts: 0, within: true, ampHoursToGo: 0 }));
  await manager.insert(RestCheck, {
    ...{ id: `${id}-check`, workshopId, chargeId: id, at, personId, createdAt: at },
    ...{ groupVolts: [3.968, 3.968], celsius: 22, meterId: null, early: false },
    verdict: { within: true, groups, spreadVolts: 0, worstGroup: 0 },
  });
  return id;
}

/** A phone of the technician, and a push of an alert to it that was given up. */
async function addUndelivered(server: TestServer, alert: Alert, person: { id: string; sessionId: string }) {
  const { manager } = server.deps.dataSource;
  const deviceId = `${alert.id}-phone`;
  const undeliveredId = `${alert.id}-push`;
  const now = server.clock.now();
  const own = { workshopId: alert.workshopId, personId: person.id, createdAt: now };
  await manager.insert(PushDevice, {
    ...{ ...own, id: deviceId, sessionId: person.sessionId, kind: 'phone', name: 'Phone' },
    ...{ address: `ExponentPushToken[${alert.id}]`, p256dh: null, auth: null },
  });
  await manager.insert(OutboxEntry, {
    ...{ ...own, id: undeliveredId, alertId: alert.id, turn: 0, way: 'phone-push', state: 'dead', dueAt: now },
    ...{ leasedUntil: null, tries: 12, reached: [], tickets: [], receiptDueAt: null, heldAt: null },
    ...{ reason: 'The service did not answer.', endedAt: now },
  });
  return { undeliveredId, deviceId };
}

/** A second charge that runs, an alert, an invitation and a wall. */
async function finish(server: TestServer, begun: Awaited<ReturnType<typeof begin>>): Promise<Furnished> {
  const { name, workshop, technician, manager, ...ids } = begun;
  const { rev, stage } = await bodyOf<ChargeDto>(technician.get(`/api/charges/${ids.restedId}`));
  if (stage !== 'check-due') throw new Error(`The first charge is ${stage} and not due for its check.`);
  const { id: chargeId } = await startCharge(server, technician, ids.chargedSpareId, ids.channelId);
  server.clock.advance(60_000);
  const logged = technician
    .post(`/api/charges/${chargeId}/readings`, { terminalVolts: '7.6', amps: '20', celsius: '22' })
    .set('Idempotency-Key', newKey());
  const charge = await bodyOf<ChargeDto>(logged);
  const { plan } = await bodyOf<PlanDto>(technician.post('/api/plans', planForm(ids.spareId)));
  const alert: Alert = {
    id: `${name}-alert`,
    workshopId: workshop.id,
    cause: `${name}-cause`,
    kind: 'look-in-due',
    level: 'amber',
    chargeId,
    wallId: null,
    personId: workshop.people.technician.id,
    title: `${name}’s look-in`,
    seen: 'Nothing yet.',
    checkFirst: 'The clips.',
    raisedAt: server.clock.now(),
    lateByS: 0,
    takenById: null,
    takenAt: null,
    passedAt: null,
    turn: 0,
    forRole: null,
    passDueAt: null,
    clearedAt: null,
  };
  await server.deps.dataSource.manager.insert(Alert, alert);
  const provenId = await addProven(server, ids.restedId, `${name}-proven`, workshop.people.technician.id);
  const capacity: SpareCapacity = {
    id: `${name}-capacity`,
    workshopId: workshop.id,
    spareId: ids.spareId,
    ampHours: 48,
    sdAh: 1.5,
    source: 'two readings',
    state: 'found',
    apart: 5,
    chargeId,
    at: server.clock.now(),
    personId: workshop.people.technician.id,
  };
  await server.deps.dataSource.manager.insert(SpareCapacity, capacity);
  const repairs = await addRepairs(
    { technician, manager },
    {
      name,
      typeId: ids.typeId,
      meterId: ids.meterId,
      personId: workshop.people.technician.id,
      spareId: ids.reservedSpareId,
    },
  );
  const bench = await addBench(
    { technician, manager },
    { name, personId: workshop.people.technician.id, repairId: repairs.waitingRepairId },
  );
  const { url } = await bodyOf<OneUseLinkDto>(
    manager.post('/api/invitations', { email: `nell@${name}.example.com`, role: 'technician' }),
    201,
  );
  const replay = await bodyOf<{ id: string }>(manager.post('/api/waits/shelf', { moduleTypeId: ids.typeId }), 202);
  const [invitation] = await bodyOf<{ id: string }[]>(manager.get('/api/invitations'));
  return {
    name,
    workshop,
    ...ids,
    faultyChannelId: await addBrokenChannel(technician, manager, name, ids.meterId),
    restedRev: rev,
    chargeId,
    chargeRev: charge.rev,
    provenId,
    readingId: charge.readings[0]?.id ?? '',
    optionId: plan.options[0]?.id ?? '',
    alertId: alert.id,
    ...(await addUndelivered(server, alert, workshop.people.technician)),
    capacityId: capacity.id,
    repairs,
    bench,
    replayId: replay.id,
    digestToken: digestToken(server.deps.secrets, workshop.people.manager.id),
    invitationId: invitation?.id ?? '',
    invitationToken: new URL(url).searchParams.get('token') ?? '',
    ...(await addWall(server, server.agentFor('foreman', workshop), `${name}’s hall`)),
    waiting: await bodyOf<WallCodeDto>(server.anyone.post('/api/wall/codes'), 201),
  };
}

/** Furnishes both workshops of the test server alike. */
export async function furnish(server: TestServer): Promise<{ own: Furnished; other: Furnished }> {
  const sleeper = makeSleeper(server.deps);
  const begun = [await begin(server, 'own'), await begin(server, 'other')] as const;
  for (let hours = 0; hours < 8; hours += 1) {
    server.clock.advance(3_600_000);
    await sleeper.runDue();
  }
  return { own: await finish(server, begun[0]), other: await finish(server, begun[1]) };
}
