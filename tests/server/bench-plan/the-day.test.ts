/** The plan of a day that can be worked through by hand: R-1 runs on A1 from 10:00, R-2 is queued on B1 for 13:00. */
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { MyDayDto } from '@/shared/contract/bench-plan';
import type { ChargeDto } from '@/shared/contract/charge';
import { bytesOf } from '@/tests/support/bytes';
import { workForm } from '@/tests/support/benched';
import { readPdf } from '@/tests/support/pdf';
import { at, hour, key, makeBench, minute, running, seen, type Bench } from '../charges/bench';
import { clock, fitsOf, hoursOf, onlyTwoWork, planOf, queued, timeOf } from './day';

let bench: Bench;
let runs: ChargeDto;
let waits: ChargeDto;
beforeEach(async () => {
  bench = await makeBench();
  await onlyTwoWork(bench);
  const { people } = bench.server.own;
  await hoursOf(bench, people.technician.id, { breaks: [{ from: '12:00', to: '12:30' }] });
  runs = await running(bench, { spareId: await bench.spare('S-1'), repairRef: 'R-1' }, { channel: 'A1' });
  waits = await queued(bench, { spareId: await bench.spare('S-2'), repairRef: 'R-2' }, 'B1', clock('13:00'));
});
afterEach(() => bench.server.close());

const technician = () => bench.server.own.people.technician;
const foreman = () => bench.server.own.people.foreman;
const lineOf = async (personId: string) => (await planOf(bench)).people.find(({ person }) => person.id === personId)!;
const minutesOf = ({ from, to }: { from: string; to: string }): number => (at(to) - at(from)) / minute;

describe('the lanes', () => {
  it('hold R-1 on A1 from its start to its reckoned end, and R-2 on B1 from its planned clips; only R-2 may move', async () => {
    const plan = await planOf(bench);
    const chargeOf = (id: string) => plan.charges.find(({ card }) => card.id === id)!;
    const [hold] = chargeOf(runs.id).holds;
    expect(hold).toMatchObject({ channelId: bench.channels.A1, from: runs.startedAt });
    expect(Math.abs(at(hold!.to) - at(runs.currentEndAt))).toBeLessThan(minute);
    expect(chargeOf(runs.id).fixedBecause).toBe('It is clipped on: it stays where it is.');
    expect(chargeOf(waits.id).fixedBecause).toBeNull();
    const [reserved] = chargeOf(waits.id).holds;
    expect([timeOf(reserved!.from), reserved!.channelId]).toEqual(['13:00', bench.channels.B1]);
    expect(plan.counts).toEqual({ charges: 2, late: 0 });
    expect(plan.queue).toMatchObject([{ chargeId: waits.id, channelNames: ['B1'], clipOnAt: clock('13:00') }]);
    expect(plan.open).toEqual([{ from: clock('08:00'), to: clock('17:00') }]);
  });

  it('of seven days have seven openings but for the weekend', async () => {
    const plan = await planOf(bench, '?days=7');
    expect(plan).toMatchObject({ days: 7, from: clock('00:00'), to: clock('00:00', 7) });
    expect(plan.open).toHaveLength(5);
  });

  it('still show a charge that was ready in the morning', async () => {
    await bench.live(at(runs.checkDueAt) - bench.server.clock.now() + minute, 10 * minute);
    const charge = await seen(bench, runs.id);
    const groupVolts = charge.groups.map(() => charge.targetVolts.toFixed(3));
    const checked = await bench
      .as('technician')
      .post(`/api/charges/${runs.id}/rest-check`, { groupVolts, celsius: null, meterId: bench.meterId })
      .set('Idempotency-Key', key())
      .set('If-Match', `"${charge.rev}"`);
    expect(checked.status, JSON.stringify(checked.body)).toBe(200);
    bench.server.clock.advance(2 * hour);
    const plan = await planOf(bench);
    expect(plan.charges.find(({ card }) => card.id === runs.id)!.card.stage).toBe('ready');
  });
});

