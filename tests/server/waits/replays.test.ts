/**
 * Replays over a history whose answer is known on paper: four weeks, Monday to Friday, on each day at 08:00 two charges are
 * asked for, each of one hour on a channel. One channel did them one after the other: the first was ready at 09:00, the
 * second at 10:00. The waits are 60 and 120 min; half of them under 90 min, nine of ten under 120; 3 h a day, 15 h a week.
 * Of two channels both are ready at 09:00: 60 min each, 2 h a day, 10 h a week.
 */
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Workshop } from '@/server/entities/workshop';
import type { ReplayHistory } from '@/server/services/waits/replay-history';
import { ReplayJobs } from '@/server/services/waits/replay-jobs';
import { makeWaitsSolver } from '@/server/services/waits/waits-solver';
import type { ChargerDto } from '@/shared/contract/equipment';
import type { ReplayDto, ReplayJobDto } from '@/shared/contract/waits-replay';
import { channelForm, chargerForm } from '../../support/forms';
import { makeTestServer, type TestAgent, type TestServer } from '../../support/server';
import { created, stock } from '../../support/stocked';
import { writePast, type PastCharge } from './history';

const MINUTE = 60_000;
/** Monday 4 May 2026, 08:00 in Berlin. */
const begin = Date.parse('2026-05-04T06:00:00Z');
const period = { from: '2026-05-04', to: '2026-05-31' };

let server: TestServer;
let manager: TestAgent;
let channelId: string;
let typeId: string;

beforeAll(async () => {
  server = await makeTestServer();
  manager = server.agentFor('manager');
  await server.deps.dataSource.manager.update(
    Workshop,
    { id: server.own.id },
    { workingHours: [...Array(5).fill({ from: '08:00', to: '18:00' }), null, null], lookInMinutes: 60 },
  );
  const stocked = await stock(manager);
  typeId = stocked.type.id;
  // The stock's channels are retired, so that one is left.
  for (const channel of stocked.charger.channels)
    await server.deps.dataSource.query('UPDATE channel SET retired = 1 WHERE id = ?', [channel.id]);
  const charger = await created<ChargerDto>(
    manager,
    '/api/chargers',
    chargerForm({ name: 'Supply Z', channels: [channelForm({ name: 'Z1' })] }),
  );
  channelId = charger.channels[0]!.id;
  const past: PastCharge[] = [];
  for (let day = 0; day < 28; day += 1)
    if (day % 7 < 5)
      for (const second of [0, 1])
        past.push({
          ...{ number: past.length + 1, workshopId: server.own.id, spareId: stocked.spare.id, typeId },
          ...{ personId: server.own.people.technician.id, channelIds: [channelId] },
          readyAt: begin + (day * 1440 + 60 * (second + 1)) * MINUTE,
          ...{ waitMin: 60 * (second + 1), queueMin: 60 * second, taperMin: 0, restMin: 0, checkMin: 0, lateMin: 0 },
          planned: { fromVolts: 3.75, toVolts: 3.95, groupAh: 50 },
        });
  await writePast(server.deps.dataSource.manager, past);
});
afterAll(() => server.close());

async function over(path: string, body: object): Promise<ReplayJobDto> {
  let job = (await manager.post(`/api/waits/${path}`, body).expect(202)).body as ReplayJobDto;
  for (let tries = 0; job.state !== 'done' && tries < 100; tries += 1) {
    expect(job.problem).toBeNull();
    await new Promise((resolve) => setTimeout(resolve, 20));
    job = (await manager.get(`/api/waits/replays/${job.id}`).expect(200)).body as ReplayJobDto;
  }
  return job;
}
const figures = (replay: unknown) => {
  const { charges, unplaced, lostHoursPerWeek, p50WaitHours, p90WaitHours } = replay as ReplayDto;
  return [charges, unplaced, lostHoursPerWeek, p50WaitHours, p90WaitHours].map((one) =>
    typeof one === 'number' ? one : Math.round(one.value * 1e6) / 1e6,
  );
};

