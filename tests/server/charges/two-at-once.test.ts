import { afterEach, beforeEach, expect, test } from 'vitest';
import type { ChargeDto } from '@/shared/contract/charge';
import { ChargeEvent } from '@/server/entities/charge-event';
import { ChannelHold } from '@/server/entities/channel-hold';
import { RunStretch } from '@/server/entities/run-stretch';
import {
  act,
  answered,
  at,
  boardOf,
  did,
  kept,
  key,
  makeBench,
  minute,
  planned,
  running,
  seen,
  wishOf,
  type Bench,
} from './bench';

let bench: Bench;
beforeEach(async () => {
  bench = await makeBench();
});
afterEach(() => bench.server.close());

test('of 50 that start the same charge at once exactly one does; the others are told with the present charge', async () => {
  const charge = await answered(bench, await kept(bench, { spareId: await bench.spare('S-0001') }));
  const answers = await Promise.all(Array.from({ length: 50 }, () => act(bench, charge, 'start')));
  expect(answers.filter((answer) => answer.status === 200)).toHaveLength(1);
  const lost = answers.filter((answer) => answer.status === 412);
  expect(lost).toHaveLength(49);
  for (const answer of lost)
    expect(answer.body).toMatchObject({ code: 'stale', present: { id: charge.id, stage: 'charging' } });
  const runs = await bench.server.deps.dataSource.manager.countBy(RunStretch, { chargeId: charge.id });
  expect(runs).toBe(1);
});

test('of 50 charges that start on one channel at once exactly one does; the others are told who has it', async () => {
  const charges: ChargeDto[] = [];
  for (let count = 1; count <= 50; count += 1)
    charges.push(await answered(bench, await kept(bench, { spareId: await bench.spare(`S-${1000 + count}`) })));
  const answers = await Promise.all(charges.map((charge) => act(bench, charge, 'start')));
  const won = answers.filter((answer) => answer.status === 200);
  expect(won).toHaveLength(1);
  const winner = won[0]!.body as ChargeDto;
  for (const answer of answers.filter((one) => one.status !== 200)) {
    expect(answer.status).toBe(409);
    expect(answer.body).toMatchObject({ code: 'channel_taken', present: { chargeId: winner.id, channelName: 'A1' } });
  }
  const runningHolds = await bench.server.deps.dataSource.manager.countBy(ChannelHold, { state: 'running' });
  expect(runningHolds).toBe(1);
  const stages = (await boardOf(bench)).charges.map((card) => card.stage);
  expect(stages.filter((stage) => stage === 'charging')).toHaveLength(1);
  expect(stages.filter((stage) => stage === 'planned')).toHaveLength(49);
}, 120_000);

test('a start that a lost connection repeats under its key is done once and answered the same', async () => {
  const charge = await answered(bench, await kept(bench, { spareId: await bench.spare('S-0001') }));
  const send = () =>
    bench
      .as('technician')
      .post(`/api/charges/${charge.id}/start`)
      .set('If-Match', `"${charge.rev}"`)
      .set('Idempotency-Key', 'the-same-start');
  const first = await send();
  bench.server.clock.advance(5_000);
  const again = await send();
  expect([first.status, again.status]).toEqual([200, 200]);
  expect((again.body as ChargeDto).startedAt).toBe((first.body as ChargeDto).startedAt);
});

test.each([
  ['hold', { reason: 'The lift is needed' }],
  ['stop', { reason: 'The lift is needed' }],
  ['current-off', {}],
  ['look-ins', { note: 'cool' }],
])(
  '%s whose answer was lost is done once when it is pressed again, and answered as the first time',
  async (what, body) => {
    const charge = await running(bench, { spareId: await bench.spare('S-0001') });
    const send = () =>
      bench
        .as('technician')
        .post(`/api/charges/${charge.id}/${what}`, body)
        .set('If-Match', `"${charge.rev}"`)
        .set('Idempotency-Key', `the-same-${what}`);
    const first = await send();
    expect(first.status, JSON.stringify(first.body)).toBe(200);
    bench.server.clock.advance(5_000);
    const again = await send();
    expect(again.status, JSON.stringify(again.body)).toBe(200);
    expect(again.body).toEqual(first.body);
    expect((await seen(bench, charge.id)).events).toEqual((first.body as ChargeDto).events);
  },
);

