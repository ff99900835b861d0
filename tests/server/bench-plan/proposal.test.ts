import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { BenchChangeDto } from '@/shared/contract/bench-plan';
import type { ProblemDto } from '@/shared/contract/common';
import { answered, at, did, hour, makeBench, minute, running, seen, type Bench } from '../charges/bench';
import { clock, hoursOf, onlyTwoWork, placeOf, planOf, proposalOf, queued, sent, timeOf } from './day';

/*
 * By hand: 60 Ah a group from 26.97 % to 58.26 % are 18.77 Ah, at 10 A 1 h 53 of current. With 5 min to clip on, an hour of
 * rest and 5 min to check a charge is ready about 3 h 03 after its clip-on, and has its channel for 1 h 58.
 */
describe('a proposal on one channel of 10 A', () => {
  let bench: Bench;
  beforeEach(async () => {
    bench = await makeBench({ channels: [{ name: 'A1' }] });
    await onlyTwoWork(bench);
  });
  afterEach(() => bench.server.close());

  const twoInTheWrongOrder = async () => {
    const first = await queued(bench, { spareId: await bench.spare('S-1'), repairRef: 'R-1' }, 'A1', clock('10:10'));
    const wish = { spareId: await bench.spare('S-2'), repairRef: 'R-2', readyBy: clock('14:00') };
    return { first, second: await queued(bench, wish, 'A1', clock('12:15')) };
  };

  it('puts the one that is due first first, and says what comes of both', async () => {
    const { first, second } = await twoInTheWrongOrder();
    const found = (await proposalOf(bench))!;
    expect(found.moves.map(({ chargeId }) => chargeId)).toEqual([second.id, first.id]);
    const [due, other] = found.moves;
    expect(timeOf(due!.now.clipOnAt)).toBe('12:15');
    expect(timeOf(due!.then.clipOnAt)).toBe('10:01');
    expect(Date.parse(due!.then.ready.late)).toBeLessThan(Date.parse(clock('14:00')));
    expect(due!.text).toMatch(/^R-2 ready 2\u00a0h\u00a015 sooner, on time$/);
    expect(other!.text).toMatch(/^R-1 ready 1\u00a0h\u00a0[45]\d later$/);
    // Not before the first has let go of the channel: 10:01 and 1 h 58.
    expect(timeOf(other!.then.clipOnAt)).toMatch(/^11:5\d|12:0[0-5]$/);
    expect(found.because).toMatch(/^R-2 misses its time by 1\u00a0h\u00a0\d\d as planned\.$/);
    expect(found.lateMinutes.then).toBe(0);
    // Planned for 12:15 its 90 % lie about 1 h 20 after 14:00.
    expect(found.lateMinutes.now).toBeGreaterThan(70);
    expect(found.lateMinutes.now).toBeLessThan(100);
    expect(found.proved).toBe(true);
  });

  it('is none where the order is right', async () => {
    await queued(
      bench,
      { spareId: await bench.spare('S-1'), repairRef: 'R-1', readyBy: clock('14:00') },
      'A1',
      clock('10:10'),
    );
    await queued(bench, { spareId: await bench.spare('S-2'), repairRef: 'R-2' }, 'A1', clock('12:15'));
    expect(await proposalOf(bench)).toBeNull();
  });

  it('taken is carried out as it was shown, and undone it all stands where it stood', async () => {
    const { first, second } = await twoInTheWrongOrder();
    const found = (await proposalOf(bench))!;
    const answer = await sent(bench, 'accept', { proposalId: found.id });
    expect(answer.status, JSON.stringify(answer.body)).toBe(200);
    const change = answer.body as BenchChangeDto;
    expect(change.text).toMatch(/^R-2 from A1 at 12:15 to A1 at 10:01; R-1 from A1 at 10:10 to A1 at 1[12]:\d\d$/);
    expect(change.lastingBecause).toBeNull();
    for (const move of found.moves) {
      const charge = await seen(bench, move.chargeId);
      expect(charge.clipOnAt).toBe(move.then.clipOnAt);
      // Planned whole, with the same draws: the same band to the second.
      expect(Math.abs(at(charge.plannedReady.late) - at(move.then.ready.late))).toBeLessThan(1000);
      expect(charge.events.at(-1)!.text).toMatch(/^Moved from A1 at 1\d:\d\d to A1 at 1\d:\d\d: ready 1\d:\d\d\.$/);
    }
    expect(await proposalOf(bench)).toBeNull();
    expect((await planOf(bench)).lastChange).toMatchObject({ id: change.id, lastingBecause: null });

    const undone = await sent(bench, `undo/${change.id}`);
    expect(undone.status, JSON.stringify(undone.body)).toBe(200);
    for (const before of [first, second]) {
      const { clipOnAt, plannedReady, option, stage } = await seen(bench, before.id);
      expect({ clipOnAt, plannedReady, option, stage }).toEqual({
        clipOnAt: before.clipOnAt,
        plannedReady: before.plannedReady,
        option: before.option,
        stage: before.stage,
      });
    }
    expect((await planOf(bench)).lastChange).toBeNull();
    expect((await sent(bench, `undo/${change.id}`)).status).toBe(409);
  });

  it('whose charge was changed meanwhile is refused with the proposal that holds now', async () => {
    const { second } = await twoInTheWrongOrder();
    const found = (await proposalOf(bench))!;
    await answered(bench, await seen(bench, second.id));
    const answer = await sent(bench, 'accept', { proposalId: found.id });
    expect(answer.status).toBe(412);
    const present = (answer.body as ProblemDto).present as { proposal: { id: string; moves: { rev: number }[] } };
    expect(present.proposal.id).not.toBe(found.id);
    expect((await sent(bench, 'accept', { proposalId: present.proposal.id })).status).toBe(200);
  });

  it('nobody was shown is refused the same way', async () => {
    const answer = await sent(bench, 'accept', { proposalId: 'made-up' });
    expect(answer.status).toBe(412);
    expect((answer.body as ProblemDto).present).toEqual({ proposal: null });
  });

  it('cannot be undone once one of its charges was touched', async () => {
    await twoInTheWrongOrder();
    const found = (await proposalOf(bench))!;
    const change = (await sent(bench, 'accept', { proposalId: found.id })).body as BenchChangeDto;
    const moved = await seen(bench, found.moves[0]!.chargeId);
    await did(bench, await answered(bench, moved), 'start');
    const answer = await sent(bench, `undo/${change.id}`);
    expect(answer.status).toBe(409);
    expect((answer.body as ProblemDto).detail).toBe('This cannot be undone. R-2 is begun.');
    expect((await planOf(bench)).lastChange!.lastingBecause).toBe('R-2 is begun.');
  });
});