describe('40 charges of an hour, two a day', () => {
  it('replayed as they were give the hours that were: 15 lost a week, half under 1.5 h, nine of ten under 2 h', async () => {
    const { whatIf } = await over('what-if', { ...period, questions: [{ overnightAllowed: true }], together: false });
    expect(figures(whatIf!.now)).toEqual([40, 0, 15, 1.5, 2]);
    expect(whatIf!.leftOut).toEqual([]);
    expect(whatIf!.together).toBeNull();
  });

  it('with one more channel lose 10 h a week and wait 1 h each; with half the amps they take longer, at most twice', async () => {
    const { whatIf, progress } = await over('what-if', {
      ...period,
      questions: [{ moreLikeChannelId: channelId }, { amps: { channelId, amps: 10 } }],
      together: true,
    });
    expect(progress).toBe(1);
    const [more, slower] = whatIf!.answers;
    expect(more!.levers).toEqual({ moreLikeChannelId: channelId });
    expect(figures(more!.replay)).toEqual([40, 0, 10, 1, 1]);
    const [, , lost, , p90] = figures(slower!.replay);
    expect(lost).toBeGreaterThan(15 * 1.5);
    expect(p90).toBeGreaterThan(2 * 1.5);
    // 5 min of hands do not get longer.
    expect(p90).toBeLessThan(2 * 2);
    // Both together: each of the two has its own slower channel.
    expect(figures(whatIf!.together)[4]! * 2).toBeCloseTo(p90!, 4);
  });

  it('need one channel for nine of ten within 2 h, and two for 1 h', async () => {
    const two = await over('channels-needed', { ...period, channelId, wishedP90Hours: 1.01 });
    expect(two.channels).toMatchObject({ enough: true, present: 1, channels: 2 });
    const one = await over('channels-needed', { ...period, channelId, wishedP90Hours: 2 });
    expect(one.channels).toMatchObject({ enough: true, present: 1, channels: 1 });
  });

  it('of 12 say that 20 are needed', async () => {
    const short = { from: '2026-05-04', to: '2026-05-11' };
    const { whatIf } = await over('what-if', { ...short, questions: [{ startAtBooking: true }], together: false });
    const few = { enough: false, needs: 20, has: 12 };
    expect([whatIf!.now, whatIf!.answers[0]!.replay]).toEqual([few, few]);
    expect((await over('channels-needed', { ...short, channelId, wishedP90Hours: 2 })).channels).toEqual(few);
    expect((await over('shelf', { ...short, moduleTypeId: typeId })).shelf).toMatchObject(few);
  });

  it('all of the same target are served best from the end of the storage window next to it', async () => {
    const { shelf } = await over('shelf', { ...period, moduleTypeId: typeId });
    if (!shelf?.enough) throw new Error('no curve');
    expect(shelf.charges).toBe(40);
    // 3.95 V lies above the window: each step away from it takes longer.
    expect(shelf.best.volts).toBeCloseTo(shelf.window.highVolts, 9);
    const minutes = shelf.curve.map(({ meanMinutes }) => meanMinutes);
    expect(minutes).toEqual([...minutes].sort((one, other) => other - one));
    expect(shelf.now!.spares).toBe(1);
  });

  it('are not asked for with a channel, a type or volts that are none', async () => {
    const refused = (path: string, body: object) => manager.post(`/api/waits/${path}`, body).expect(400);
    await refused('what-if', { questions: [{ moreLikeChannelId: 'nobody' }], together: false });
    await refused('what-if', { questions: [], together: false });
    await refused('what-if', { questions: [{}], together: false });
    await refused('channels-needed', { channelId: 'nobody', wishedP90Hours: 2 });
    await refused('shelf', { moduleTypeId: 'nobody' });
    const { body } = await refused('what-if', {
      questions: [{ shelf: { moduleTypeId: typeId, volts: 4.15 } }],
      together: false,
    });
    expect(body.fields.questions).toMatch(/is stored between 3\.\d{3} and 3\.\d{3}\u00a0V a group/);
  });
});

describe('a calculation', () => {
  const history = (charges: number): ReplayHistory => ({
    charges: Array.from({ length: charges }, (_, at) => ({
      ...{ id: `${at}`, type: 0, kind: 0, way: 'terminals' as const, bookedAt: null, dueAt: null, usedShare: 0 },
      ...{ askedAt: begin + at * 30 * MINUTE, heldFromAt: begin + at * 30 * MINUTE, fromVolts: 3.4, toVolts: 3.6 },
      ...{ heldToAt: begin + (at * 30 + 60) * MINUTE, readyAt: begin + (at * 30 + 60) * MINUTE, groupAh: 50 },
    })),
    kinds: [
      {
        ...{ count: 2, maxAmps: 20, maxVolts: 60, maxWatts: null, leadOhm: 0.002, singleGroup: false },
        ...{ adjustableVolts: true, dischargeAmps: null, loadOhm: null },
      },
    ],
    types: [
      {
        ...{ curve: { soc: [0, 1], volts: [3, 4.2] }, groups: 2, groupOhm: 0.001, ratedAh: 50, maxChargeAmps: 25 },
        ...{ maxDischargeAmps: 25, capVolts: 4.2, floorVolts: 2.8 },
      },
    ],
    hours: { zone: 'Europe/Berlin', workingHours: Array(7).fill({ from: '00:00', to: '23:59' }) },
    ...{ lookInMinutes: 60, unattended: true, hands: { clipOnS: 300, clipOffS: 300, busbarsS: 720 } },
  });

  it('that is cancelled in its thread ends there, and the next one is not held up', async () => {
    const solver = makeWaitsSolver();
    try {
      const jobs = new ReplayJobs();
      let ended: unknown = 'not yet';
      const questions = Array.from({ length: 12 }, () => ({ moreOfKind: 0 }));
      const job = jobs.begin(
        'own',
        'what-if',
        0,
        async (control) => {
          const task = { kind: 'what-if' as const, history: history(60_000), questions, together: true, control };
          ended = await solver.run(task);
          return null;
        },
        () => {},
      );
      await expect.poll(() => jobs.find('own', job.id).progress, { timeout: 20_000 }).toBeGreaterThan(0);
      expect(jobs.find('own', job.id).state).toBe('running');
      expect(jobs.cancel('own', job.id).state).toBe('cancelled');
      await expect.poll(() => ended, { timeout: 5000 }).toBeNull();
      expect(await solver.run({ kind: 'compare', before: [1, 2, 3], then: [1, 2, 3], seed: 1 })).toMatchObject({
        p: 1,
      });
    } finally {
      await solver.close();
    }
  });

  it('is the fourth at once in a workshop: it is refused there, not in another, and a cancelled one makes room', () => {
    const jobs = new ReplayJobs();
    const start = (workshopId: string) =>
      jobs.begin(
        workshopId,
        'shelf',
        0,
        () => new Promise(() => {}),
        () => {},
      );
    const [first] = [start('own'), start('own'), start('own')];
    expect(() => start('own')).toThrow('Three calculations go on already');
    expect(start('other').state).toBe('queued');
    expect(() => jobs.cancel('other', first!.id)).toThrow('not here');
    jobs.cancel('own', first!.id);
    expect(start('own').state).toBe('queued');
  });
});