test('hold and stop at once: one wins, the other sees what it became', async () => {
  const charge = await running(bench, { spareId: await bench.spare('S-0001') });
  const [hold, stop] = await Promise.all([
    act(bench, charge, 'hold', { reason: 'look' }),
    act(bench, charge, 'stop', { reason: 'smell' }, 'foreman'),
  ]);
  const statuses = [hold.status, stop.status].sort();
  expect(statuses).toEqual([200, 412]);
  const loser = hold.status === 412 ? hold : stop;
  const winner = hold.status === 412 ? stop : hold;
  expect((loser.body as { present: ChargeDto }).present.stage).toBe((winner.body as ChargeDto).stage);
});

const detail = (answer: { body: unknown }) => (answer.body as { detail: string; changed?: object }).detail;
const changed = (answer: { body: unknown }) => (answer.body as { changed?: object }).changed;

test('who comes too late is told who won and when, in the workshop’s time, with the present state', async () => {
  const charge = await running(bench, { spareId: await bench.spare('S-0001'), repairRef: 'R-1' });
  bench.server.clock.advance(32 * minute);
  const held = await did(bench, charge, 'hold', { reason: 'The lift is needed' }, 'foreman');
  // The clock of the tests begins at 10:00 in Berlin.
  const stale = await act(bench, charge, 'stop', { reason: 'smell' });
  expect(stale.status).toBe(412);
  expect(detail(stale)).toBe('Foreman of own held it at 10:32; this is how it stands now.');
  expect(changed(stale)).toEqual({
    by: { id: bench.server.own.people.foreman.id, name: 'Foreman of own' },
    at: held.heldAt,
    did: 'held it',
  });
  // Who has taken an alert since has not changed the charge.
  await bench.server.deps.dataSource.manager.insert(ChargeEvent, {
    ...{ id: 'alert-taken', workshopId: bench.server.own.id, chargeId: charge.id, kind: 'alert' },
    ...{ personId: bench.server.own.people.manager.id, text: 'Has it.' },
    ...{ at: bench.server.clock.now(), createdAt: bench.server.clock.now() },
  });
  // The same person on another phone is told as such.
  expect(detail(await act(bench, charge, 'stop', { reason: 'smell' }, 'foreman'))).toBe(
    'You held it at 10:32; this is how it stands now.',
  );
  // An act without a revision, and one that does not fit the stage, hear it too.
  const late = await bench
    .as('technician')
    .post(`/api/charges/${charge.id}/checks`, { code: 'isolation', answer: 'no' })
    .set('Idempotency-Key', key());
  expect(late.status).toBe(409);
  expect(detail(late)).toBe('R-1 is held. Its checks are closed. Foreman of own held it at 10:32.');
  expect(changed(late)).toMatchObject({ did: 'held it' });
});

test('what the clock has done is told as the clock’s; what follows from a person’s act is told as that person’s', async () => {
  const charge = await running(bench, { spareId: await bench.spare('S-0001'), repairRef: 'R-1' });
  await bench.live(at(charge.currentEndAt) - bench.server.clock.now() + 10 * minute);
  const byClock = await act(bench, charge, 'hold', { reason: 'late' });
  expect(byClock.status).toBe(412);
  expect(detail(byClock)).toMatch(/^It went on by the clock at \d\d:\d\d; this is how it stands now\.$/);
  expect(changed(byClock)).toMatchObject({ by: null });
  // The end of current that somebody says brings the rest with it, in the same write.
  const second = await running(bench, { spareId: await bench.spare('S-0002') }, { channel: 'B1' });
  await did(bench, second, 'current-off', {}, 'foreman');
  expect((await seen(bench, second.id)).events.at(-1)?.kind).toBe('resting');
  expect(detail(await act(bench, second, 'hold', { reason: 'late' }))).toMatch(/^Foreman of own switched it off at /);
});

