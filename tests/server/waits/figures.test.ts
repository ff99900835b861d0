/*
 * The figures against a second path: the history that was written, gone through minute by minute in plain JavaScript. All of
 * it lies in summer, when Berlin is two hours before UTC; hours are Monday to Friday 08:00–18:00.
 */
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { seededRandom } from '@/calc/index';
import { Work } from '@/server/entities/work';
import { WorkStint } from '@/server/entities/work-stint';
import { Workshop } from '@/server/entities/workshop';
import type { ModuleTypeDto } from '@/shared/contract/equipment';
import type { WaitGroupsDto, WaitsDto, CompareWaitsDto, WaitChargesDto } from '@/shared/contract/waits';
import { moduleTypeForm } from '../../support/forms';
import { makeTestServer, type TestServer } from '../../support/server';
import { created, stock } from '../../support/stocked';
import { writePast, type PastCharge } from './history';

const MINUTE = 60_000;
const DAY = 1440;
const COUNT = 300;
/** Monday 13 April 2026, 00:00 in Berlin. */
const begin = Date.parse('2026-04-12T22:00:00Z');

let server: TestServer;
const past: PastCharge[] = [];
const stints: { personId: string; from: number; to: number; state: 'done' | 'begun' | 'given-back' | 'taken' }[] = [];

beforeAll(async () => {
  server = await makeTestServer();
  const manager = server.agentFor('manager');
  const { manager: rows } = server.deps.dataSource;
  await rows.update(
    Workshop,
    { id: server.own.id },
    { workingHours: [...Array(5).fill({ from: '08:00', to: '18:00' }), null, null] },
  );
  const stocked = await stock(manager);
  const second = await created<ModuleTypeDto>(manager, '/api/module-types', moduleTypeForm({ name: '3-series 78 Ah' }));
  const random = seededRandom(11);
  const pick = <One>(of: readonly One[]): One => of[Math.floor(random() * of.length)]!;
  const people = Object.values(server.own.people).map(({ id }) => id);
  for (let number = 1; number <= COUNT; number += 1) {
    const waitMin = 60 + Math.floor(random() * 600);
    past.push({
      ...{ number, workshopId: server.own.id, personId: pick(people), spareId: stocked.spare.id },
      typeId: pick([stocked.type.id, stocked.type.id, second.id]),
      channelIds: random() < 0.1 ? [] : [pick(stocked.charger.channels).id],
      readyAt: begin + (waitMin + Math.floor(random() * 56 * DAY)) * MINUTE,
      ...{ waitMin, queueMin: Math.floor(random() * 30), taperMin: random() < 0.3 ? 0 : 12, restMin: 20, checkMin: 3 },
      lateMin: Math.floor(random() * 80) - 40,
    });
  }
  await rows.insert(Work, {
    ...{
      id: 'work-1',
      workshopId: server.own.id,
      number: 'W-1',
      title: 'Brake bleed',
      likelyMinutes: 30,
      longMinutes: 40,
    },
    ...{ skillId: null, placeId: null, priority: 'usual', dueAt: null, repairId: null, splittable: true, note: null },
    ...{
      leftMinutes: 30,
      leftLongMinutes: 40,
      overAt: null,
      overById: null,
      dropReason: null,
      rev: 1,
      createdAt: begin,
    },
    createdById: people[0]!,
  });
  for (let place = 0; place < 250; place += 1) {
    const from = begin + Math.floor(random() * 56 * DAY) * MINUTE;
    const state = pick(['done', 'done', 'done', 'given-back', 'taken'] as const);
    stints.push({ personId: pick(people), from, to: from + (10 + Math.floor(random() * 200)) * MINUTE, state });
  }
  for (const [place, { personId, from, to, state }] of stints.entries())
    await rows.insert(WorkStint, {
      ...{
        id: `stint-${place}`,
        workshopId: server.own.id,
        workId: 'work-1',
        personId,
        givenById: null,
        placeId: null,
      },
      ...{ state, fromAt: from, toAt: to, likelyMinutes: 30, longMinutes: 40, waitChargeId: null },
      ...(state === 'taken' ? { begunAt: null, endedAt: null } : { begunAt: from, endedAt: to }),
    });
  await writePast(rows, past);
});
afterAll(() => server.close());

