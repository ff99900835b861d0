import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import type { ChargeDto } from '@/shared/contract/charge';
import type { Role } from '@/shared/contract/roles';
import { at, capacityAh, high, key, low, makeBench, minute, running, sameSamples, seen, type Bench } from './bench';

let bench: Bench;
let charge: ChargeDto;
beforeEach(async () => {
  bench = await makeBench();
  charge = await running(bench, { spareId: await bench.spare('S-0398') });
});
afterEach(() => bench.server.close());

const log = (body: object, role: Role = 'technician') =>
  bench.as(role).post(`/api/charges/${charge.id}/readings`, body).set('Idempotency-Key', key());
const logged = async (body: object, role: Role = 'technician'): Promise<ChargeDto> => {
  const answer = await log(body, role);
  expect(answer.status, JSON.stringify(answer.body)).toBe(200);
  return answer.body as ChargeDto;
};
const correct = (id: string, body: object, role: Role = 'technician') =>
  bench.as(role).patch(`/api/charges/${charge.id}/readings/${id}`, body);

describe('a reading', () => {
  test('8 A in place of 10 A from the first half hour on moves the end to what Ah ÷ A says, within 2 %', async () => {
    bench.server.clock.advance(minute);
    await logged({ amps: '8.0' });
    bench.server.clock.advance(29 * minute);
    const after = await logged({ amps: '8,0 A' });
    const ampHours = capacityAh * (high.soc - low.soc);
    const seconds = (at(after.currentEndAt) - at(after.startedAt)) / 1000;
    // Half an hour at 8 A was seen; from there on the supply gives 8 A, or its planned 10 A again.
    const at8 = (ampHours / 8) * 3600;
    const at10Again = 1800 + ((ampHours - 4) / 10) * 3600;
    expect(seconds).toBeGreaterThan(at10Again * 0.98);
    expect(seconds).toBeLessThan(at8 * 1.02);
    expect(seconds).toBeGreaterThan((ampHours / 10) * 3600 * 1.03);
    expect(after.deliveredAh).toBeCloseTo(4, 0);
    expect(at(after.lastReadingAt)).toBe(bench.server.clock.now());
    expect(after.events.at(-1)!.text).toBe('8.0\u00a0A.');
  });

  test('it stands beside what the plan expected at its instant', async () => {
    bench.server.clock.advance(30 * minute);
    const after = await logged({ terminalVolts: '7.75', amps: '10', celsius: '23' });
    expect(after.expected).not.toBeNull();
    expect(at(after.expected!.at)).toBeCloseTo(bench.server.clock.now(), -3);
    expect(after.expected!.amps).toBeCloseTo(10, 1);
    // Two groups between 3.80 and 3.95 V at rest, with 10 A over 2 mΩ each on top.
    expect(after.expected!.terminalVolts).toBeGreaterThan(2 * 3.8);
    expect(after.expected!.terminalVolts).toBeLessThan(2 * 3.99);
  });

  test('one that comes late is sorted in by its time', async () => {
    bench.server.clock.advance(40 * minute);
    await logged({ amps: '10.0' });
    const early = new Date(bench.server.clock.now() - 20 * minute).toISOString();
    const after = await logged({ amps: '9.0', at: early });
    expect(after.readings.map((reading) => reading.amps)).toEqual([9, 10]);
    expect(at(after.lastReadingAt)).toBe(bench.server.clock.now());
  });

  test('the order in which readings arrive does not change what is reckoned from them', async () => {
    const ends: number[] = [];
    const amounts: number[] = [];
    for (const turned of [false, true]) {
      const twin = await makeBench();
      try {
        const one = await running(twin, { spareId: await twin.spare('S-0398') });
        await sameSamples(twin);
        twin.server.clock.advance(40 * minute);
        const ago = (minutes: number) => new Date(twin.server.clock.now() - minutes * minute).toISOString();
        const set = [
          { amps: '9.6', at: ago(30) },
          { amps: '9.4', at: ago(20) },
          { amps: '9.8', at: ago(5) },
        ];
        for (const body of turned ? set.reverse() : set)
          await twin.as('technician').post(`/api/charges/${one.id}/readings`, body).set('Idempotency-Key', key());
        const after = await seen(twin, one.id);
        ends.push(at(after.currentEndAt));
        amounts.push(after.deliveredAh);
      } finally {
        await twin.server.close();
      }
    }
    expect(amounts[1]).toBeCloseTo(amounts[0]!, 6);
    expect(ends[1]).toBe(ends[0]);
  });

  test('the same key twice is one reading', async () => {
    const send = () =>
      bench
        .as('technician')
        .post(`/api/charges/${charge.id}/readings`, { amps: '10' })
        .set('Idempotency-Key', 'one-reading-only');
    await send();
    await send();
    expect((await seen(bench, charge.id)).readings).toHaveLength(1);
  });

  test('a reading counts as the look-in that is due', async () => {
    bench.server.clock.advance(61 * minute);
    await bench.sleeper.runDue();
    const after = await logged({ amps: '10.0', celsius: '24' });
    expect(after.lookIns[0]).toMatchObject({ doneAt: new Date(bench.server.clock.now()).toISOString() });
    expect(at(after.nextLookInAt)).toBe(at(after.startedAt) + 120 * minute);
  });

  test.each([
    [{ amps: '-5 A' }, 'amps', '−5.0\u00a0A would be a discharge; this one charges. 5.0\u00a0A?'],
    [{ amps: '100' }, 'amps', '100.0\u00a0A is over twice the planned 10.0\u00a0A. A point in the wrong place?'],
    [{ amps: 'ten' }, 'amps', '“ten” is no number. Type it like 3.968.'],
    [
      { terminalVolts: '77.5' },
      'terminalVolts',
      '77.50\u00a0V is more than 2 groups show. A point in the wrong place?',
    ],
    [{ terminalVolts: '7750' }, 'terminalVolts', /7750\u00a0V is over 150\u00a0V, the most for this\./],
    [{ terminalVolts: '-7.7' }, 'terminalVolts', /too little/],
    [{ celsius: '400' }, 'celsius', /over 120\u00a0°C/],
    [{ groupVolts: ['3.9', '3.9', '3.9', '3.9'] }, 'groupVolts', 'This type has 2 groups; 4 voltages were typed.'],
    [{ groupVolts: ['39.68', '3.9'] }, 'groupVolts.0', /A point in the wrong place\?/],
    [{}, 'terminalVolts', 'Type at least one number that was read.'],
    [{ amps: '' }, 'terminalVolts', 'Type at least one number that was read.'],
    [{ amps: '10', at: '2026-06-09T06:00:00.000Z' }, 'at', /lies before the start at 10:00/],
    [{ amps: '10', at: '2026-06-09T20:00:00.000Z' }, 'at', /is still to come/],
    [{ amps: '10', meterId: 'nobody' }, 'meterId', 'This meter is not on the list. Choose another.'],
  ])('%j is refused at %s and nothing is kept', async (body, field, sentence) => {
    bench.server.clock.advance(30 * minute);
    const answer = await log(body);
    expect(answer.status).toBe(400);
    const text = (answer.body as { fields: Record<string, string> }).fields[field];
    if (typeof sentence === 'string') expect(text).toBe(sentence);
    else expect(text).toMatch(sentence);
    expect((await seen(bench, charge.id)).readings).toEqual([]);
  });

  test('a group over its limit is logged, not refused: that is what must be known', async () => {
    bench.server.clock.advance(30 * minute);
    const after = await logged({ groupVolts: ['4.31', '3.86'] });
    expect(after.readings[0]!.groupVolts).toEqual([4.31, 3.86]);
  });

  test('too warm is logged and says so', async () => {
    bench.server.clock.advance(30 * minute);
    const after = await logged({ celsius: '47' });
    expect(after.events.at(-1)!.text).toBe("47\u00a0°C. Over this type's 45\u00a0°C: hold it and look.");
  });
});

