/** What was done at the bench without a connection and comes in later: it counts from when it was done. */
import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import type { ChargeDto } from '@/shared/contract/charge';
import { act, alertsOf, at, did, hour, kept, key, makeBench, minute, running, seen, type Bench } from './bench';

let bench: Bench;
beforeEach(async () => {
  bench = await makeBench();
});
afterEach(() => bench.server.close());

const ago = (ms: number): string => new Date(bench.server.clock.now() - ms).toISOString();
const open = async (charge: ChargeDto, kind: string) =>
  (await alertsOf(bench)).filter((one) => one.chargeId === charge.id && one.kind === kind && one.clearedAt === null);

describe('a look-in that comes late', () => {
  test('counts for the look-in of its own time: made at 61 min, told at 100 min, the one of 60 min is done', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-0001') });
    await bench.live(100 * minute, 5 * minute);
    // 40 min over it is told as missed.
    expect(await open(charge, 'look-in-missed')).toHaveLength(1);
    const visit = ago(39 * minute);
    const told = await did(bench, charge, 'look-ins', { at: visit, note: 'clips cool' });
    expect(told.lookIns[0]).toMatchObject({ doneAt: visit, by: { id: 'own-technician' } });
    expect(at(told.nextLookInAt) - at(told.startedAt)).toBe(120 * minute);
    expect(told.events.find((event) => event.kind === 'look-in')).toMatchObject({
      at: visit,
      text: 'Looked in: clips cool.',
    });
    for (const kind of ['look-in-due', 'look-in-missed'] as const) expect(await open(charge, kind)).toEqual([]);
  });

  test('before the start or in the future is refused at its time', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-0001') });
    await bench.pass(10 * minute);
    for (const instant of [ago(hour), ago(-5 * minute)]) {
      const refused = await act(bench, charge, 'look-ins', { at: instant });
      expect([refused.status, Object.keys((refused.body as { fields: object }).fields)]).toEqual([400, ['at']]);
    }
  });
});

describe('an answer before clipping on that comes late', () => {
  const answer = (charge: ChargeDto, body: object, role: 'technician' | 'foreman' = 'technician') =>
    bench.as(role).post(`/api/charges/${charge.id}/checks`, body).set('Idempotency-Key', key());
  const question = (charge: ChargeDto) => charge.checks.find(({ code }) => code === 'isolation')!.question;

  test('counts from when it was given, and lapses 12 h after that', async () => {
    const charge = await kept(bench, { spareId: await bench.spare('S-0001') });
    await bench.pass(30 * minute);
    const given = ago(20 * minute);
    const taken = await answer(charge, { code: 'isolation', answer: 'yes', at: given, asked: question(charge) });
    expect(taken.status, JSON.stringify(taken.body)).toBe(200);
    const isolation = async () => (await seen(bench, charge.id)).checks.find(({ code }) => code === 'isolation')!;
    expect(await isolation()).toMatchObject({ answer: 'yes', answeredAt: given });
    bench.server.clock.set(Date.parse(given) + 12 * hour + 1);
    expect((await isolation()).answer).toBeNull();
  });

  test('does not go over a later one: 409 with what was answered, by whom and when', async () => {
    const charge = await kept(bench, { spareId: await bench.spare('S-0001') });
    await bench.pass(30 * minute);
    const given = ago(20 * minute);
    expect((await answer(charge, { code: 'isolation', answer: 'no' }, 'foreman')).status).toBe(200);
    const late = await answer(charge, { code: 'isolation', answer: 'yes', at: given, asked: question(charge) });
    expect(late.status).toBe(409);
    expect(late.body).toMatchObject({
      code: 'answered_later',
      detail: 'Foreman of own answered it at 10:30, after yours of 10:10: not yet. Look again, then answer.',
    });
    const after = await seen(bench, charge.id);
    expect(after.checks.find(({ code }) => code === 'isolation')).toMatchObject({ answer: 'no' });
  });

  test('counts for no other question than the one that was read', async () => {
    const spareId = await bench.spare('S-0001');
    const charge = await kept(bench, { spareId });
    const polarity = charge.checks.find(({ code }) => code === 'polarity')!;
    await bench.pass(10 * minute);
    const given = ago(5 * minute);
    await bench
      .as('technician')
      .post(`/api/spares/${spareId}/readings`, { groupVolts: [3.811, 3.811], celsius: 21, meterId: null });
    const late = await answer(charge, { code: 'polarity', answer: 'yes', at: given, asked: polarity.question });
    expect(late.status).toBe(409);
    const now = (await seen(bench, charge.id)).checks.find(({ code }) => code === 'polarity')!;
    expect(now.question).not.toBe(polarity.question);
    expect((late.body as { detail: string }).detail).toContain(now.question);
    expect(now.answer).toBeNull();
  });

  test('sent twice under its key is kept once', async () => {
    const charge = await kept(bench, { spareId: await bench.spare('S-0001') });
    const send = () =>
      bench
        .as('technician')
        .post(`/api/charges/${charge.id}/checks`, { code: 'isolation', answer: 'yes' })
        .set('Idempotency-Key', 'the-same-answer');
    const first = await send();
    bench.server.clock.advance(minute);
    expect((await send()).body).toEqual(first.body);
    expect((await seen(bench, charge.id)).events.filter((event) => event.kind === 'check')).toHaveLength(1);
  });
});

test('a write whose answer was lost is still known 40 days later, though its answer is not: 409, and not done again', async () => {
  const charge = await running(bench, { spareId: await bench.spare('S-0001') });
  const body = { amps: '10', at: ago(0) };
  const reading = () =>
    bench
      .as('technician')
      .post(`/api/charges/${charge.id}/readings`, body)
      .set('Idempotency-Key', 'a-reading-of-long-ago');
  expect((await reading()).status).toBe(200);
  bench.server.clock.advance(40 * 24 * hour);
  // Any other write tidies.
  await kept(bench, { spareId: await bench.spare('S-0002') });
  const again = await reading();
  expect([again.status, (again.body as { code: string }).code]).toEqual([409, 'done_already']);
});
