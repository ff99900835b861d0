import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import type { CheckCode, CheckItemDto } from '@/shared/contract/charge';
import { Channel } from '@/server/entities/channel';
import { act, answered, did, hour, kept, key, makeBench, running, seen, type Bench } from './bench';

let bench: Bench;
beforeEach(async () => {
  bench = await makeBench();
});
afterEach(() => bench.server.close());

const item = (charge: { checks: CheckItemDto[] }, code: CheckCode): CheckItemDto =>
  charge.checks.find((one) => one.code === code)!;
const answer = (id: string, code: CheckCode, given: 'yes' | 'no', note?: string) => {
  bench.server.clock.advance(1);
  return bench
    .as('technician')
    .post(`/api/charges/${id}/checks`, { code, answer: given, note })
    .set('Idempotency-Key', key());
};

describe('the checks before clipping on', () => {
  test('seven in their order; nothing is preselected but what the numbers answer', async () => {
    const charge = await kept(bench, { spareId: await bench.spare('S-0417', [3.612, 3.606]) });
    expect(charge.checks.map((one) => one.code)).toEqual([
      'isolation',
      'polarity',
      'condition',
      'temperature',
      'ceiling',
      'ventilation',
      'attendance',
    ]);
    expect(charge.checks.filter((one) => one.answer !== null).map((one) => one.code)).toEqual(['temperature']);
    expect(charge.startBlockedBy).toBe('6 answers still to come. What the readings rule out is locked.');
  });

  test('temperature is answered by the reading of 10:00 and locked', async () => {
    const charge = await kept(bench, { spareId: await bench.spare('S-0417') });
    expect(item(charge, 'temperature')).toMatchObject({
      by: 'data',
      question: '21\u00a0°C, allowed 10–45\u00a0°C',
      detail: 'Answered from the reading at 10:00 by Technician of own. Locked.',
      answeredBy: { id: 'own-technician' },
      answeredAt: new Date(bench.server.clock.now() - 1).toISOString(),
    });
    const locked = await answer(charge.id, 'temperature', 'yes');
    expect(locked.status).toBe(422);
    expect(locked.body).toMatchObject({ code: 'locked' });
  });

  test('a module read at 7 °C meanwhile is ruled out, and cannot be ticked away', async () => {
    const spareId = await bench.spare('S-0417');
    const charge = await answered(bench, await kept(bench, { spareId }));
    expect(charge.startBlockedBy).toBeNull();
    bench.server.clock.advance(60_000);
    await bench
      .as('technician')
      .post(`/api/spares/${spareId}/readings`, { groupVolts: [3.802, 3.802], celsius: 7, meterId: null });
    const cold = await seen(bench, charge.id);
    expect(item(cold, 'temperature').by).toBe('ruled-out');
    expect(cold.startBlockedBy).toContain('7\u00a0°C');
    expect(cold.startBlockedBy).toContain('That cannot be ticked away.');
    const refused = await act(bench, cold, 'start');
    expect(refused.status).toBe(422);
    expect(refused.body).toMatchObject({ code: 'ruled_out' });
    expect((await seen(bench, charge.id)).stage).toBe('planned');
    expect(cold.startBlockedBy).toContain('Warm it to 10\u00a0°C first. Then read it again.');
    bench.server.clock.advance(3 * hour);
    await bench
      .as('technician')
      .post(`/api/spares/${spareId}/readings`, { groupVolts: [3.802, 3.803], celsius: 15, meterId: null });
    const warm = await seen(bench, charge.id);
    expect(item(warm, 'temperature')).toMatchObject({ by: 'data', question: '15\u00a0°C, allowed 10–45\u00a0°C' });
    expect((await did(bench, warm, 'start')).stage).toBe('charging');
  });

  test('a reading of the day before does not answer for today: a person is asked', async () => {
    const charge = await kept(bench, { spareId: await bench.spare('S-0417') });
    bench.server.clock.advance(24 * hour);
    expect(item(await seen(bench, charge.id), 'temperature')).toMatchObject({
      by: 'person',
      answer: null,
      question: 'Is the module at 10–45\u00a0°C?',
    });
  });

  test('what was answered over 12 h ago is asked again, but set voltage and fan; the old answers stay in the history', async () => {
    const charge = await answered(bench, await kept(bench, { spareId: await bench.spare('S-0417') }));
    bench.server.clock.advance(12 * hour - 60_000);
    expect((await seen(bench, charge.id)).startBlockedBy).toBeNull();
    bench.server.clock.advance(2 * 60_000);
    const later = await seen(bench, charge.id);
    expect(later.checks.filter((one) => one.answer === null).map((one) => one.code)).toEqual([
      'isolation',
      'polarity',
      'condition',
      'temperature',
      'attendance',
    ]);
    expect(item(later, 'condition')).toMatchObject({ by: 'person', answeredBy: null, answeredAt: null });
    expect(item(later, 'condition').detail).toMatch(/ answered 10:00, over 12\u00a0h ago: look again\.$/);
    expect((await act(bench, later, 'start')).body).toMatchObject({ code: 'checks_open' });
    const again = await answered(bench, later);
    expect(again.startBlockedBy).toBeNull();
    expect(item(again, 'condition').detail).not.toContain('look again');
    const said = again.events.filter((event) => event.text.startsWith('Condition'));
    expect(said.map((event) => event.text)).toEqual([
      'Condition: no swelling, leak or dent.',
      'Condition: no swelling, leak or dent.',
    ]);
    const started = await did(bench, again, 'start');
    bench.server.clock.advance(13 * hour);
    const after = await seen(bench, started.id);
    expect(after.checks.every((one) => one.answer === 'yes')).toBe(true);
  });

  test('polarity names the volts the meter must show: 3.612 V and 3.606 V make 7.218 V', async () => {
    const charge = await kept(bench, { spareId: await bench.spare('S-0417', [3.612, 3.606]) });
    expect(item(charge, 'polarity').yes).toBe('Red on plus, 7.218\u00a0V');
  });

  test('the set voltage asked for keeps a forgotten charge under the limit of 8.40 V', async () => {
    const charge = await kept(bench, { spareId: await bench.spare('S-0417') });
    const ceiling = item(charge, 'ceiling');
    expect(ceiling.question).toBe('What does A1 show as set voltage?');
    expect(ceiling.detail).toContain("The module's limit is 8.40\u00a0V.");
    const asked = Number(/^([\d.]+)\u00a0V or less$/.exec(ceiling.yes)?.[1]);
    expect(asked).toBeGreaterThan(2 * 3.949);
    expect(asked).toBeLessThanOrEqual(8.4);
    expect(asked).toBeLessThanOrEqual(charge.option.setVoltsCap!);
  });

  test('look-ins are named at their times: clip on at 10:05, so 11:05 and so on', async () => {
    const charge = await kept(bench, { spareId: await bench.spare('S-0417') });
    expect(item(charge, 'attendance').detail).toBe('Look-ins 11:05 and 12:05.');
  });

  test('no blocks with its sentence until it is changed; the old answer stays in the log', async () => {
    const charge = await answered(bench, await kept(bench, { spareId: await bench.spare('S-0417') }));
    const denied = (await answer(charge.id, 'ventilation', 'no', 'fan is at bench 4')).body as typeof charge;
    expect(denied.startBlockedBy).toBe('Ventilation: “Not yet”. Put it right, then change the answer.');
    expect((await act(bench, denied, 'start')).body).toMatchObject({ code: 'ruled_out' });
    const changed = (await answer(charge.id, 'ventilation', 'yes')).body as typeof charge;
    expect(changed.startBlockedBy).toBeNull();
    const said = changed.events.filter((event) => event.text.startsWith('Ventilation'));
    expect(said.map((event) => event.text)).toEqual([
      'Ventilation: fan on, module clear.',
      'Ventilation: not yet, fan is at bench 4. Before: fan on, module clear.',
      'Ventilation: fan on, module clear. Before: not yet.',
    ]);
  });

  test('who answered and when is kept with the charge', async () => {
    const charge = await kept(bench, { spareId: await bench.spare('S-0417') });
    bench.server.clock.advance(3 * 60_000);
    const at = bench.server.clock.now();
    const after = (await answer(charge.id, 'isolation', 'yes', 'meter of bench 2')).body as typeof charge;
    expect(item(after, 'isolation')).toMatchObject({
      answer: 'yes',
      answeredBy: { id: 'own-technician' },
      answeredAt: new Date(at + 1).toISOString(),
      note: 'meter of bench 2',
    });
  });

  test('a spare set aside after the plan is ruled out at the condition', async () => {
    const spareId = await bench.spare('S-0417');
    const charge = await answered(bench, await kept(bench, { spareId }));
    // The stock refuses a quarantine on a charge, so the state is set where another process would have left it.
    await bench.server.deps.dataSource.query(
      `UPDATE spare SET quarantined_at = 1, quarantine_reason = 'dropped' WHERE id = ?`,
      [spareId],
    );
    const now = await seen(bench, charge.id);
    expect(item(now, 'condition')).toMatchObject({ by: 'ruled-out' });
    expect(now.startBlockedBy).toContain('quarantine: dropped');
  });

  test('a channel that was made fixed at 9 V after the plan is ruled out by the cap', async () => {
    const charge = await answered(bench, await kept(bench, { spareId: await bench.spare('S-0417') }));
    await bench.server.deps.dataSource.manager.update(
      Channel,
      { id: bench.channels.A1 },
      { adjustableVolts: false, maxVolts: 9 },
    );
    const now = await seen(bench, charge.id);
    expect(item(now, 'ceiling')).toMatchObject({ by: 'ruled-out' });
    expect(now.startBlockedBy).toContain('A1 gives 9.00\u00a0V and cannot be set lower.');
  });

  test('a trim channel that was changed after the plan is looked at before the bulk begins', async () => {
    const wish = { spareId: await bench.spare('S-0417', [3.802, 3.87]) };
    const charge = await answered(bench, await kept(bench, wish));
    expect(charge.option.steps.map((step) => [step.kind, step.channelIds[0]])).toEqual([
      ['bulk', bench.channels.A1],
      ['trim', bench.channels.B1],
    ]);
    const trim = charge.option.steps[1]!;
    expect(trim.direction).toBe('charge');
    const change = (patch: Partial<Channel>) =>
      bench.server.deps.dataSource.manager.update(Channel, { id: bench.channels.B1 }, patch);
    await change({ adjustableVolts: false, maxVolts: 5 });
    const fixed = await seen(bench, charge.id);
    expect(item(fixed, 'ceiling')).toMatchObject({ by: 'ruled-out' });
    const group = trim.groupIndexes[0]! + 1;
    expect(fixed.startBlockedBy).toMatch(
      new RegExp(
        `^B1 gives 5\\.00\u00a0V and cannot be set lower\\. Group ${group} takes [34]\\.\\d\\d\u00a0V from it at most\\.`,
      ),
    );
    expect((await act(bench, fixed, 'start')).body).toMatchObject({ code: 'ruled_out' });
    await change({ adjustableVolts: true, maxVolts: 60, retired: true });
    expect((await seen(bench, charge.id)).startBlockedBy).toContain('B1 is out of use.');
    await change({ retired: false });
    expect((await seen(bench, charge.id)).startBlockedBy).toBeNull();
  });

  test('an open answer keeps the timer from starting: 422 with the present checks', async () => {
    const charge = await kept(bench, { spareId: await bench.spare('S-0417') });
    const refused = await act(bench, charge, 'start');
    expect(refused.status).toBe(422);
    expect(refused.body).toMatchObject({ code: 'checks_open' });
    expect((refused.body as { present: CheckItemDto[] }).present).toHaveLength(7);
  });

  test('after the start the checks are closed and show what was known then', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-0417') });
    bench.server.clock.advance(24 * hour);
    const temperature = item(await seen(bench, charge.id), 'temperature');
    expect(temperature).toMatchObject({
      by: 'data',
      question: '21\u00a0°C, allowed 10–45\u00a0°C',
      answeredBy: { id: 'own-technician' },
    });
    // The reading of 10:00 the day before, not the start.
    expect(temperature.detail).toMatch(
      /^Answered from the reading at [A-Z][a-z]{2} 10:00 by Technician of own\. Locked\.$/,
    );
    expect((await answer(charge.id, 'isolation', 'no')).body).toMatchObject({ code: 'wrong_stage' });
  });

  test('an unknown check is refused with its sentence at the field', async () => {
    const charge = await kept(bench, { spareId: await bench.spare('S-0417') });
    const refused = await bench
      .as('technician')
      .post(`/api/charges/${charge.id}/checks`, { code: 'luck', answer: 'yes' })
      .set('Idempotency-Key', key());
    expect(refused.status).toBe(400);
    expect((refused.body as { fields: object }).fields).toHaveProperty('code');
  });
});

test('a start needs the right revision and a key', async () => {
  const charge = await answered(bench, await kept(bench, { spareId: await bench.spare('S-0417') }));
  const agent = bench.as('technician');
  await agent.post(`/api/charges/${charge.id}/start`).set('Idempotency-Key', 'start-me-now').expect(428);
  await agent.post(`/api/charges/${charge.id}/start`).set('If-Match', `"${charge.rev}"`).expect(400);
  const old = await agent
    .post(`/api/charges/${charge.id}/start`)
    .set('If-Match', '"1"')
    .set('Idempotency-Key', 'start-me-now');
  expect(old.status).toBe(412);
  expect((old.body as { present: { rev: number } }).present.rev).toBe(charge.rev);
  const started = await did(bench, charge, 'start');
  expect(started.stage).toBe('charging');
});