describe('a correction', () => {
  test('its writer corrects a mistyped reading; the old value stays, and all is reckoned anew', async () => {
    bench.server.clock.advance(30 * minute);
    const right = await logged({ amps: '10.0' });
    const end = at(right.currentEndAt);
    bench.server.clock.advance(minute);
    const wrong = await logged({ amps: '5.0' });
    expect(Math.abs(at(wrong.currentEndAt) - end)).toBeGreaterThan(minute);
    const id = wrong.readings.at(-1)!.id;
    bench.server.clock.advance(minute);
    const answer = await correct(id, { amps: '10.0', reason: 'read the wrong display' });
    expect(answer.status, JSON.stringify(answer.body)).toBe(200);
    const after = answer.body as ChargeDto;
    const old = after.readings.find((reading) => reading.id === id)!;
    const now = after.readings.find((reading) => reading.replaces === id)!;
    expect(old).toMatchObject({ amps: 5, replacedBy: now.id, mayCorrect: false });
    expect(now).toMatchObject({ amps: 10, reason: 'read the wrong display', at: old.at });
    expect(Math.abs(at(after.currentEndAt) - end)).toBeLessThan(minute);
    expect(after.events.at(-1)!.text).toBe(
      'Reading of 10:31 corrected: 5.0\u00a0A, now 10.0\u00a0A. read the wrong display.',
    );
  });

  test('a colleague may not, a foreman may', async () => {
    bench.server.clock.advance(30 * minute);
    const id = (await logged({ amps: '5.0' }, 'foreman')).readings[0]!.id;
    const refused = await correct(id, { amps: '10' });
    expect(refused.status).toBe(403);
    expect((refused.body as { detail: string }).detail).toBe(
      'Foreman of own has written this reading. Its writer or a foreman corrects it.',
    );
    const mine = (await logged({ amps: '5.0' })).readings.at(-1)!.id;
    expect((await correct(mine, { amps: '10' }, 'foreman')).status).toBe(200);
  });

  test('what was corrected already is not corrected twice: 409 with the one that stands', async () => {
    bench.server.clock.advance(30 * minute);
    const id = (await logged({ amps: '5.0' })).readings[0]!.id;
    await correct(id, { amps: '10' });
    const again = await correct(id, { amps: '9' });
    expect(again.status).toBe(409);
    expect(again.body).toMatchObject({ code: 'corrected_already', present: { amps: 10, source: 'typed' } });
    // As the charge shows it, not as it is stored.
    expect((again.body as { present: object }).present).not.toHaveProperty('workshopId');
  });

  test('a reading of nowhere is 404', async () => {
    expect((await correct('nothing', { amps: '9' })).status).toBe(404);
  });
});
