/**
 * A repair on the bench of the charges' tests: eight groups in four modules of two, whose second module (groups 3 and 4) is
 * 97 and 34 mV under the rest. The healthy ones rest about 3.949 V, a point of the published table.
 */
import { expect } from 'vitest';
import type { RepairPageDto } from '@/shared/contract/repair';
import type { RepairStep } from '@/shared/contract/repair-steps';
import type { Role } from '@/shared/contract/roles';
import { packForm, packReadingForm, repairForm, secondSourceForm } from '@/tests/support/repaired';
import { answered, at, did, key, minute, seen, wishOf, type Bench, type Wish } from '../charges/bench';
import type { ChargeDto } from '@/shared/contract/charge';
import type { PlanDto } from '@/shared/contract/plan';

export const arrival = [3.949, 3.95, 3.852, 3.915, 3.948, 3.949, 3.951, 3.949];
/** The same pack with all modules within `millivolts` of each other. */
export const levelled = (millivolts: number): number[] =>
  arrival.map((_, group) => (group === 3 ? 3.95 - millivolts / 1000 : 3.95));

export async function taken(test: Promise<{ status: number; body: unknown }>): Promise<RepairPageDto> {
  const { status, body } = await test;
  expect([200, 201], JSON.stringify(body)).toContain(status);
  return body as RepairPageDto;
}

export interface Shop {
  bench: Bench;
  send: (path: string, body?: object, role?: Role) => ReturnType<ReturnType<Bench['as']>['post']>;
  book: (change?: object) => Promise<RepairPageDto>;
  read: (id: string, volts: number[], change?: object) => Promise<RepairPageDto>;
  confirm: (page: RepairPageDto, change?: object) => Promise<RepairPageDto>;
  take: (page: RepairPageDto, change?: object) => Promise<RepairPageDto>;
  seen: (id: string) => Promise<RepairPageDto>;
  plan: (page: Pick<RepairPageDto, 'id'>, spareId: string, wish?: Partial<Wish>) => Promise<ChargeDto>;
}

export function makeShop(bench: Bench): Shop {
  const send: Shop['send'] = (path, body = {}, role = 'technician') => {
    // No two acts of a person happen at the same millisecond.
    bench.server.clock.advance(1);
    return bench.as(role).post(`/api/${path}`, body).set('Idempotency-Key', key());
  };
  return {
    bench,
    send,
    book: (change) => taken(send('repairs', repairForm(bench.typeId, change))),
    read: (id, volts, change) =>
      taken(send(`repairs/${id}/readings`, packReadingForm({ groupVolts: volts, meterId: bench.meterId, ...change }))),
    confirm: (page, change) =>
      taken(
        send(
          `repairs/${page.id}/second-source`,
          secondSourceForm(page.readings[0]!.id, {
            groupVolts: [3.853, 3.916],
            healthyGroup: { group: 0, volts: 3.95 },
            meterId: bench.meterId,
            ...change,
          }),
        ),
      ),
    take: (page, change) =>
      taken(
        send(`repairs/${page.id}/target`, {
          readingId: page.readings.find(({ stage }) => stage === 'arrival')!.id,
          volts: null,
          toleranceMillivolts: 5,
          reason: null,
          ...change,
        }),
      ),
    seen: async (id) => (await bench.as('technician').get(`/api/repairs/${id}`).expect(200)).body as RepairPageDto,
    async plan(page, spareId, wish = {}) {
      const body = { ...wishOf(bench, { spareId, ...wish }), repairId: page.id };
      const { plan } = (await bench.as('technician').post('/api/plans', body)).body as PlanDto;
      const option = plan.options.find(
        ({ way, finish, channelIds }) =>
          way === 'terminals' && finish === 'over-and-settle' && channelIds[0] === bench.channels.A1,
      );
      const answer = await send('charges', { ...body, optionId: option!.id });
      expect(answer.status, JSON.stringify(answer.body)).toBe(201);
      return answer.body as ChargeDto;
    },
  };
}

export { packForm };

export const statesOf = (page: RepairPageDto): Record<RepairStep, string> =>
  Object.fromEntries(page.steps.map(({ step, state }) => [step, state])) as Record<RepairStep, string>;

/** The first so many steps are done, the next stands as said, the rest is to come. */
export const strip = (done: number, next: 'present' | 'blocked' = 'present'): string[] =>
  Array.from({ length: 7 }, (_, place) => (place < done ? 'done' : place === done ? next : 'to-come'));
export const stripOf = (page: RepairPageDto): string[] => page.steps.map(({ state }) => state);

/** Lives through a charge until it waits for its check, and answers it in tolerance. */
export async function chargedAndChecked(bench: Bench, chargeId: string): Promise<ChargeDto> {
  let charge = await did(bench, await answered(bench, await seen(bench, chargeId)), 'start');
  await bench.live(at(charge.currentEndAt) - bench.server.clock.now() + 2 * minute);
  charge = await did(bench, await seen(bench, chargeId), 'current-off');
  await bench.live(at(charge.checkDueAt) - bench.server.clock.now() + minute);
  return did(bench, await seen(bench, chargeId), 'rest-check', {
    groupVolts: ['3.950', '3.948'],
    celsius: 21,
    meterId: bench.meterId,
  });
}
