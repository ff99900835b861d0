import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { ChargerDto } from '@/shared/contract/equipment';
import type { ChargeDto } from '@/shared/contract/charge';
import type { PlanDto } from '@/shared/contract/plan';
import type { SpareDto } from '@/shared/contract/spare';
import { at, did, makeBench, running, wishOf, type Bench } from '../charges/bench';
import { readingForm } from '../../support/forms';

let bench: Bench;
let charge: ChargeDto;
let runningSpare: string;
let otherSpare: string;

const plan = async (spareId: string): Promise<PlanDto> =>
  (await bench.as('technician').post('/api/plans', wishOf(bench, { spareId })).expect(200)).body as PlanDto;
const queueOn = ({ plan: found }: PlanDto, channel: string): number[] =>
  found.options
    .filter(({ way, channelIds }) => way === 'terminals' && channelIds[0] === bench.channels[channel])
    .map(({ queueS }) => queueS);
const chargers = async (): Promise<ChargerDto[]> => (await bench.as('manager').get('/api/chargers').expect(200)).body;
const secondsAhead = (instant: string | null): number => (at(instant) - bench.server.clock.now()) / 1000;

beforeAll(async () => {
  bench = await makeBench();
  runningSpare = await bench.spare('S-1');
  otherSpare = await bench.spare('S-2');
  charge = await running(bench, { spareId: runningSpare }, { channel: 'A1' });
});
afterAll(() => bench.server.close());

describe('a channel that runs a charge', () => {
  it('is offered from the likely end of its current, and a free one at once', async () => {
    const found = await plan(otherSpare);
    const endS = secondsAhead(charge.currentEndAt);
    expect(endS).toBeGreaterThan(3600);
    for (const queueS of queueOn(found, 'A1')) expect(queueS).toBeCloseTo(endS, -1);
    for (const queueS of queueOn(found, 'B1')) expect(queueS).toBe(0);
    expect(at(found.channels[bench.channels.A1!]!.freeAt)).toBe(at(charge.currentEndAt));
    expect(found.channels[bench.channels.B1!]!.freeAt).toBeNull();
  });

  it('says in the equipment who has it and until when', async () => {
    const [charger] = await chargers();
    const [a1, b1] = charger!.channels;
    expect(a1!.heldBy).toMatchObject({ chargeId: charge.id, title: charge.title, stage: 'charging' });
    expect(at(a1!.heldBy!.freeAt)).toBe(at(charge.currentEndAt));
    expect(b1!.heldBy).toBeNull();
  });

  it('is not taken out of service', async () => {
    const [charger] = await chargers();
    const retired = await bench.as('manager').delete(`/api/chargers/${charger!.id}`).set('If-Match', '"1"').expect(409);
    expect(retired.body.detail).toBe(
      `A1 is taken by ${charge.title}. Take it out of service when that charge is over.`,
    );
    const without = { ...charger, channels: charger!.channels.filter(({ name }) => name !== 'A1') };
    await bench.as('manager').patch(`/api/chargers/${charger!.id}`, without).set('If-Match', '"1"').expect(409);
  });
});

describe('a spare on a charge', () => {
  it('is shown with it, and keeps its type in use', async () => {
    const spare = (await bench.as('technician').get(`/api/spares/${runningSpare}`).expect(200)).body as SpareDto;
    expect(spare).toMatchObject({ where: 'charge', charge: { id: charge.id, stage: 'charging' } });
    const types = await bench
      .as('manager')
      .delete(`/api/module-types/${bench.typeId}`)
      .set('If-Match', '"1"')
      .expect(409);
    expect(types.body.detail).toBe('2-series 66 Ah has 2 spares and 1 charge. A type in use cannot be removed.');
  });

  it('is read at its charge and set aside by stopping it', async () => {
    const reading = readingForm({ groupVolts: ['3.9', '3.9'], meterId: bench.meterId });
    const read = await bench.as('technician').post(`/api/spares/${runningSpare}/readings`, reading).expect(409);
    expect(read.body).toMatchObject({
      code: 'spare_on_charge',
      detail: `S-1 is on ${charge.title}. Log the reading at the charge.`,
    });
    const aside = await bench
      .as('technician')
      .post(`/api/spares/${runningSpare}/quarantine`, { reason: 'smells' })
      .set('If-Match', '"1"')
      .expect(409);
    expect(aside.body.detail).toBe(`S-1 is on ${charge.title}. Stop that charge: the quarantine is set with it.`);
  });
});

describe('a held charge', () => {
  it('takes its channel out of every plan, and the reason names it', async () => {
    charge = await did(bench, charge, 'hold', { reason: 'The leads are needed' });
    const found = await plan(otherSpare);
    expect(queueOn(found, 'A1')).toEqual([]);
    expect(found.channels).not.toHaveProperty(bench.channels.A1!);
    expect(found.plan.ruledOut).toContainEqual(
      expect.objectContaining({
        channelName: 'A1',
        reason: `A1 is taken by ${charge.title}, which is held. Resume or stop it to free the channel.`,
      }),
    );
    const [charger] = await chargers();
    expect(charger!.channels[0]!.heldBy).toMatchObject({ stage: 'held', freeAt: null });
  });

  it('gives it back with its stop', async () => {
    charge = await did(bench, charge, 'stop', { reason: 'Planned anew', quarantine: true });
    expect(queueOn(await plan(otherSpare), 'A1')).toEqual([0, 0]);
    const spare = (await bench.as('technician').get(`/api/spares/${runningSpare}`).expect(200)).body as SpareDto;
    expect(spare).toMatchObject({ where: 'quarantine', quarantine: { reason: 'Planned anew' }, charge: null });
  });
});
