/** Keeps the rows that the waiting statistics read at what the other rows say. */
import type { EntityManager } from 'typeorm';
import type { Charge } from '../../entities/charge';
import type { Workshop } from '../../entities/workshop';
import { bookedInstants } from '../../repositories/repairs.repository';
import { waitsOfRepairs, peopleOfRepairs } from '../../repositories/repair-rows.repository';
import {
  askedInstants,
  channelUses,
  plannedNumbers,
  replaceFinishedWaits,
  waitedChargesById,
  waitedWithin,
  type WaitedCharge,
} from '../../repositories/waits.repository';
import { listStints } from '../../repositories/work.repository';
import { workshopForPlans } from '../../repositories/workshop-for-plans.repository';
import { finishedWaitRow, waitStretches, type WaitGround } from './finished-wait-row';

/** Writes the rows of those of these charges that have become ready, in the transaction of what has changed them. */
export async function recordWaits(
  manager: EntityManager,
  workshop: Workshop,
  charges: readonly Pick<Charge, 'id' | 'readyAt'>[],
): Promise<void> {
  const ids = charges.filter(({ readyAt }) => readyAt !== null).map(({ id }) => id);
  if (ids.length === 0) return;
  const grounds = await groundsOf(manager, workshop, await waitedChargesById(manager, workshop.id, ids));
  await replaceFinishedWaits(manager, workshop.id, ids, grounds.map(finishedWaitRow));
}

/** The same for every charge whose wait has a moment within a stretch in which somebody was at other work. */
export async function recordWaitsWithin(
  manager: EntityManager,
  workshopId: string,
  within: { from: number; to: number },
): Promise<void> {
  const charges = await waitedWithin(manager, workshopId, within);
  if (charges.length > 0) await recordWaits(manager, await workshopForPlans(manager, workshopId), charges);
}

async function groundsOf(
  manager: EntityManager,
  workshop: Workshop,
  charges: readonly WaitedCharge[],
): Promise<WaitGround[]> {
  const { id: workshopId } = workshop;
  const asked = await firstAskedInstants(manager, workshopId, charges);
  const ids = charges.map(({ id }) => id);
  const channels = await channelUses(manager, workshopId, ids);
  const planned = await plannedNumbers(manager, workshopId, ids);
  const repairIds = [...new Set(charges.flatMap(({ repairId }) => (repairId === null ? [] : [repairId])))];
  const repairWaits = await waitsOfRepairs(manager, workshopId, repairIds);
  const people = await peopleOfRepairs(manager, workshopId, repairIds);
  const booked = await bookedInstants(manager, workshopId, repairIds);
  const grounds = charges.flatMap((charge): WaitGround[] => {
    const { readyAt, repairId } = charge;
    if (readyAt === null) return [];
    return [
      {
        workshop,
        charge: { ...charge, readyAt },
        askedAt: Math.min(readyAt, asked.get(charge.id) ?? charge.createdAt),
        channel: channels.get(charge.id) ?? null,
        planned: planned.get(charge.id) ?? { fromVolts: null, toVolts: null, groupAh: null },
        bookedAt: repairId === null ? null : (booked.get(repairId) ?? null),
        repairWaits: repairId === null ? [] : (repairWaits.get(repairId) ?? []),
        personIds: repairId === null ? [] : (people.get(repairId) ?? []).map(({ personId }) => personId),
        stints: [],
      },
    ];
  });
  const stretches = grounds.flatMap(waitStretches);
  if (stretches.length === 0) return grounds;
  const from = stretches.reduce((least, one) => Math.min(least, one.from), Infinity);
  const to = stretches.reduce((most, one) => Math.max(most, one.to), -Infinity);
  const stints = await listStints(manager, workshopId, from, to);
  return grounds.map((ground) => ({ ...ground, stints }));
}

/** Of a top-up the repair has waited since the first charge was asked for. */
async function firstAskedInstants(
  manager: EntityManager,
  workshopId: string,
  charges: readonly WaitedCharge[],
): Promise<Map<string, number>> {
  const known = new Map<string, { createdAt: number; topUpOf: string | null }>(
    charges.map((charge) => [charge.id, charge]),
  );
  for (;;) {
    const missing = [...known.values()].flatMap(({ topUpOf }) =>
      topUpOf !== null && !known.has(topUpOf) ? [topUpOf] : [],
    );
    if (missing.length === 0) break;
    const found = await askedInstants(manager, workshopId, missing);
    for (const id of missing) known.set(id, found.get(id) ?? { createdAt: Number.POSITIVE_INFINITY, topUpOf: null });
  }
  return new Map(
    charges.map((charge) => {
      let askedAt = charge.createdAt;
      for (let id = charge.topUpOf; id !== null; id = known.get(id)?.topUpOf ?? null)
        askedAt = Math.min(askedAt, known.get(id)?.createdAt ?? askedAt);
      return [charge.id, askedAt];
    }),
  );
}