describe('a proposal on two channels', () => {
  let bench: Bench;
  beforeEach(async () => {
    bench = await makeBench({ channels: [{ name: 'A1' }, { name: 'B1' }] });
    await onlyTwoWork(bench);
  });
  afterEach(() => bench.server.close());

  it('moves the one charge that has to move, and leaves the four others as they are', async () => {
    // Four without a due time, two after two; the fifth, third on A1, is due at 15:30 and ready about 17:20.
    for (const [ref, channel, at] of [
      ['R-1', 'A1', '10:05'],
      ['R-2', 'B1', '10:05'],
      ['R-3', 'A1', '12:15'],
      ['R-4', 'B1', '14:15'],
    ] as const)
      await queued(bench, { spareId: await bench.spare(ref), repairRef: ref }, channel, clock(at));
    const wish = { spareId: await bench.spare('R-5'), repairRef: 'R-5', readyBy: clock('15:45') };
    const late = await queued(bench, wish, 'A1', clock('14:20'));
    const found = (await proposalOf(bench))!;
    // B1 is free from 12:03 to 14:15: 1 h 58 go into that, and it is ready about 15:08.
    expect(found.moves.map(({ chargeId }) => chargeId)).toEqual([late.id]);
    expect(found.moves[0]!.then).toMatchObject({ channelNames: ['B1'], lateByMinutes: 0 });
    expect(found.asTheyAre).toEqual(['R-1', 'R-2', 'R-3', 'R-4'].map((ref) => `${ref} as it is`));
    expect(found.lateMinutes.then).toBe(0);
  });

  it('says of a charge that no shift is long enough for it, and plans the others around it', async () => {
    const shift = Array.from({ length: 7 }, () => ({ from: '10:00', to: '13:00' }));
    const { people } = bench.server.own;
    for (const { id } of [people.technician, people.foreman]) await hoursOf(bench, id, { hours: shift });
    // From 3.6 V it takes more than twice the charge: over 3 h of current, and nobody is there for longer than 3 h.
    const far = await queued(
      bench,
      { spareId: await bench.spare('S-1', [3.6, 3.6]), repairRef: 'R-1' },
      'A1',
      clock('10:05'),
    );
    expect(far.option.currentEndS).toBeGreaterThan(3 * 3600);
    const wish = { spareId: await bench.spare('S-2'), repairRef: 'R-2', readyBy: clock('14:00') };
    const near = await queued(bench, wish, 'A1', clock('10:05'));
    const found = (await proposalOf(bench))!;
    expect(found.unplaced).toHaveLength(1);
    expect(found.unplaced[0]!.title).toBe('R-1');
    expect(found.unplaced[0]!.because).toMatch(
      /^Its current takes 3\u00a0h\u00a0\d\d, longer than anybody is there at a stretch\./,
    );
    expect(found.moves.map(({ chargeId, then }) => [chargeId, then.channelNames])).toEqual([[near.id, ['B1']]]);
    expect((await sent(bench, 'accept', { proposalId: found.id })).status).toBe(200);
  });
});