test('who finds spare or channel taken is told by whom and since when', async () => {
  const spareId = await bench.spare('S-0001');
  const wish = { spareId, repairRef: 'R-1' };
  const option = await planned(bench, wish);
  await running(bench, wish);
  bench.server.clock.advance(5 * minute);
  const spare = await bench
    .as('foreman')
    .post('/api/charges', { ...wishOf(bench, wish), optionId: option.id })
    .set('Idempotency-Key', key());
  expect(spare.status).toBe(409);
  expect(detail(spare)).toMatch(/^This spare is on R-1 already\. .* Technician of own planned it at 10:00\.$/);
  const second = await answered(bench, await kept(bench, { spareId: await bench.spare('S-0002') }, {}, 'foreman'));
  const channel = await act(bench, second, 'start', {}, 'foreman');
  expect(channel.status).toBe(409);
  expect(detail(channel)).toMatch(/^A1 is taken by R-1\. .* Technician of own started it at 10:00\.$/);
  expect(changed(channel)).toMatchObject({ by: { name: 'Technician of own' }, did: 'started it' });
});

test('40 writes of all kinds at once on 8 charges end with every row in place and the board counted up by each', async () => {
  const channels = Array.from({ length: 8 }, (_, index) => ({ name: `D${index + 1}` }));
  const wide = await makeBench({ channels });
  try {
    const charges: ChargeDto[] = [];
    for (let index = 0; index < 8; index += 1)
      charges.push(await running(wide, { spareId: await wide.spare(`S-${index}`) }, { channel: `D${index + 1}` }));
    const before = (await boardOf(wide)).rev;
    wide.server.clock.advance(20 * minute);
    const writes = charges.flatMap((charge) => [
      wide.as('technician').post(`/api/charges/${charge.id}/readings`, { amps: '10' }).set('Idempotency-Key', key()),
      wide.as('foreman').post(`/api/charges/${charge.id}/readings`, { celsius: '23' }).set('Idempotency-Key', key()),
      wide.as('technician').post(`/api/charges/${charge.id}/look-ins`, {}).set('Idempotency-Key', key()),
      wide.as('foreman').post(`/api/charges/${charge.id}/look-ins`, { note: 'cool' }).set('Idempotency-Key', key()),
      wide.as('technician').post(`/api/charges/${charge.id}/readings`, { amps: 'x' }).set('Idempotency-Key', key()),
    ]);
    const answers = await Promise.all(writes);
    expect(answers.filter((answer) => answer.status === 200)).toHaveLength(32);
    expect(answers.filter((answer) => answer.status === 400)).toHaveLength(8);
    for (const charge of charges) {
      const now = await seen(wide, charge.id);
      expect(now.readings).toHaveLength(2);
      expect(now.events.filter((event) => event.kind === 'look-in')).toHaveLength(2);
    }
    expect((await boardOf(wide)).rev).toBe(before + 32);
  } finally {
    await wide.server.close();
  }
});

test('who clips on where another charge rests has taken its clips off: its end of current is settled', async () => {
  const first = await running(bench, { spareId: await bench.spare('S-0001'), repairRef: 'R-1' });
  await bench.live(at(first.currentEndAt) - bench.server.clock.now() + 10 * minute);
  expect((await seen(bench, first.id)).stage).toBe('resting');
  await running(bench, { spareId: await bench.spare('S-0002'), repairRef: 'R-2' });
  await bench.sleeper.runDue();
  const resting = await seen(bench, first.id);
  expect(resting.nextHand).toBeNull();
  expect(resting.events.map((event) => event.text)).toContain('R-2 was clipped on to A1, so its current is off.');
  // A late reading cannot take the channel back.
  const late = new Date(at(first.startedAt) + 5 * minute).toISOString();
  const answer = await bench
    .as('technician')
    .post(`/api/charges/${first.id}/readings`, { amps: '2', at: late })
    .set('Idempotency-Key', key());
  expect(answer.status).toBe(200);
  expect((answer.body as ChargeDto).stage).toBe('resting');
});

test('a planned charge cannot start while another runs on its channel, and can as soon as that one is stopped', async () => {
  const first = await running(bench, { spareId: await bench.spare('S-0001'), repairRef: 'R-1' });
  const second = await answered(bench, await kept(bench, { spareId: await bench.spare('S-0002') }));
  expect(second.startBlockedBy).toBe('A1 is taken by R-1. Wait until it is free, or plan on another channel.');
  expect((await act(bench, second, 'start')).status).toBe(409);
  await did(bench, first, 'stop', { reason: 'The channel is needed' });
  expect((await did(bench, await seen(bench, second.id), 'start')).stage).toBe('charging');
});
