/**
 * A workshop's day for the bench plan's tests: a foreman and a technician who work 08:00 to 17:00 (the workshop's hours),
 * a manager who is off, and charges by the API of the charges' own tests. It is Tuesday 9 June 2026, 10:00 in Berlin.
 */
import { expect } from 'vitest';
import type { BenchPlanDto, FitsDto, MovePlacesDto, ProposalDto } from '@/shared/contract/bench-plan';
import type { ChargeDto } from '@/shared/contract/charge';
import type { Role } from '@/shared/contract/roles';
import { Staffing } from '@/server/entities/staffing';
import { did, kept, key, seen, type Bench, type Wish } from '../charges/bench';

/** 'HH:MM' of the test's Tuesday in Berlin (UTC+2 in June), or of so many days after it. */
export const clock = (time: string, daysOn = 0): string => {
  const [hour = 0, minute = 0] = time.split(':').map(Number);
  return new Date(Date.UTC(2026, 5, 9 + daysOn, hour - 2, minute)).toISOString();
};
export const timeOf = (instant: string): string =>
  new Date(Date.parse(instant) + 2 * 3_600_000).toISOString().slice(11, 16);

/** The manager has no working hours, so that two people are there. */
export async function onlyTwoWork(bench: Bench): Promise<void> {
  const { own } = bench.server;
  await hoursOf(bench, own.people.manager.id, { hours: Array.from({ length: 7 }, () => null) });
}

export async function hoursOf(bench: Bench, personId: string, change: Partial<Staffing>): Promise<void> {
  const { manager } = bench.server.deps.dataSource;
  const workshopId = bench.server.own.id;
  await manager.delete(Staffing, { workshopId, personId });
  await manager.insert(Staffing, {
    ...{ id: `staffing-${personId}`, workshopId, personId, hours: null, breaks: [], daysOff: [], skillIds: [], rev: 1 },
    ...change,
  });
}

/** A charge in the queue: 20.5 Ah a group on A1 or another channel, from a time on. */
export async function queued(
  bench: Bench,
  wish: Wish,
  channel: string,
  clipOnAt: string,
  role: Role = 'technician',
): Promise<ChargeDto> {
  const charge = await kept(bench, { clipOnAt, ...wish }, { channel }, role);
  return did(bench, charge, 'queue', { clipOnAt }, role);
}

const bodyOf = async <T>(test: Promise<{ status: number; body: unknown }>): Promise<T> => {
  const { status, body } = await test;
  expect(status, JSON.stringify(body)).toBe(200);
  return body as T;
};
export const planOf = (bench: Bench, query = ''): Promise<BenchPlanDto> =>
  bodyOf(bench.as('foreman').get(`/api/bench-plan${query}`));
export const placesOf = (bench: Bench, chargeId: string): Promise<MovePlacesDto> =>
  bodyOf(bench.as('foreman').get(`/api/bench-plan/places?chargeId=${chargeId}`));
export const fitsOf = (bench: Bench, role: Role): Promise<FitsDto> =>
  bodyOf(bench.as(role).get('/api/bench-plan/fits'));

/** Null: nothing is better. */
export async function proposalOf(bench: Bench): Promise<ProposalDto | null> {
  const { status, body } = await bench.as('foreman').get('/api/bench-plan/proposal');
  expect([200, 204], JSON.stringify(body)).toContain(status);
  return status === 204 ? null : (body as ProposalDto);
}

export const sent = (bench: Bench, path: string, body: object = {}, role: Role = 'foreman') => {
  // No two acts of a person happen at the same millisecond.
  bench.server.clock.advance(1);
  return bench.as(role).post(`/api/bench-plan/${path}`, body).set('Idempotency-Key', key());
};

/** Where a charge stands now: its channels and its clip-on. */
export async function placeOf(bench: Bench, id: string): Promise<{ channels: string[]; at: string; stage: string }> {
  const charge = await seen(bench, id);
  return { channels: charge.channelNames, at: timeOf(charge.clipOnAt), stage: charge.stage };
}
