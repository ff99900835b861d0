/** What one charge that became ready has cost of waiting; pure. */
import { DateTime } from 'luxon';
import type { FinishedWait } from '../../entities/finished-wait';
import type { RepairWait } from '../../entities/repair-wait';
import type { Workshop } from '../../entities/workshop';
import type { WorkStint } from '../../entities/work-stint';
import type { ChannelUse, PlannedNumbers, WaitedCharge } from '../../repositories/waits.repository';
import { common, lengthOf, overlaps, united, type Stretch } from '../bench-plan/spans';
import { stintSpan } from '../bench-plan/stint-spans';
import { presentSpans } from '../presence';
import { usesWaitOf } from './uses-wait';

/** Stands in the place of an id: no charger, no channel, nobody. */
export const NONE = 'none';

export interface WaitGround {
  workshop: Pick<Workshop, 'zone' | 'workingHours'>;
  charge: WaitedCharge & { readyAt: number };
  /** When it was asked for: of a top-up, when the first charge of its row was. */
  askedAt: number;
  /** Null: it used none. */
  channel: ChannelUse | null;
  planned: PlannedNumbers;
  /** When its repair was booked, epoch ms; null: it has none. */
  bookedAt: number | null;
  /** Of its repair. */
  repairWaits: readonly Pick<RepairWait, 'fromAt' | 'toAt'>[];
  /** On its repair. */
  personIds: readonly string[];
  /** Of anybody. */
  stints: readonly WorkStint[];
}

/**
 * The stretches in which the repair could do nothing but wait for this module: as they are written down with the repair,
 * corrections among them; of a charge without a repair from when it was asked for until it was ready.
 */
export function waitStretches({ charge, askedAt, repairWaits }: WaitGround): Stretch[] {
  const own = { from: askedAt, to: charge.readyAt };
  const written = repairWaits
    .map(({ fromAt, toAt }) => ({ from: fromAt, to: toAt ?? charge.readyAt }))
    .filter((one) => overlaps(one, own));
  return united(written.length > 0 ? written : [own]);
}

/** Its row of the statistics. Used is other work of its people, or work taken for its wait, within working hours. */
export function finishedWaitRow(ground: WaitGround): FinishedWait {
  const { workshop, charge, channel, personIds, stints, planned, bookedAt } = ground;
  const waits = waitStretches(ground);
  const from = Math.min(...waits.map((one) => one.from), charge.readyAt);
  const to = Math.max(...waits.map((one) => one.to), from);
  const open = common(waits, presentSpans(workshop, null, from, to));
  const worked = stints
    .filter(({ state }) => state === 'begun' || state === 'done')
    .filter(usesWaitOf(personIds, [charge]))
    .map((stint) => stintSpan(stint, to));
  const usedMs = lengthOf(common(open, united(worked)));
  const ready = DateTime.fromMillis(charge.readyAt, { zone: workshop.zone });
  return {
    workshopId: charge.workshopId,
    readyAt: charge.readyAt,
    chargeId: charge.id,
    askedAt: from,
    moduleTypeId: charge.moduleTypeId,
    chargerId: channel?.chargerId ?? NONE,
    channelId: channel?.channelId ?? NONE,
    technicianId: charge.personId ?? NONE,
    way: charge.way,
    weekday: ready.weekday,
    monday: ready.startOf('week').toFormat('yyyy-MM-dd'),
    waitMs: lengthOf(waits),
    usedMs,
    lostMs: lengthOf(open) - usedMs,
    lateMs: charge.readyAt - charge.plannedLikelyAt,
    inBand: charge.readyAt >= charge.plannedEarlyAt && charge.readyAt <= charge.plannedLateAt,
    queueMs: between(charge.createdAt, charge.startedAt),
    chargingMs: between(charge.startedAt, charge.taperAt ?? charge.currentEndAt),
    taperingMs: between(charge.taperAt, charge.currentEndAt),
    restingMs: between(charge.currentEndAt, charge.checkDueAt),
    checkDueMs: between(charge.checkDueAt, charge.checkedAt ?? charge.readyAt),
    ...planned,
    bookedAt,
    dueAt: charge.readyBy,
    heldFromAt: channel?.fromAt ?? null,
    heldToAt: channel?.toAt ?? null,
  };
}

const between = (from: number | null, to: number | null): number | null =>
  from === null || to === null ? null : Math.max(0, to - from);
