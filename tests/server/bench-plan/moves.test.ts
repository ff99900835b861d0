import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { BenchChangeDto } from '@/shared/contract/bench-plan';
import type { ChargeDto } from '@/shared/contract/charge';
import type { ProblemDto } from '@/shared/contract/common';
import { answered, at, did, hour, kept, makeBench, minute, running, seen, type Bench } from '../charges/bench';
import { clock, onlyTwoWork, placeOf, placesOf, queued, sent, timeOf } from './day';

describe('a move by hand', () => {
  let bench: Bench;
  beforeEach(async () => {
    bench = await makeBench();
    await onlyTwoWork(bench);
  });
  afterEach(() => bench.server.close());

  const moveOf = (charge: ChargeDto, channel: string, clipOnAt: string) =>
    sent(bench, 'move', { chargeId: charge.id, rev: charge.rev, channelId: bench.channels[channel], clipOnAt });
  const detailOf = (answer: { body: unknown }): string => (answer.body as ProblemDto).detail;

  it('plans the charge anew on the other channel: 20 A halve the hours of current', async () => {
    const charge = await queued(bench, { spareId: await bench.spare('S-1'), repairRef: 'R-1' }, 'A1', clock('12:00'));
    const answer = await moveOf(charge, 'B1', clock('12:30'));
    expect(answer.status, JSON.stringify(answer.body)).toBe(200);
    expect((answer.body as BenchChangeDto).text).toBe('R-1 from A1 at 12:00 to B1 at 12:30');
    const moved = await seen(bench, charge.id);
    expect(moved).toMatchObject({ channelNames: ['B1'], clipOnAt: clock('12:30'), stage: 'queued' });
    // 18.77 Ah at 20 A are 56 min in place of 1 h 53.
    const hoursOf = ({ option }: ChargeDto): number => (option.currentEndS - option.currentStartS) / 3600;
    expect(hoursOf(charge)).toBeCloseTo(1.88, 1);
    expect(hoursOf(moved)).toBeCloseTo(0.94, 1);
    const holds = await bench.server.deps.dataSource.query(
      `SELECT channel_id AS channel, from_at AS fromAt, to_at AS toAt, state FROM channel_hold WHERE charge_id = ?`,
      [charge.id],
    );
    expect(holds).toEqual([
      {
        channel: bench.channels.B1,
        fromAt: Date.parse(clock('12:35')),
        toAt: Date.parse(clock('12:30')) + Math.round(moved.option.steps[0]!.stopS * 1000),
        state: 'reserved',
      },
    ]);
  });

  it('queues what was only planned', async () => {
    const charge = await kept(bench, { spareId: await bench.spare('S-1'), repairRef: 'R-1' }, { channel: 'A1' });
    expect((await moveOf(charge, 'A1', clock('13:00'))).status).toBe(200);
    expect(await placeOf(bench, charge.id)).toEqual({ channels: ['A1'], at: '13:00', stage: 'queued' });
  });

  it('onto a channel that is taken then is refused with by which charge and until when', async () => {
    const runs = await running(bench, { spareId: await bench.spare('S-1'), repairRef: 'R-1' }, { channel: 'A1' });
    await queued(bench, { spareId: await bench.spare('S-2'), repairRef: 'R-2' }, 'A1', clock('12:30'));
    const charge = await queued(bench, { spareId: await bench.spare('S-3'), repairRef: 'R-3' }, 'B1', clock('14:00'));
    const behind = await moveOf(charge, 'A1', clock('11:00'));
    expect(behind.status).toBe(409);
    expect(detailOf(behind)).toBe(
      `A1 is taken by R-1 until ${timeOf(runs.currentEndAt!)}. Choose a later time, or another channel.`,
    );
    expect((behind.body as ProblemDto).present).toMatchObject({ chargeId: runs.id, title: 'R-1' });
    const before = await moveOf(charge, 'A1', clock('12:00'));
    expect(detailOf(before)).toMatch(/^A1 is taken by R-2 until 14:2\d\./);
    expect(await placeOf(bench, charge.id)).toEqual({ channels: ['B1'], at: '14:00', stage: 'queued' });
  });

  it('of one that was changed meanwhile is refused with the charge as it stands', async () => {
    const charge = await queued(bench, { spareId: await bench.spare('S-1'), repairRef: 'R-1' }, 'A1', clock('12:00'));
    const now = await answered(bench, charge);
    const answer = await moveOf(charge, 'B1', clock('12:00'));
    expect(answer.status).toBe(412);
    expect((answer.body as ProblemDto).present).toMatchObject({ id: charge.id, rev: now.rev });
  });

  it('of one that runs is refused', async () => {
    const runs = await running(bench, { spareId: await bench.spare('S-1'), repairRef: 'R-1' }, { channel: 'A1' });
    const answer = await moveOf(runs, 'B1', clock('12:00'));
    expect(answer.status).toBe(409);
    expect(detailOf(answer)).toBe('R-1 is begun: it stays where it is.');
  });

  it('to when nobody is there, or its current would run on alone, is refused with what to change', async () => {
    const charge = await queued(bench, { spareId: await bench.spare('S-1'), repairRef: 'R-1' }, 'A1', clock('12:00'));
    const early = await moveOf(charge, 'A1', clock('07:00', 1));
    expect(early.status).toBe(409);
    expect(detailOf(early)).toBe('Nobody is there to clip on at Wed 07:00. Choose a time within working hours.');
    const late = await moveOf(charge, 'A1', clock('16:00'));
    expect(detailOf(late)).toMatch(/^Its current would run until 17:5\d, and nobody is there to look in until then\./);
    expect((await moveOf(charge, 'B1', clock('15:45'))).status).toBe(200);
  });

  it('to a time that has passed is refused at its field', async () => {
    const charge = await queued(bench, { spareId: await bench.spare('S-1'), repairRef: 'R-1' }, 'A1', clock('12:00'));
    const answer = await moveOf(charge, 'A1', clock('09:00'));
    expect(answer.status).toBe(400);
    expect((answer.body as ProblemDto).fields).toEqual({ clipOnAt: 'This time has passed. Choose a later one.' });
  });

  it('asks anew at the other channel what was answered at the first', async () => {
    const charge = await queued(bench, { spareId: await bench.spare('S-1'), repairRef: 'R-1' }, 'A1', clock('12:00'));
    const checked = await answered(bench, charge);
    const asked = checked.checks.filter(({ by }) => by === 'person');
    expect(asked.every(({ answer }) => answer === 'yes')).toBe(true);
    await moveOf(checked, 'A1', clock('12:30'));
    const later = await seen(bench, charge.id);
    expect(later.checks.filter(({ by }) => by === 'person').every(({ answer }) => answer === 'yes')).toBe(true);
    await moveOf(later, 'B1', clock('12:30'));
    const moved = (await seen(bench, charge.id)).checks.filter(({ by, answer }) => by === 'person' && answer === null);
    expect(moved.map(({ code }) => code)).toEqual(expect.arrayContaining(['isolation', 'polarity', 'attendance']));
    expect(moved.map(({ code }) => code)).not.toContain('condition');
  });

  it('is offered the soonest time of every channel, past what is on it', async () => {
    const runs = await running(bench, { spareId: await bench.spare('S-1'), repairRef: 'R-1' }, { channel: 'A1' });
    const charge = await queued(bench, { spareId: await bench.spare('S-2'), repairRef: 'R-2' }, 'B1', clock('13:00'));
    const { places } = await placesOf(bench, charge.id);
    const on = (name: string) => places.find(({ channelName }) => channelName === name)!;
    expect(Math.abs(at(on('A1').soonest!.clipOnAt) - at(runs.currentEndAt))).toBeLessThan(minute);
    expect(on('B1').soonest).toMatchObject({ clipOnAt: clock('10:01'), lateByMinutes: 0 });
    const answer = await moveOf(charge, 'A1', on('A1').soonest!.clipOnAt);
    expect(answer.status, JSON.stringify(answer.body)).toBe(200);
  });

  it('tells all screens, and the repair’s own log', async () => {
    const charge = await queued(bench, { spareId: await bench.spare('S-1'), repairRef: 'R-1' }, 'A1', clock('12:00'));
    bench.server.hub.told.length = 0;
    await moveOf(charge, 'B1', clock('12:00'));
    for (const event of ['board:changed', 'charge:changed', 'equipment:changed', 'bench:changed'] as const)
      expect(bench.server.hub.of(event).length, event).toBeGreaterThan(0);
  });

  it('is none of another workshop’s charges, changes or channels', async () => {
    const charge = await queued(bench, { spareId: await bench.spare('S-1'), repairRef: 'R-1' }, 'A1', clock('12:00'));
    const change = (await moveOf(charge, 'B1', clock('12:00'))).body as BenchChangeDto;
    const other = bench.server.agentFor('foreman', bench.server.other);
    await other.get(`/api/bench-plan/places?chargeId=${charge.id}`).expect(404);
    const keyed = (path: string, body: object) =>
      other.post(`/api/bench-plan/${path}`, body).set('Idempotency-Key', `other-${path.length}-abcdefgh`);
    await keyed(`undo/${change.id}`, {}).expect(404);
    const input = { chargeId: charge.id, rev: 3, channelId: bench.channels.A1, clipOnAt: clock('13:00') };
    await keyed('move', input).expect(404);
  });

  it('of a held charge’s channel is refused however late', async () => {
    const runs = await running(bench, { spareId: await bench.spare('S-1'), repairRef: 'R-1' }, { channel: 'A1' });
    const charge = await queued(bench, { spareId: await bench.spare('S-2'), repairRef: 'R-2' }, 'B1', clock('13:00'));
    await did(bench, runs, 'hold', { reason: 'A clip was warm' });
    bench.server.clock.advance(hour);
    const answer = await moveOf(charge, 'A1', clock('14:30'));
    expect(answer.status).toBe(409);
    expect(detailOf(answer)).toBe('A1 is taken by R-1, which is held. Resume or stop it to free the channel.');
    const { places } = await placesOf(bench, charge.id);
    expect(places.find(({ channelName }) => channelName === 'A1')).toMatchObject({ soonest: null });
  });
});