describe('people', () => {
  it('are there in their hours without their breaks; who has none is not there', async () => {
    const line = await lineOf(technician().id);
    expect(line.present).toEqual([
      { from: clock('08:00'), to: clock('12:00') },
      { from: clock('12:30'), to: clock('17:00') },
    ]);
    expect(line.breaks).toEqual([{ from: clock('12:00'), to: clock('12:30') }]);
    expect((await lineOf(bench.server.own.people.manager.id)).present).toEqual([]);
  });

  it('have the clips of their own charges as blocks, and nothing else at that time is free', async () => {
    const { blocks, free } = await lineOf(technician().id);
    const clipOn = blocks.find(({ kind, chargeId }) => kind === 'clip-on' && chargeId === waits.id)!;
    expect([timeOf(clipOn.from), minutesOf(clipOn)]).toEqual(['13:00', 5]);
    for (const stretch of free)
      for (const block of blocks)
        expect(at(stretch.to) <= at(block.from) || at(stretch.from) >= at(block.to)).toBe(true);
    // They wait for R-1 until its clips come off at the end of its current.
    expect(free[0]).toMatchObject({ to: runs.currentEndAt, waitOf: { chargeId: runs.id, title: 'R-1' } });
  });
});

describe('look-ins', () => {
  it('of a charge are its own person’s while that one is there, the colleague’s in the break, and nobody’s on a day off', async () => {
    // An hour apart from the start at 10:00: 11:00, 12:00 in the break, 13:00 …
    const whoOf = async () => {
      const { lookIns } = (await planOf(bench)).charges.find(({ card }) => card.id === runs.id)!;
      return lookIns.slice(0, 2).map(({ dueAt, person }) => [timeOf(dueAt), person?.id ?? null]);
    };
    expect(await whoOf()).toEqual([
      ['11:00', technician().id],
      ['12:00', foreman().id],
    ]);
    const off = { daysOff: [{ from: '2026-06-09', to: '2026-06-09', note: 'Away' }] };
    await hoursOf(bench, technician().id, off);
    await hoursOf(bench, foreman().id, off);
    expect(await whoOf()).toEqual([
      ['11:00', null],
      ['12:00', null],
    ]);
    expect((await lineOf(foreman().id)).daysOff).toEqual([{ day: '2026-06-09', note: 'Away' }]);
  });

  it('nobody makes in 15 min are missed: one amber alert, for whom it was, and a look settles it', async () => {
    const missed = async () =>
      (
        (await bench.as('foreman').get('/api/alerts')).body as {
          kind: string;
          level: string;
          for: object;
          clearedAt: unknown;
        }[]
      ).filter(({ kind }) => kind === 'look-in-missed');
    await bench.live(hour + 14 * minute, minute);
    expect(await missed()).toEqual([]);
    await bench.live(2 * minute, minute);
    expect(await missed()).toMatchObject([{ level: 'amber', for: { id: technician().id }, clearedAt: null }]);
    await bench.as('technician').post(`/api/charges/${runs.id}/look-ins`, {}).set('Idempotency-Key', key()).expect(200);
    expect((await missed()).filter(({ clearedAt }) => clearedAt === null)).toEqual([]);
  });
});

describe('what fits', () => {
  const add = async (change: object) => {
    const answer = await bench.as('foreman').post('/api/work', workForm(change)).set('Idempotency-Key', key());
    expect(answer.status, JSON.stringify(answer.body)).toBe(201);
    return answer.body as { id: string };
  };
  const fitsOfTechnician = async () =>
    (await fitsOf(bench, 'technician')).people.find(({ person }) => person.id === technician().id)!;

  it('is 60 min until the clips come off with the look-in of 11:00 in it, and of 120 it is said how much is too long', async () => {
    bench.server.clock.set(Date.parse(clock('10:20')));
    const short = await add({ title: 'Brake bleed', likelyMinutes: '40', longMinutes: '60' });
    const long = await add({ title: 'Cooling plate', likelyMinutes: '100', longMinutes: '115' });
    const [stretch] = (await fitsOfTechnician()).stretches;
    // 18.77 Ah at 10 A: the current is over at 11:53.
    expect([timeOf(stretch!.from), timeOf(stretch!.to), stretch!.lookIns.map(timeOf)]).toEqual([
      '10:20',
      '11:53',
      ['11:00'],
    ]);
    const one = stretch!.fits.find(({ work }) => work.id === short.id)!;
    expect([timeOf(one.span!.from), minutesOf(one.span!), one.suggested]).toEqual(['10:20', 65, true]);
    // 115 min and the look-in's 5 into 93.
    expect(stretch!.fits.find(({ work }) => work.id === long.id)).toMatchObject({
      span: null,
      overByMinutes: 27,
      because: '27\u00a0min too long',
    });
  });

  it('leaves out what asks for a skill that the technician has not, and a technician sees nobody else', async () => {
    const manager = bench.as('manager');
    const skill = (await manager.post('/api/skills', { name: 'High voltage' }).expect(201)).body as { id: string };
    const piece = await add({ title: 'Contactor', skillId: skill.id });
    const has = async () =>
      (await fitsOfTechnician()).stretches.some(({ fits }) =>
        fits.some(({ work, span }) => work.id === piece.id && span !== null),
      );
    expect(await has()).toBe(false);
    await hoursOf(bench, technician().id, { skillIds: [skill.id] });
    expect(await has()).toBe(true);
    expect((await fitsOf(bench, 'technician')).people).toHaveLength(1);
    expect((await fitsOf(bench, 'foreman')).people.length).toBeGreaterThan(1);
  });

  it('taken counts as used wait of the day, and is a block of the line; given back it is neither', async () => {
    const piece = await add({ title: 'Brake bleed', likelyMinutes: '20', longMinutes: '30' });
    const taken = await bench.as('technician').post(`/api/work/${piece.id}/take`, {}).set('Idempotency-Key', key());
    expect(taken.status, JSON.stringify(taken.body)).toBe(200);
    const { stints } = taken.body as { stints: { id: string; waitOf: { chargeId: string } | null }[] };
    expect(stints[0]!.waitOf).toMatchObject({ chargeId: runs.id });
    const fill = async () => (await lineOf(technician().id)).blocks.find(({ kind }) => kind === 'fill');
    expect(await fill()).toMatchObject({ title: 'Brake bleed', workId: piece.id, stint: { state: 'taken' } });
    await bench
      .as('technician')
      .post(`/api/work/${piece.id}/stints/${stints[0]!.id}/give-back`, {})
      .set('Idempotency-Key', key())
      .expect(200);
    expect(await fill()).toBeUndefined();
  });
});

