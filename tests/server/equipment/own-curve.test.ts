import { afterAll, beforeAll, expect, test } from 'vitest';
import type { ChargerDto, ModuleTypeDto } from '@/shared/contract/equipment';
import type { PlanDto } from '@/shared/contract/plan';
import { channelForm, chargerForm, moduleTypeForm, planForm } from '../../support/forms';
import { makeTestServer, type TestAgent, type TestServer } from '../../support/server';
import { created, stock, type Stocked } from '../../support/stocked';

let server: TestServer;
let manager: TestAgent;
let stocked: Stocked;
beforeAll(async () => {
  server = await makeTestServer();
  manager = server.agentFor('manager');
  stocked = await stock(manager);
});
afterAll(() => server.close());

const rev = async (id: string): Promise<string> =>
  `"${((await manager.get(`/api/module-types/${id}`)).body as ModuleTypeDto).rev}"`;
const put = async (csv: string, id = stocked.type.id) =>
  manager.put(`/api/module-types/${id}/curve`, { csv }).set('If-Match', await rev(id));
const plan = async (): Promise<PlanDto> =>
  (await manager.post('/api/plans', planForm(stocked.spare.id)).expect(200)).body as PlanDto;

/** A straight line from 3.0 to 4.2 V: 0.4 V are a third of the charge, whatever a published curve says. */
const line = Array.from({ length: 13 }, (_, at) => [(at * 100) / 12, 3 + at / 10] as const);
const csvOf = (separator: string, mark: string): string =>
  line.map((row) => row.map((cell) => cell.toFixed(3).replace('.', mark)).join(separator)).join('\r\n');

test.each([
  ['semicolons and decimal commas', csvOf(';', ',')],
  ['tabs', csvOf('\t', '.')],
  ['commas and points, under a heading', `soc,volts\n${csvOf(',', '.')}`],
])('a straight curve with %s makes 0.356 V a share of 0.297 of the capacity', async (_how, csv) => {
  const answer = await put(csv);
  expect(answer.status, JSON.stringify(answer.body)).toBe(200);
  expect((answer.body as ModuleTypeDto).ownCurve!.volts).toHaveLength(13);
  const { plan: found } = await plan();
  // From 3.612 to 3.968 V, of the 60.4 Ah of this spare.
  expect(found.groupAmpHours[0]).toBeCloseTo(((3.968 - 3.612) / 1.2) * 60.4, 1);
});

test('it is removed again, and the published curve rules; a curve of choice of the same chemistry takes its place', async () => {
  await put(csvOf(';', '.'));
  const straight = (await plan()).plan.groupAmpHours[0]!;
  const removed = await manager
    .delete(`/api/module-types/${stocked.type.id}/curve`)
    .set('If-Match', await rev(stocked.type.id));
  expect((removed.body as ModuleTypeDto).ownCurve).toBeNull();
  const published = (await plan()).plan.groupAmpHours[0]!;
  expect(Math.abs(published - straight)).toBeGreaterThan(0.5);
  const change = async (curveId: string | null) =>
    manager
      .patch(`/api/module-types/${stocked.type.id}`, moduleTypeForm({ curveId }))
      .set('If-Match', await rev(stocked.type.id));
  expect((await change('nmc811-chen-2020')).status).toBe(200);
  expect(Math.abs((await plan()).plan.groupAmpHours[0]! - published)).toBeGreaterThan(0.1);
  const wrong = await change('lfp-measured');
  expect(wrong.status).toBe(400);
  expect(Object.keys(wrong.body.fields as object)).toEqual(['curveId']);
});

test('a table that cannot be a curve is refused with a sentence at each row, and the one before stays', async () => {
  await put(csvOf(';', '.'));
  const rows = csvOf(';', '.').split('\r\n');
  rows[3] = '25;3700';
  rows[5] = 'half;3.5';
  const answer = await put(rows.join('\n'));
  expect(answer.status).toBe(400);
  const fields = answer.body.fields as Record<string, string>;
  expect(fields['csv.4']).toMatch(/^Row 4: 3700 looks like millivolts\./);
  expect(fields['csv.6']).toMatch(/^Row 6: 'half' is no state of charge\./);
  expect((await put('50,0,3,7\n60,0,3,8')).body).toMatchObject({
    fields: { csv: expect.stringContaining('Separate the columns by semicolons') },
  });
  const kept = (await manager.get(`/api/module-types/${stocked.type.id}`)).body as ModuleTypeDto;
  expect(kept.ownCurve!.volts[3]).toBe(3.3);
});

test('what a form leaves out stays; two pulses are refused where they do not fit the whole resistance', async () => {
  const pulses = { pulseShortS: '0.5', pulseShortMilliohm: '1.5', pulseLongerS: '30 s', pulseLongerMilliohm: '2.4' };
  const type = await created<ModuleTypeDto>(
    manager,
    '/api/module-types',
    moduleTypeForm({ name: 'Pulsed', coldCurrentPercent: '25', prechargeBelowVolts: '2,9', ...pulses }),
  );
  expect(type).toMatchObject({ coldCurrentPercent: 25, prechargeBelowVolts: 2.9, pulseLongerS: 30 });
  const same = await manager
    .patch(`/api/module-types/${type.id}`, moduleTypeForm({ name: 'Pulsed' }))
    .set('If-Match', '"1"');
  expect(same.body).toMatchObject({ coldCurrentPercent: 25, prechargeBelowVolts: 2.9, pulseLongerMilliohm: 2.4 });
  // 1.5 mΩ after 10 s are 3.15 mΩ for the whole: 3.5 mΩ after 30 s cannot be.
  const wrong = await manager
    .patch(`/api/module-types/${type.id}`, moduleTypeForm({ name: 'Pulsed', ...pulses, pulseLongerMilliohm: '3.5' }))
    .set('If-Match', '"2"');
  expect(Object.keys(wrong.body.fields as object)).toEqual(['pulseLongerMilliohm']);
});

test('a channel that gives half its current half of the time takes about four times as long', async () => {
  const plans = async (change: object): Promise<number> => {
    const name = `D ${JSON.stringify(change).length}`;
    const { channels } = await created<ChargerDto>(
      manager,
      '/api/chargers',
      chargerForm({ name, channels: [channelForm({ name, maxAmps: '10', ...change })] }),
    );
    const { plan: found } = await plan();
    const option = found.options.find(
      (one) => one.way === 'terminals' && one.finish === 'over-and-settle' && one.channelIds[0] === channels[0]!.id,
    )!;
    return option.segments.filter(({ kind }) => kind === 'cc').reduce((sum, { fromS, toS }) => sum + toS - fromS, 0);
  };
  const all = await plans({});
  const less = await plans({ deratingAboveCelsius: '15', deratingPercent: '50', dutyPercent: '50' });
  expect(less / all).toBeGreaterThan(3.6);
  expect(less / all).toBeLessThan(4.4);
});
