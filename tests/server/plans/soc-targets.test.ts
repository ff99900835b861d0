import { afterAll, beforeAll, expect, test } from 'vitest';
import type { ModuleTypeDto } from '@/shared/contract/equipment';
import type { ChargeDto } from '@/shared/contract/charge';
import type { PlanDto } from '@/shared/contract/plan';
import type { SpareDto } from '@/shared/contract/spare';
import { channelForm, chargerForm, moduleTypeForm, planForm, readingForm, spareForm } from '../../support/forms';
import { makeTestServer, type TestAgent, type TestServer } from '../../support/server';
import { created, stock } from '../../support/stocked';

let server: TestServer;
let technician: TestAgent;
let flat: SpareDto;
beforeAll(async () => {
  server = await makeTestServer();
  technician = server.agentFor('technician');
  const manager = server.agentFor('manager');
  const { meter } = await stock(manager);
  // To count from full it must be able to take charge out again.
  const both = channelForm({
    name: 'D1',
    canDischarge: true,
    dischargeAmps: '20',
    senses: 'module',
    leadMilliohm: '0',
  });
  await created(manager, '/api/chargers', chargerForm({ name: 'Both ways', channels: [both] }));
  const type = await created<ModuleTypeDto>(
    manager,
    '/api/module-types',
    moduleTypeForm({
      name: 'Flat',
      chemistry: 'lfp',
      chargeLimitVolts: '3.65',
      dischargeLimitVolts: '2.5',
      floorVolts: '2',
      shelfVolts: '3.3',
    }),
  );
  flat = await created<SpareDto>(technician, '/api/spares', {
    ...spareForm(type.id, { label: 'F-1' }),
    reading: readingForm({ groupVolts: ['3.25', '3.25'], meterId: meter.id }),
  });
});
afterAll(() => server.close());

const plan = async (change: object): Promise<PlanDto> =>
  (await technician.post('/api/plans', planForm(flat.id, change)).expect(200)).body as PlanDto;

test('volts alone on the plateau of LFP are refused with the band that they would have, until a person takes it', async () => {
  const refused = (await plan({ targetVolts: '3.30' })).plan;
  expect(refused.options).toEqual([]);
  const { plateau } = refused.refusals[0]!;
  expect(plateau!.soc.p90 - plateau!.soc.p10).toBeGreaterThan(0.1);
  const taken = (await plan({ targetVolts: '3.30', acceptWideBand: true })).plan;
  expect(taken.refusals).toEqual([]);
  expect(taken.options.length).toBeGreaterThan(0);
});

test('60 % is planned from full or empty, and the charge keeps the 60 % beside its volts', async () => {
  const dto = await plan({ targetVolts: null, targetSoc: '60 %' });
  expect(dto.plan.refusals).toEqual([]);
  const [option] = dto.plan.options;
  expect(option, JSON.stringify(dto.plan.ruledOut)).toBeDefined();
  expect(option!.knownEnd).toBeDefined();
  expect(option!.endSoc!.p50).toBeGreaterThan(0.55);
  expect(option!.endSoc!.p50).toBeLessThan(0.65);
  // The measured LFP cell lies between 3.28 and 3.34 V there, in the middle of its loop.
  expect(dto.targetVolts).toBeGreaterThan(3.28);
  expect(dto.targetVolts).toBeLessThan(3.34);
  const kept = await technician
    .post('/api/charges', { ...planForm(flat.id, { targetVolts: null, targetSoc: '60' }), optionId: option!.id })
    .set('Idempotency-Key', 'a-charge-by-soc');
  expect(kept.status, JSON.stringify(kept.body).slice(0, 500)).toBe(201);
  expect((kept.body as ChargeDto).targetSoc).toBeCloseTo(60, 9);
  expect((kept.body as ChargeDto).targetTypedVolts).toBe(dto.targetVolts);
});

test.each<[string, object, string]>([
  ['neither', { targetVolts: null }, 'targetVolts'],
  ['both', { targetVolts: '3.3', targetSoc: '60' }, 'targetSoc'],
  ['120 %', { targetVolts: null, targetSoc: '120' }, 'targetSoc'],
])('%s is refused at its field', async (_what, change, field) => {
  const answer = await technician.post('/api/plans', planForm(flat.id, change)).expect(400);
  expect(Object.keys(answer.body.fields as object)).toEqual([field]);
});