describe('a fill that was taken', () => {
  it('says by how many minutes it does not fit any more: clips that came into it, hours that end before it', async () => {
    const body = workForm({ title: 'Brake bleed', likelyMinutes: '20', longMinutes: '30' });
    const foremans = bench.as('foreman');
    const piece = (await foremans.post('/api/work', body).set('Idempotency-Key', key()).expect(201)).body as {
      id: string;
    };
    const wish = { personId: technician().id, from: clock('14:30') };
    await foremans.post(`/api/work/${piece.id}/take`, wish).set('Idempotency-Key', key()).expect(200);
    const fill = async () => (await lineOf(technician().id)).blocks.find(({ kind }) => kind === 'fill')!;
    const planned = await fill();
    expect([timeOf(planned.from), planned.tooLong]).toEqual(['14:30', null]);
    const end = at(planned.to);
    const minutesUntil = (time: string) => (end - at(clock(time))) / minute;
    await hoursOf(bench, technician().id, { hours: Array.from({ length: 7 }, () => ({ from: '08:00', to: '14:50' })) });
    expect((await fill()).tooLong).toBe(`${minutesUntil('14:50')}\u00a0min too long: working hours end at 14:50`);
    await queued(bench, { spareId: await bench.spare('S-3'), repairRef: 'R-3' }, 'A1', clock('14:40'));
    expect((await fill()).tooLong).toBe(`${minutesUntil('14:40')}\u00a0min too long: clip on R-3 at 14:40`);
  });
});

describe('my day', () => {
  it('is one’s own line', async () => {
    const day = (await bench.as('technician').get('/api/bench-plan/my-day').expect(200)).body as MyDayDto;
    expect(day).toMatchObject({ person: { id: technician().id }, day: '2026-06-09', zone: 'Europe/Berlin' });
    expect(day.blocks).toEqual((await lineOf(technician().id)).blocks);
  });

  it('on paper names the charges, channels, look-ins and the standing line; a technician gets no colleague’s', async () => {
    const paper = async (role: 'technician' | 'foreman') => {
      const { bytes } = await bytesOf(bench.as(role).get('/api/bench-plan/day-sheet.pdf'));
      return (await readPdf(bytes)).map(({ text }) => text).join('\n');
    };
    const whole = await paper('foreman');
    for (const word of [
      'R-1',
      'R-2',
      'A1',
      'B1',
      technician().name,
      foreman().name,
      '11:00',
      'An aid to trained people',
    ])
      expect(whole).toContain(word);
    const own = await paper('technician');
    expect(own).toContain(technician().name);
    const lines = (text: string) => text.match(/08:00–17:00/g)?.length;
    expect([lines(whole), lines(own)]).toEqual([2, 1]);
  });
});
