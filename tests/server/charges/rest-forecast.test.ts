import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import type { ChargeDto } from '@/shared/contract/charge';
import { alertsOf, at, did, key, makeBench, minute, running, seen, type Bench } from './bench';

let bench: Bench;
beforeEach(async () => {
  bench = await makeBench();
});
afterEach(() => bench.server.close());

/** A charge whose current was switched off when it was reckoned to be in. */
async function resting(say = true): Promise<ChargeDto> {
  const charge = await running(bench, { spareId: await bench.spare('S-0402') });
  await bench.live(at(charge.currentEndAt) - bench.server.clock.now() + 1000, 10 * minute);
  const ended = await seen(bench, charge.id);
  return say ? did(bench, ended, 'current-off') : ended;
}

async function logged(charge: ChargeDto, groupVolts: number[]): Promise<ChargeDto> {
  const answer = await bench
    .as('technician')
    .post(`/api/charges/${charge.id}/readings`, { groupVolts, meterId: bench.meterId })
    .set('Idempotency-Key', key());
  expect(answer.status, JSON.stringify(answer.body)).toBe(200);
  return answer.body as ChargeDto;
}

/** Reads both groups every `stepMs`, as an over-voltage of `over` V with one time constant would leave them. */
async function relax(charge: ChargeDto, over: number, tauMs: number, count: number, stepMs: number) {
  const end = at(charge.currentEndAt);
  let last = charge;
  for (let n = 0; n < count; n += 1) {
    await bench.live(stepMs, minute);
    const left = over * Math.exp(-(bench.server.clock.now() - end) / tauMs);
    last = await logged(
      charge,
      [3.949 + left, 3.948 + left].map((volts) => Math.round(volts * 1000) / 1000),
    );
  }
  return last;
}

describe('the rest', () => {
  test('that settles within minutes is rested enough before the minimum hour: the check is due, early and marked', async () => {
    const charge = await resting();
    expect(charge.rest).toBeNull();
    const minimumEnd = at(charge.currentEndAt) + charge.minRestS * 1000;
    // A steady voltage to the millivolt at 3, 6, 9… min. Two ten minutes apart would end the rest in any case.
    const read = await relax(charge, 0, minute, 3, 3 * minute);
    expect(read.rest!.settledVolts).toHaveLength(2);
    for (const [group, { p10, p50, p90 }] of read.rest!.settledVolts.entries()) {
      expect(p10).toBeLessThanOrEqual(p50);
      expect(p90).toBeGreaterThanOrEqual(p50);
      expect(Math.abs(p50 - [3.949, 3.948][group]!)).toBeLessThan(0.004);
    }
    const settled = await relax(charge, 0, minute, 8, 5 * minute);
    expect(settled).toMatchObject({ stage: 'check-due', rest: { restedEnough: true } });
    expect(settled.rest!.chance).toBeGreaterThanOrEqual(0.9);
    expect(at(settled.rest!.enoughAt)).toBeLessThan(minimumEnd);
    expect(at(settled.checkDueAt)).toBeLessThan(minimumEnd);
    const alert = (await alertsOf(bench)).find(({ kind, clearedAt }) => kind === 'rested' && clearedAt === null);
    expect(alert!.seen).toMatch(/^Rested .* Its readings say that it has settled\.$/);
    expect(bench.server.clock.now()).toBeLessThan(minimumEnd);
    const checked = await did(bench, settled, 'rest-check', {
      groupVolts: [3.949, 3.948],
      celsius: 21,
      meterId: bench.meterId,
    });
    expect(checked.stage).toBe('ready');
    expect(checked.restChecks[0]!.early).toBe(true);
    expect(checked.events.at(-1)!.text).toContain('before the minimum rest was over: the readings say');
    expect(checked.rest).toBeNull();
  });

  test('that still falls by millivolts is not over before the minimum hour', async () => {
    const charge = await resting();
    const read = await relax(charge, 0.03, 40 * minute, 6, 6 * minute);
    expect(read.stage).toBe('resting');
    expect(read.rest!.restedEnough).toBe(false);
    expect(read.rest!.chance).toBeLessThan(0.5);
    // 0.03 · e^(−36/40) is 12 mV above where it settles; the forecast sees that it goes on down.
    expect(read.rest!.settledVolts[0]!.p50).toBeLessThan(read.readings.at(-1)!.groupVolts![0]!);
    expect(at(read.checkDueAt)).toBe(at(charge.checkDueAt));
  });

  test('is no rest while nobody has said that the current is off: nothing is claimed from volts that a charger may hold', async () => {
    const charge = await resting(false);
    const read = await relax(charge, 0, minute, 4, 2 * minute);
    expect(read.rest).toBeNull();
    expect(read.stage).toBe('resting');
  });

  test('a check after the whole rest is not early', async () => {
    const charge = await resting();
    await bench.live(at(charge.checkDueAt) - bench.server.clock.now() + 1000, 10 * minute);
    const checked = await did(bench, await seen(bench, charge.id), 'rest-check', {
      groupVolts: [3.949, 3.949],
      celsius: 21,
      meterId: bench.meterId,
    });
    expect(checked.restChecks[0]!.early).toBe(false);
  });
});