describe('a proposal where the bench has changed', () => {
  let bench: Bench;
  afterEach(() => bench.server.close());

  it('moves what waits behind a late charge, and names it with its minutes', async () => {
    bench = await makeBench({ channels: [{ name: 'A1' }, { name: 'B1' }] });
    await onlyTwoWork(bench);
    const late = await running(bench, { spareId: await bench.spare('S-1'), repairRef: 'R-1' });
    await running(bench, { spareId: await bench.spare('S-3'), repairRef: 'R-3' }, { channel: 'B1' });
    // Both channels are free about 11:58; on either it is ready about 15:08.
    const wish = { spareId: await bench.spare('S-2'), repairRef: 'R-2', readyBy: clock('15:45') };
    const waiting = await queued(bench, wish, 'A1', clock('12:05'));
    expect(await proposalOf(bench)).toBeNull();
    // Held for an hour, its current ends an hour later.
    await bench.pass(20 * minute);
    const held = await did(bench, await seen(bench, late.id), 'hold', { reason: 'A clip was warm' });
    await bench.pass(hour);
    await did(bench, await seen(bench, held.id), 'resume');
    const found = (await proposalOf(bench))!;
    expect(found.because).toMatch(/^R-1 is (5\d|6\d)\u00a0min late on A1\.|^R-1 is 1\u00a0h\u00a00[05] late on A1\.$/);
    expect(found.moves).toHaveLength(1);
    expect(found.moves[0]).toMatchObject({ chargeId: waiting.id, then: { channelNames: ['B1'], lateByMinutes: 0 } });
    expect((await sent(bench, 'accept', { proposalId: found.id })).status).toBe(200);
    expect((await placeOf(bench, waiting.id)).channels).toEqual(['B1']);
  });

  it('begins nothing that runs on after the last has gone, unless the workshop lets it', async () => {
    bench = await makeBench({ channels: [{ name: 'A1' }], now: Date.parse(clock('14:00')) });
    await onlyTwoWork(bench);
    await running(bench, { spareId: await bench.spare('S-1'), repairRef: 'R-1' });
    // The channel is free about 15:58; 1 h 58 from then it is 17:56, and the last goes at 17:00.
    const wish = { spareId: await bench.spare('S-2'), repairRef: 'R-2' };
    const waiting = await queued(bench, wish, 'A1', clock('16:05'));
    const found = (await proposalOf(bench))!;
    expect(found.moves).toHaveLength(1);
    expect(found.moves[0]!.then.clipOnAt).toBe(clock('08:00', 1));
    expect(found.because).toBe('Nobody is there for R-2 from 16:05 until its current ends.');
    const settings = await bench.as('manager').get('/api/workshop');
    const { rev } = settings.body as { rev: number };
    await bench
      .as('manager')
      .patch('/api/workshop', { unattendedCharges: true })
      .set('If-Match', `"${rev}"`)
      .expect(200);
    expect(await proposalOf(bench)).toBeNull();
    expect((await placeOf(bench, waiting.id)).at).toBe('16:05');
  });
});
