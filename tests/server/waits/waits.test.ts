import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { ChargerDto, ModuleTypeDto } from '@/shared/contract/equipment';
import type { SpareDto } from '@/shared/contract/spare';
import {
  waitDimensions,
  type WaitChargesDto,
  type WaitDimension,
  type WaitGroupsDto,
  type WaitsDto,
} from '@/shared/contract/waits';
import { channelForm, chargerForm, moduleTypeForm, readingForm, spareForm } from '../../support/forms';
import { makeTestServer, type TestAgent, type TestServer } from '../../support/server';
import { created, stock } from '../../support/stocked';
import { pastChargeRow, writePast, type PastCharge } from './history';
import { Charge } from '@/server/entities/charge';

/*
 * Ten charges by hand. Zone Europe/Berlin; now is Tuesday 9 June 2026, week 24.
 *
 *  no  type charger  ready (UTC)        wait queue taper rest check  late
 *   1  X    B        Tue 2 June 10:00    120    10    10   60    1    −10
 *   2  X    B        Tue 2 June 14:00    180    20    20   60    2      5
 *   3  X    C        Wed 3 June 12:00    200    30    30   60    3      0
 *   4  Y    B        Thu 4 June 12:00    240    40     0   60    4     20
 *   5  Y    B        Fri 5 June 12:00    300    50     0   60    5    −30
 *   6  Y    C, then B Sat 6 June 12:00   420    60     0   90    6     40
 *   7  X    B        Sun 7 June 22:30     60     5     0   20    7      2    (Monday 00:30 in Berlin: week 24)
 *   8  X    C        Mon 8 June 12:00    150    15     0   60    8     15
 *   9  X    –        Mon 8 June 14:00    210    25     0   60    9     −5
 *  10  Y    B        Tue 9 June 07:00    120    35     0   60   10     60    (tops up 99, asked 600 min before)
 *
 * Waits in order: 60 120 150 180 200 | 210 240 300 420 600, with 600 for the topped-up one.
 */
const table: [type: 'X' | 'Y', chargers: string, ready: string, ...minutes: number[]][] = [
  ['X', 'B', '2026-06-02T10:00Z', 120, 10, 10, 60, 1, -10],
  ['X', 'B', '2026-06-02T14:00Z', 180, 20, 20, 60, 2, 5],
  ['X', 'C', '2026-06-03T12:00Z', 200, 30, 30, 60, 3, 0],
  ['Y', 'B', '2026-06-04T12:00Z', 240, 40, 0, 60, 4, 20],
  ['Y', 'B', '2026-06-05T12:00Z', 300, 50, 0, 60, 5, -30],
  ['Y', 'CB', '2026-06-06T12:00Z', 420, 60, 0, 90, 6, 40],
  ['X', 'B', '2026-06-07T22:30Z', 60, 5, 0, 20, 7, 2],
  ['X', 'C', '2026-06-08T12:00Z', 150, 15, 0, 60, 8, 15],
  ['X', '', '2026-06-08T14:00Z', 210, 25, 0, 60, 9, -5],
  ['Y', 'B', '2026-06-09T07:00Z', 120, 35, 0, 60, 10, 60],
];
const min = (minutes: number): number => minutes * 60;

let server: TestServer;
let manager: TestAgent;
const ids = { X: '', Y: '', B: '', C: '' };

async function writeHistory(): Promise<void> {
  const stocked = await stock(manager);
  const second = await created<ModuleTypeDto>(manager, '/api/module-types', moduleTypeForm({ name: '3-series 78 Ah' }));
  const charger = await created<ChargerDto>(
    manager,
    '/api/chargers',
    chargerForm({ name: 'Supply C', channels: [channelForm({ name: 'C1' })] }),
  );
  const spare = await created<SpareDto>(manager, '/api/spares', {
    ...spareForm(second.id, { label: 'S-0398' }),
    reading: readingForm(),
  });
  Object.assign(ids, { X: stocked.type.id, Y: second.id, B: stocked.charger.id, C: charger.id });
  const channels: Record<string, string> = { B: stocked.charger.channels[0]!.id, C: charger.channels[0]!.id };
  const base = {
    workshopId: server.own.id,
    personId: server.own.people.technician.id,
    spareId: spare.id,
  };
  const row = (number: number, line: (typeof table)[number], change: Partial<PastCharge> = {}): PastCharge => {
    const [type, chargers, ready, waitMin, queueMin, taperMin, restMin, checkMin, lateMin] = line;
    return {
      ...base,
      number,
      typeId: ids[type],
      channelIds: [...chargers].map((name) => channels[name]!),
      readyAt: Date.parse(ready),
      waitMin: waitMin!,
      queueMin: queueMin!,
      taperMin: taperMin!,
      restMin: restMin!,
      checkMin: checkMin!,
      lateMin: lateMin!,
      ...change,
    };
  };
  const failed = { ...row(99, ['Y', 'B', '2026-06-09T07:00Z', 600, 10, 0, 60, 5, 0]) };
  const { manager: rows } = server.deps.dataSource;
  // Its check was out of tolerance: never ready itself.
  await rows.insert(Charge, { ...pastChargeRow(failed), readyAt: null });
  await writePast(rows, [
    ...table.map((line, place) => row(place + 1, line, place === 9 ? { topUpOf: 'charge-99' } : {})),
    // The Sunday before the eight weeks.
    row(11, ['X', 'B', '2026-04-12T12:00Z', 1000, 10, 0, 60, 5, 0]),
  ]);
}

