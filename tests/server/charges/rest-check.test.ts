import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import type { ChargeDto } from '@/shared/contract/charge';
import type { SpareDto } from '@/shared/contract/spare';
import { act, alertsOf, answered, at, did, kept, makeBench, minute, running, seen, type Bench } from './bench';

let bench: Bench;
beforeEach(async () => {
  bench = await makeBench();
});
afterEach(() => bench.server.close());

const openKinds = async (): Promise<string[]> =>
  (await alertsOf(bench)).filter((alert) => alert.clearedAt === null).map((alert) => alert.kind);

describe('the check', () => {
  async function due(): Promise<ChargeDto> {
    const charge = await running(bench, { spareId: await bench.spare('S-0402') });
    await bench.live(at(charge.checkDueAt) - bench.server.clock.now() + minute, 5 * minute);
    return seen(bench, charge.id);
  }

  test('7 mV below is outside: it stays check due with what the group needs', async () => {
    const charge = await due();
    const judged = await did(bench, charge, 'rest-check', {
      groupVolts: [3.951, 3.942],
      celsius: 21,
      meterId: bench.meterId,
    });
    expect(judged.stage).toBe('check-due');
    const [, second] = judged.restChecks[0]!.verdict.groups;
    expect(second!.within).toBe(false);
    // The table rises 42.6 mV over 10.43 % about there; 7 mV of 60 Ah are about 1.1 Ah by straight lines.
    expect(second!.ampHoursToGo).toBeGreaterThan(0.8);
    expect(second!.ampHoursToGo).toBeLessThan(1.4);
    expect(judged.events.at(-1)!.text).toMatch(
      /^Group 2 is 7\u00a0mV below, outside\. It needs [\d.]+\u00a0Ah more\.$/,
    );
    expect(await openKinds()).not.toContain('check-due');
  });

  test('3.96 as it is typed is too coarse for ±5 mV and is refused at its field; a number says what it means', async () => {
    const charge = await due();
    const body = { groupVolts: ['3.949', '3.96'], celsius: '21', meterId: bench.meterId };
    const refused = await act(bench, charge, 'rest-check', body);
    expect(refused.status).toBe(400);
    expect((refused.body as { fields: object }).fields).toEqual({
      'groupVolts.1': 'Two decimals are not enough to judge 5\u00a0mV. Type three.',
    });
    const one = await act(bench, charge, 'rest-check', { ...body, groupVolts: ['3.949'] });
    expect((one.body as { fields: object }).fields).toEqual({
      groupVolts: 'This type has 2 groups; 1 voltage was typed.',
    });
    const judged = await did(bench, charge, 'rest-check', { ...body, groupVolts: ['3,949 V', 3.95] });
    expect(judged.restChecks[0]!.groupVolts).toEqual([3.949, 3.95]);
  });

  test('the known offset of the meter is taken off before the verdict', async () => {
    const charge = await due();
    const meter = await bench
      .as('manager')
      .post('/api/meters', { name: 'hand 4', offsetMillivolts: 6, checkedAt: null });
    const judged = await did(bench, charge, 'rest-check', {
      groupVolts: [3.955, 3.955],
      celsius: 21,
      meterId: (meter.body as { id: string }).id,
    });
    expect(judged.stage).toBe('ready');
    expect(judged.restChecks[0]!.groupVolts).toEqual([3.955, 3.955]);
    expect(judged.restChecks[0]!.verdict.groups[0]!.volts).toBeCloseTo(3.949, 6);
  });

  test('before the rest is over it counts, and the log says that it was early', async () => {
    const running1 = await running(bench, { spareId: await bench.spare('S-0402') });
    await bench.live(at(running1.currentEndAt) - bench.server.clock.now() + 20 * minute, 5 * minute);
    const judged = await did(bench, await seen(bench, running1.id), 'rest-check', {
      groupVolts: [3.949, 3.949],
      celsius: 21,
      meterId: bench.meterId,
    });
    expect(judged.stage).toBe('ready');
    expect(judged.events.at(-1)!.text).toContain('Checked early, ');
  });

  test('while current flows there is nothing to check', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-0402') });
    const answer = await act(bench, charge, 'rest-check', { groupVolts: [3.9, 3.9], celsius: null, meterId: null });
    expect(answer.status).toBe(409);
    expect(answer.body).toMatchObject({ code: 'wrong_stage', present: { stage: 'charging' } });
  });

  test.each([
    [['3968', '3.968'], 'groupVolts.0', /In millivolts\? Then it is 3\.968/],
    [['39.68', '3.968'], 'groupVolts.0', /A point in the wrong place\?/],
    [['3.968'], 'groupVolts', /This type has 2 groups; 1 voltage was typed\./],
    [['3.9', '3.9', '3.9', '3.9'], 'groupVolts', /This type has 2 groups; 4 voltages were typed\./],
    [['3.968', 'abc'], 'groupVolts.1', /“abc” is no number\. Type it like 3\.968\./],
    [['3.968', ''], 'groupVolts.1', /The voltage is missing\./],
    [['3.968', '-3.9'], 'groupVolts.1', /too little/],
  ])('%j is refused at %s', async (groupVolts, field, sentence) => {
    const charge = await due();
    const answer = await act(bench, charge, 'rest-check', { groupVolts, celsius: null, meterId: null });
    expect(answer.status).toBe(400);
    expect((answer.body as { fields: Record<string, string> }).fields[field]).toMatch(sentence);
    expect((await seen(bench, charge.id)).restChecks).toEqual([]);
  });

  test('a top-up goes on with the same spare from the voltages of the check, and closes the old charge', async () => {
    const charge = await due();
    const outside = await did(bench, charge, 'rest-check', {
      groupVolts: [3.9, 3.899],
      celsius: 21,
      meterId: bench.meterId,
    });
    const topUp = await kept(bench, {
      spareId: outside.spare.id,
      targetVolts: outside.targetTypedVolts,
      meterId: outside.meterId,
      topUpOf: outside.id,
    });
    expect(topUp.topUpOf).toEqual({ id: outside.id, number: outside.number });
    expect(topUp.groups.map((group) => group.volts)).toEqual([3.9, 3.899]);
    // 49 mV to go from 3.900 V are a good third of the first move, so it takes less than half its time.
    expect(topUp.option.ampHours).toBeLessThan(outside.option.ampHours / 2);
    const old = await seen(bench, outside.id);
    expect(old.stage).toBe('shelved');
    expect(old.wentOnAs).toEqual({ id: topUp.id, number: topUp.number });
    expect(old.events.at(-1)!.text).toBe(`Went on as ${topUp.number}.`);
    await did(bench, await answered(bench, topUp), 'start');
  });

  test('a top-up of a charge that nobody has checked is refused', async () => {
    const charge = await due();
    const answer = await bench
      .as('technician')
      .post('/api/charges', {
        spareId: charge.spare.id,
        targetVolts: 3.949,
        toleranceMillivolts: 5,
        meterId: null,
        packCelsius: null,
        readyBy: null,
        clipOnAt: null,
        repairRef: null,
        modulePosition: null,
        optionId: charge.option.id,
        topUpOf: charge.id,
      })
      .set('Idempotency-Key', 'top-up-unchecked');
    expect(answer.status).toBe(409);
    expect((await seen(bench, charge.id)).stage).toBe('check-due');
  });

  test('a spare out of tolerance goes back on the shelf with its place and the voltages of the check', async () => {
    const charge = await due();
    const judged = await did(bench, charge, 'rest-check', { groupVolts: [3.9, 3.9], celsius: 21, meterId: null });
    const shelved = await did(bench, judged, 'shelve', { shelfPlace: 'H2', note: 'channel needed' });
    expect(shelved.stage).toBe('shelved');
    const spare = (await bench.as('technician').get(`/api/spares/${charge.spare.id}`)).body as SpareDto;
    expect(spare).toMatchObject({ where: 'shelf', shelfPlace: 'H2', reading: { groupVolts: [3.9, 3.9] } });
  });
});