/** Whether a minute of UTC lies within the hours, two hours before Berlin's clock. */
function isOpen(at: number): boolean {
  const local = new Date(at + 120 * MINUTE);
  return local.getUTCDay() >= 1 && local.getUTCDay() <= 5 && local.getUTCHours() >= 8 && local.getUTCHours() < 18;
}
function usedAndLost(one: PastCharge): { used: number; lost: number } {
  let [used, lost] = [0, 0];
  for (let at = one.readyAt - one.waitMin * MINUTE; at < one.readyAt; at += MINUTE) {
    if (!isOpen(at)) continue;
    const busy = stints.some(
      ({ personId, from, to, state }) => state === 'done' && personId === one.personId && from <= at && at < to,
    );
    if (busy) used += 1;
    else lost += 1;
  }
  return { used, lost };
}
/** Quantile of type 7 by its definition: x(h) with h = (n − 1)p + 1, straight between neighbours. */
function quantile7(values: number[], p: number): number {
  const sorted = [...values].sort((a, b) => a - b);
  const h = (sorted.length - 1) * p;
  const low = sorted[Math.floor(h)]!;
  return low + (h % 1) * ((sorted[Math.floor(h) + 1] ?? low) - low);
}
const sum = (values: number[]): number => values.reduce((all, one) => all + one, 0);
const stageMinutes = {
  queue: (one: PastCharge) => one.queueMin,
  charging: (one: PastCharge) => one.waitMin - one.queueMin - one.taperMin - one.restMin - one.checkMin,
  tapering: (one: PastCharge) => one.taperMin,
  resting: (one: PastCharge) => one.restMin,
  'check-due': (one: PastCharge) => one.checkMin,
};

interface Figures {
  charges: number;
  waitHours: number;
  medianS: number;
  p90S: number;
  usedHours: number;
  lostHours: number;
}
function expectFigures(found: Figures, of: readonly PastCharge[], minutes = (one: PastCharge) => one.waitMin): void {
  expect(found.charges).toBe(of.length);
  expect(found.waitHours).toBeCloseTo(sum(of.map(minutes)) / 60, 6);
  expect(found.medianS).toBeCloseTo(quantile7(of.map(minutes), 0.5) * 60, 6);
  expect(found.p90S).toBeCloseTo(quantile7(of.map(minutes), 0.9) * 60, 6);
  const split = of.map(usedAndLost);
  expect(found.usedHours).toBeCloseTo(sum(split.map(({ used }) => used)) / 60, 6);
  expect(found.lostHours).toBeCloseTo(sum(split.map(({ lost }) => lost)) / 60, 6);
}
function expectPlan(found: WaitsDto['plan'], of: readonly PastCharge[]): void {
  const late = of.map(({ lateMin }) => lateMin * 60);
  expect(found!.againstPlanS).toBeCloseTo(quantile7(late, 0.5), 6);
  expect(found!.biasS).toBeCloseTo(sum(late) / of.length, 6);
  expect(found!.absErrorS).toBeCloseTo(quantile7(late.map(Math.abs), 0.5), 6);
  expect(found!.insideBand).toBeCloseTo(
    of.filter(({ lateMin }) => lateMin >= -15 && lateMin <= 25).length / of.length,
    9,
  );
}

const read = async <Body>(path: string): Promise<Body> =>
  (await server.agentFor('foreman').get(`/api${path}`).expect(200)).body as Body;
const all = 'from=2026-04-13&to=2026-06-09';