beforeAll(async () => {
  server = await makeTestServer();
  manager = server.agentFor('manager');
  await writeHistory();
});
afterAll(() => server.close());

const waits = async (query = ''): Promise<WaitsDto> => (await manager.get(`/api/waits${query}`).expect(200)).body;
const groupsBy = async (by: WaitDimension): Promise<WaitGroupsDto> =>
  (await manager.get(`/api/waits/groups?by=${by}`).expect(200)).body;
const charges = async (query = ''): Promise<WaitChargesDto> =>
  (await manager.get(`/api/waits/charges${query}`).expect(200)).body;

describe('waits of ten charges worked through on paper', () => {
  it('cover eight whole weeks and the present one: 13 April to 9 June, 9 weeks, 10 charges', async () => {
    const found = await waits();
    expect([found.from, found.to, found.charges, found.weeks.length]).toEqual(['2026-04-13', '2026-06-09', 10, 9]);
  });

  it('have a median of 205 min, 9 of 10 under 438 min, 3.5 min over the plan and 7 of 10 in the band', async () => {
    const found = await waits();
    expect(found.medianS).toBeCloseTo(min(205), 6);
    expect(found.p90S).toBeCloseTo(min(438), 6);
    expect(found.plan!.againstPlanS).toBeCloseTo(min(3.5), 6);
    expect(found.plan!.insideBand).toBeCloseTo(0.7, 9);
  });

  it('make 1460 min in week 23 and 1020 min in week 24, where Monday 00:30 in Berlin belongs', async () => {
    const { weeks } = await waits();
    const [week23, week24] = weeks.slice(-2);
    expect(week23).toMatchObject({ monday: '2026-06-01', week: 23, charges: 6 });
    expect(week23!.waitHours).toBeCloseTo(1460 / 60, 9);
    expect(week23!.medianS).toBeCloseTo(min(220), 6);
    expect(week23!.p90S).toBeCloseTo(min(360), 6);
    expect(week24).toMatchObject({ monday: '2026-06-08', week: 24, charges: 4 });
    expect(week24!.waitHours).toBeCloseTo(1020 / 60, 9);
    expect(week24!.medianS).toBeCloseTo(min(180), 6);
    expect(week24!.p90S).toBeCloseTo(min(483), 6);
    expect(weeks[0]).toEqual({
      ...{ monday: '2026-04-13', week: 16, charges: 0, few: true, waitHours: 0, medianS: 0, p90S: 0 },
      ...{ usedHours: 0, lostHours: 0 },
    });
  });

  it('by module type: 6 of X with 165 and 205 min, 4 of Y with 360 and 546 min', async () => {
    const { byModuleType } = await waits();
    expect(byModuleType.map(({ key, charges }) => [key, charges])).toEqual([
      [ids.X, 6],
      [ids.Y, 4],
    ]);
    expect(byModuleType.map(({ medianS, p90S }) => [medianS / 60, p90S / 60])).toEqual([
      [expect.closeTo(165, 6), expect.closeTo(205, 6)],
      [expect.closeTo(360, 6), expect.closeTo(546, 6)],
    ]);
    // X: −10 5 0 2 15 −5 → 1; inside 6 of 6. Y: 20 −30 40 60 → 30; inside 1 of 4.
    expect(byModuleType.map(({ againstPlanS, insideBand }) => [againstPlanS / 60, insideBand])).toEqual([
      [expect.closeTo(1, 6), 1],
      [expect.closeTo(30, 6), 0.25],
    ]);
  });

  it('by charger: 6 on B, 3 on C with the one that went on at B, 1 on none', async () => {
    const { groups } = await groupsBy('charger');
    expect(groups.map(({ name, charges }) => [name, charges])).toEqual([
      ['Supply B', 6],
      ['Supply C', 3],
      ['no charger', 1],
    ]);
  });

  it('go to the stages: queue 27.5, charging 77.5, tapering 20, resting 60, check due 5.5 min', async () => {
    const { stages } = await waits();
    expect(stages.map(({ stage, medianS }) => [stage, medianS / 60])).toEqual([
      ['queue', expect.closeTo(27.5, 6)],
      ['charging', expect.closeTo(77.5, 6)],
      ['tapering', expect.closeTo(20, 6)],
      ['resting', expect.closeTo(60, 6)],
      ['check-due', expect.closeTo(5.5, 6)],
    ]);
  });

  it('list the charges newest first; a top-up has waited since the first charge was asked for', async () => {
    const { rows } = await charges();
    expect(rows.map(({ title }) => title)).toEqual(
      ['10', '09', '08', '07', '06', '05', '04', '03', '02', '01'].map((number) => `C-00${number}`),
    );
    expect(rows[0]).toMatchObject({ waitS: min(600), actualS: min(120), plannedS: min(60), insideBand: false });
    expect(rows[9]).toMatchObject({
      typeName: '2-series 66 Ah',
      chargerName: 'Supply B',
      askedAt: '2026-06-02T08:00:00.000Z',
      readyAt: '2026-06-02T10:00:00.000Z',
      waitS: min(120),
      plannedS: min(130),
      insideBand: true,
    });
  });

  it('are narrowed by days of the workshop’s zone, module type and charger', async () => {
    expect((await waits('?from=2026-06-08&to=2026-06-08')).charges).toBe(3);
    expect((await waits('?from=2026-06-07&to=2026-06-07')).charges).toBe(0);
    expect((await waits(`?moduleTypeId=${ids.Y}`)).charges).toBe(4);
    const onC = await waits(`?chargerId=${ids.C}`);
    expect([onC.charges, onC.medianS]).toEqual([3, min(200)]);
    expect((await waits('?from=2026-04-01')).charges).toBe(11);
  });

  it('of an empty period are empty, not zero', async () => {
    expect(await waits('?from=2026-05-04&to=2026-05-10')).toMatchObject({
      charges: 0,
      few: true,
      plan: null,
      stages: [],
      byModuleType: [],
    });
    expect(await charges('?from=2026-05-04&to=2026-05-10')).toEqual({ rows: [], next: null });
  });

  it('refuse days that are none or run backwards', async () => {
    const bad = async (query: string) => (await manager.get(`/api/waits${query}`).expect(400)).body.fields;
    expect(await bad('?from=yesterday')).toEqual({ from: 'Type the day like 2026-06-09.' });
    expect(await bad('?from=2026-02-30')).toEqual({
      from: 'There is no 2026-02-30. Type the day like 2026-06-09.',
    });
    expect(await bad('?from=2026-06-09&to=2026-06-01')).toEqual({
      to: 'The last day lies before the first. Type a later one.',
    });
  });

  it('are for foremen and managers, and of one’s own workshop', async () => {
    await server.agentFor('foreman').get('/api/waits').expect(200);
    await server.agentFor('technician').get('/api/waits').expect(403);
    await server.agentFor('technician').get('/api/waits.csv').expect(403);
    const stranger = server.agentFor('manager', server.other);
    const other = (await stranger.get('/api/waits').expect(200)).body as WaitsDto;
    expect(other).toMatchObject({ charges: 0, plan: null, byModuleType: [], channels: [] });
    expect(other.weeks.every((week) => week.charges === 0)).toBe(true);
    for (const by of waitDimensions)
      expect((await stranger.get(`/api/waits/groups?by=${by}`).expect(200)).body.groups).toEqual([]);
    // The ids of this workshop open nothing there.
    expect((await stranger.get(`/api/waits/charges?moduleTypeId=${ids.X}`).expect(200)).body.rows).toEqual([]);
    expect(
      (await stranger.get(`/api/waits.csv?chargerId=${ids.B}`).expect(200)).text.trim().split('\r\n'),
    ).toHaveLength(1);
  });

  it('as CSV have the same charges in the workshop’s clock', async () => {
    const answer = await manager.get('/api/waits.csv').expect(200);
    expect(answer.headers['content-type']).toContain('text/csv');
    expect(answer.headers['content-disposition']).toContain('waits-2026-04-13-2026-06-09.csv');
    const lines = answer.text.replace('\ufeff', '').trim().split('\r\n');
    expect(lines).toHaveLength(11);
    expect(lines[0]).toBe(
      'Charge,Module type,Charger,Channel,Technician,Way,Asked,Ready,"Waited, min","Used, min","Lost, min","Planned, min",' +
        '"Actual, min",Inside band,"Queue, min","Charging, min","Tapering, min","Resting, min","Check due, min"',
    );
    expect(lines[10]).toBe(
      'C-0001,2-series 66 Ah,Supply B,B1,Technician of own,Through the terminals,2026-06-02 10:00,2026-06-02 12:00,' +
        '120,0,120,130,120,yes,10,39,10,60,1',
    );
  });
});
