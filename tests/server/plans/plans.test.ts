import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { MeterDto, ModuleTypeDto } from '@/shared/contract/equipment';
import type { PlanDto } from '@/shared/contract/plan';
import type { SpareDto } from '@/shared/contract/spare';
import { moduleTypeForm, planForm, readingForm, spareForm } from '../../support/forms';
import { makeTestServer, type TestAgent, type TestServer } from '../../support/server';
import { created, stock, type Stocked } from '../../support/stocked';

let server: TestServer;
let technician: TestAgent;
let manager: TestAgent;
let stocked: Stocked;

beforeAll(async () => {
  server = await makeTestServer();
  technician = server.agentFor('technician');
  manager = server.agentFor('manager');
  stocked = await stock(manager);
});
afterAll(() => server.close());

const plan = async (spareId: string, change: object = {}): Promise<PlanDto> =>
  (await technician.post('/api/plans', planForm(spareId, change)).expect(200)).body as PlanDto;
const newSpare = (label: string, change: object = {}, reading: object = {}): Promise<SpareDto> =>
  created<SpareDto>(technician, '/api/spares', {
    ...spareForm(stocked.type.id, { label, ...change }),
    reading: readingForm({ meterId: stocked.meter.id, ...reading }),
  });

describe('a plan', () => {
  it('offers terminals and group by group on the 20 A channel, soonest first, with bands', async () => {
    const { plan: found, channels, plannedAt, toleranceMillivolts } = await plan(stocked.spare.id);
    expect(found.direction).toBe('charge');
    expect(new Set(found.options.map(({ way }) => way))).toEqual(
      new Set(['terminals', 'group-by-group', 'paralleled']),
    );
    const likely = found.options.map(({ totalS }) => totalS.p50);
    expect(likely).toEqual([...likely].sort((a, b) => a - b));
    for (const { totalS } of found.options) {
      expect(totalS.p10).toBeLessThan(totalS.p50);
      expect(totalS.p50).toBeLessThan(totalS.p90);
    }
    expect(Object.values(channels)).toEqual([{ name: 'B1', chargerName: 'Supply B', freeAt: null }]);
    expect(plannedAt).toBe(new Date(server.clock.now()).toISOString());
    expect(toleranceMillivolts).toBe(5);
    expect(found.options.filter(({ soonest }) => soonest)).toHaveLength(1);
  });

  it('is the same to the last digit when it is asked again, also of a twin read alike, and another when it is read 5 mV higher', async () => {
    const spare = await newSpare('S-40');
    const first = await plan(spare.id);
    expect((await plan(spare.id)).plan).toEqual(first.plan);
    expect((await plan((await newSpare('S-40b')).id)).plan.options[0]!.totalS).toEqual(first.plan.options[0]!.totalS);
    server.clock.advance(1000);
    const again = readingForm({ meterId: stocked.meter.id, groupVolts: ['3.617', '3.611'] });
    await technician.post(`/api/spares/${spare.id}/readings`, again).expect(201);
    expect((await plan(spare.id)).plan.options[0]!.totalS.p90).not.toBe(first.plan.options[0]!.totalS.p90);
  });

  it('counts latest start back from ready-by with the 90th percentile, and marks what is too late', async () => {
    const readyBy = new Date(server.clock.now() + 6 * 3_600_000).toISOString();
    const { plan: found } = await plan(stocked.spare.id, { readyBy });
    for (const option of found.options) {
      const spareS = 6 * 3600 - option.totalS.p90;
      expect(option.tooLate).toBe(spareS < 0);
      if (!option.tooLate && option.queueS === 0) expect(option.latestStartS).toBeCloseTo(spareS, 3);
    }
    const soon = new Date(server.clock.now() + 3_600_000).toISOString();
    expect((await plan(stocked.spare.id, { readyBy: soon })).plan.options.every(({ tooLate }) => tooLate)).toBe(true);
  });

  it('takes the known offset of the pack’s meter off the target: 10 mV too high asks for less', async () => {
    const high = await created<MeterDto>(manager, '/api/meters', {
      name: 'Reads high',
      offsetMillivolts: '10',
      checkedAt: '2026-06-01T08:00:00Z',
    });
    const straight = await plan(stocked.spare.id, { meterId: stocked.meter.id, targetVolts: '3.958' });
    const offset = await plan(stocked.spare.id, { meterId: high.id, targetVolts: '3.968' });
    expect(offset.plan.groupAmpHours[0]).toBeCloseTo(straight.plan.groupAmpHours[0]!, 9);
    expect(offset.plan.cautions.map(({ code }) => code)).toContain('other-meter');
    expect(straight.plan.cautions.map(({ code }) => code)).not.toContain('other-meter');
  });

  it('over a short way is wider with two meters than with one, and wider still where one was not checked for 120 days', async () => {
    const blend = await created<ModuleTypeDto>(
      manager,
      '/api/module-types',
      moduleTypeForm({ name: 'Blend', chemistry: 'lmo-blend' }),
    );
    const meterOf = (name: string, checkedAt: string): Promise<MeterDto> =>
      created<MeterDto>(manager, '/api/meters', { name, offsetMillivolts: '0', checkedAt });
    const second = await meterOf('Second', '2026-06-01T08:00:00Z');
    const old = await meterOf('Old check', '2026-02-09T08:00:00Z');
    const spare = await created<SpareDto>(technician, '/api/spares', {
      ...spareForm(blend.id, { label: 'F-1' }),
      reading: readingForm({ groupVolts: ['3.880', '3.880'], meterId: stocked.meter.id }),
    });
    const width = async (meterId: string): Promise<number> => {
      const { plan: found } = await plan(spare.id, { meterId, targetVolts: '3.955' });
      const option = found.options.find(({ way, finish }) => way === 'terminals' && finish === 'over-and-settle')!;
      return option.totalS.p90 - option.totalS.p10;
    };
    const [one, two, unsure] = [await width(stocked.meter.id), await width(second.id), await width(old.id)];
    expect(two).toBeGreaterThan(one);
    expect(unsure).toBeGreaterThan(two);
  });

  it('counts the self-discharge of the days since the reading', async () => {
    const spare = await newSpare('S-41');
    const before = await plan(spare.id);
    server.clock.advance(60 * 86_400_000);
    const after = await plan(spare.id);
    server.clock.advance(-60 * 86_400_000);
    expect(after.plan.startVolts[0]).toBeLessThan(before.plan.startVolts[0]!);
    expect(after.plan.cautions.map(({ code }) => code)).toContain('old-reading');
  });

  it('does not refuse a spare today for how cold it was at its reading a week ago', async () => {
    const spare = await newSpare('S-42', {}, { celsius: '2' });
    expect((await plan(spare.id)).plan.refusals.map(({ code }) => code)).toEqual(['temperature']);
    server.clock.advance(7 * 86_400_000);
    expect((await plan(spare.id)).plan.refusals).toEqual([]);
    server.clock.advance(-7 * 86_400_000);
  });

  it('refuses a deep-discharged, a swollen and a quarantined spare with a sentence each, and offers nothing', async () => {
    const deep = await newSpare('S-43', {}, { groupVolts: ['2.41', '2.894'] });
    const swollen = await newSpare('S-44', { condition: 'swollen' });
    const aside = await newSpare('S-45');
    await technician
      .post(`/api/spares/${aside.id}/quarantine`, { reason: 'dropped' })
      .set('If-Match', '"1"')
      .expect(200);
    for (const [spare, code, words] of [
      [deep, 'deep-discharged', "under this type's floor of 2.50"],
      [swollen, 'condition', 'swollen'],
      [aside, 'quarantined', 'dropped'],
    ] as const) {
      const { plan: found } = await plan(spare.id);
      expect(found.options).toEqual([]);
      expect(found.refusals[0]).toMatchObject({ code });
      expect(found.refusals[0]!.text).toContain(words);
    }
  });

  it('says that a spare within the tolerance needs no charge', async () => {
    const { plan: found } = await plan(stocked.spare.id, { targetVolts: '3.609' });
    expect(found).toMatchObject({ alreadyWithin: true, options: [] });
  });

  it('offers the resistor to a neighbour of the shelf that rests beyond the target, and names it', async () => {
    await created(manager, '/api/resistors', { name: 'Load 1', ohm: '0.5', maxWatts: '200' });
    await newSpare('S-46', {}, { groupVolts: ['4.10', '4.10'] });
    const { plan: found } = await plan(stocked.spare.id, { targetVolts: '3.70' });
    const about = [
      ...found.options.filter(({ way }) => way === 'resistor').map(({ takes }) => takes),
      ...found.ruledOut.filter(({ way }) => way === 'resistor').map(({ reason }) => reason),
    ];
    expect(about).toHaveLength(1);
    expect(about[0]).toContain('S-46');
  });

  it.each<[string, object, string]>([
    ['39.68 V', { targetVolts: '39.68 V' }, 'targetVolts'],
    ['3968', { targetVolts: '3968' }, 'targetVolts'],
    ['an empty target', { targetVolts: '' }, 'targetVolts'],
    ['letters', { targetVolts: 'abc' }, 'targetVolts'],
    ['a tolerance of 0', { toleranceMillivolts: '0' }, 'toleranceMillivolts'],
    ['a ready-by that has passed', { readyBy: '2026-06-09T06:00:00Z' }, 'readyBy'],
    ['a ready-by that is no time', { readyBy: 'tonight' }, 'readyBy'],
    ['a meter of nobody', { meterId: 'no-such-meter' }, 'meterId'],
  ])('with %s answers 400 at that field', async (_what, change, field) => {
    const answer = await technician.post('/api/plans', planForm(stocked.spare.id, change)).expect(400);
    expect(Object.keys(answer.body.fields as object)).toEqual([field]);
  });

  it('of another workshop’s spare is 404, and needs a sign-in', async () => {
    await server.agentFor('technician', server.other).post('/api/plans', planForm(stocked.spare.id)).expect(404);
    await server.anyone.post('/api/plans', planForm(stocked.spare.id)).expect(401);
  });

  it('sees only the workshop’s own channels', async () => {
    const own = server.agentFor('manager', server.other);
    const type = await created<ModuleTypeDto>(own, '/api/module-types', moduleTypeForm());
    const spare = await created<SpareDto>(own, '/api/spares', { ...spareForm(type.id), reading: readingForm() });
    const answer = await own.post('/api/plans', planForm(spare.id)).expect(200);
    expect((answer.body as PlanDto).channels).toEqual({});
    expect((answer.body as PlanDto).plan.options).toEqual([]);
  });
});