describe('300 charges in eight weeks', () => {
  it('have the hours, used and lost, median, p90 and errors of a walk through their minutes', async () => {
    const found = await read<WaitsDto>(`/waits?${all}`);
    expectFigures(found, past);
    expectPlan(found.plan, past);
    // The history is such that both parts are there to be told apart.
    expect(found.usedHours).toBeGreaterThan(10);
    expect(found.lostHours).toBeGreaterThan(found.usedHours);
  });

  it('week by week', async () => {
    const { weeks } = await read<WaitsDto>(`/waits?${all}`);
    weeks.forEach((week, place) => {
      const [from, to] = [begin + place * 7 * DAY * MINUTE, begin + (place + 1) * 7 * DAY * MINUTE];
      const own = past.filter(({ readyAt }) => readyAt >= from && readyAt < to);
      if (own.length > 0) expectFigures(week, own);
      else expect(week).toMatchObject({ charges: 0, few: true, waitHours: 0 });
    });
    expect(sum(weeks.map(({ charges }) => charges))).toBe(COUNT);
  });

  it.each([
    ['module-type', (one: PastCharge) => one.typeId],
    ['channel', (one: PastCharge) => one.channelIds[0] ?? 'none'],
    ['technician', (one: PastCharge) => one.personId],
    ['weekday', (one: PastCharge) => String(new Date(one.readyAt + 120 * MINUTE).getUTCDay() || 7)],
  ] as const)('by %s, and narrowed to each of them', async (by, keyOf) => {
    const { groups } = await read<WaitGroupsDto>(`/waits/groups?by=${by}&${all}`);
    expect(new Set(groups.map(({ key }) => key))).toEqual(new Set(past.map(keyOf)));
    const filter = {
      'module-type': 'moduleTypeId',
      channel: 'channelId',
      technician: 'technicianId',
      weekday: 'weekday',
    };
    for (const group of groups) {
      const own = past.filter((one) => keyOf(one) === group.key);
      expectFigures(group, own);
      expectPlan(group, own);
      expect(group.few).toBe(own.length < 5);
      expectFigures(await read<WaitsDto>(`/waits?${all}&${filter[by]}=${group.key}`), own);
    }
  });

  it('by stage, over the charges that had it', async () => {
    const { stages } = await read<WaitsDto>(`/waits?${all}`);
    expect(stages.map(({ stage }) => stage)).toEqual(Object.keys(stageMinutes));
    for (const { stage, charges, medianS, p90S, waitHours } of stages) {
      const own = stage === 'tapering' ? past.filter(({ taperMin }) => taperMin > 0) : past;
      const minutes = own.map(stageMinutes[stage]);
      expect(charges).toBe(own.length);
      expect(medianS).toBeCloseTo(quantile7(minutes, 0.5) * 60, 6);
      expect(p90S).toBeCloseTo(quantile7(minutes, 0.9) * 60, 6);
      expect(waitHours).toBeCloseTo(sum(minutes) / 60, 6);
      expectFigures(await read<WaitsDto>(`/waits?${all}&stage=${stage}`), own, stageMinutes[stage]);
    }
  });

  it('show each channel busy for its held minutes within working hours', async () => {
    const { channels } = await read<WaitsDto>('/waits?from=2026-05-04&to=2026-05-24');
    const [from, to] = [begin + 21 * DAY * MINUTE, begin + 42 * DAY * MINUTE];
    for (const channel of channels) {
      const own = past.filter(({ channelIds }) => channelIds[0] === channel.channelId);
      let busy = 0;
      for (const one of own) {
        const end = one.readyAt - (one.restMin + one.checkMin) * MINUTE;
        for (let at = one.readyAt - (one.waitMin - one.queueMin) * MINUTE; at < end; at += MINUTE)
          if (at >= from && at < to && isOpen(at)) busy += 1;
      }
      expect(channel.busyHours).toBeCloseTo(busy / 60, 6);
      // Three weeks of five days of ten hours.
      expect(channel.openHours).toBeCloseTo(150, 6);
      expect(channel.share).toBeCloseTo(busy / 60 / 150, 6);
    }
    expect(channels.length).toBeGreaterThan(0);
  });

  it('lead from a week of one technician to exactly the charges behind it', async () => {
    const technicianId = server.own.people.technician.id;
    const { rows } = await read<WaitChargesDto>(`/waits/charges?${all}&technicianId=${technicianId}&week=2026-05-11`);
    const [from, to] = [begin + 28 * DAY * MINUTE, begin + 35 * DAY * MINUTE];
    const own = past.filter(({ personId, readyAt }) => personId === technicianId && readyAt >= from && readyAt < to);
    expect(rows.map(({ chargeId }) => chargeId).sort()).toEqual(own.map(({ number }) => `charge-${number}`).sort());
    for (const row of rows) {
      const one = own.find(({ number }) => row.chargeId === `charge-${number}`)!;
      const { used, lost } = usedAndLost(one);
      expect([row.waitS, row.usedS, row.lostS]).toEqual([one.waitMin * 60, used * 60, lost * 60]);
    }
    expect(own.length).toBeGreaterThan(3);
  });

  it('call two halves drawn from the same waits no clear difference, and say the interval and the test', async () => {
    const found = await read<CompareWaitsDto>(
      '/waits/compare?from=2026-05-11&to=2026-06-09&compareFrom=2026-04-13&compareTo=2026-05-10',
    );
    const half = begin + 28 * DAY * MINUTE;
    const minutes = (then: boolean) =>
      past.filter(({ readyAt }) => readyAt >= half === then).map(({ waitMin }) => waitMin);
    expect([found.before.charges, found.then.charges]).toEqual([minutes(false).length, minutes(true).length]);
    expect(found.difference!.medianS).toBeCloseTo(
      (quantile7(minutes(true), 0.5) - quantile7(minutes(false), 0.5)) * 60,
      6,
    );
    expect(found.difference!.lowS).toBeLessThan(found.difference!.medianS);
    expect(found.difference!.highS).toBeGreaterThan(found.difference!.medianS);
    expect(found.difference!.clear).toBe(false);
    expect(found.difference!.text).toMatch(
      /^No clear difference: .* with 95\u00a0% \(bootstrap of the medians\); rank test p /,
    );
  });

  it('under 5 charges compare nothing', async () => {
    const found = await read<CompareWaitsDto>(
      '/waits/compare?from=2026-05-11&to=2026-06-09&compareFrom=2025-04-13&compareTo=2025-05-10',
    );
    expect(found).toMatchObject({ before: { charges: 0, few: true }, difference: null });
  });
});
