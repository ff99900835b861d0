/** Closed charges written straight into the database: waits are read from history, not made by it. */
import type { EntityManager } from 'typeorm';
import { ChannelHold } from '@/server/entities/channel-hold';
import { Charge } from '@/server/entities/charge';
import { fillWaits } from '@/server/services/waits/fill-waits';

const MINUTE = 60_000;

export interface PastCharge {
  number: number;
  repairRef?: string;
  spareId: string;
  typeId: string;
  personId: string;
  workshopId: string;
  /** Channels by step; empty: none. */
  channelIds: string[];
  readyAt: number;
  /** Minutes from asked to ready, and the stages in it. */
  waitMin: number;
  queueMin: number;
  taperMin: number;
  restMin: number;
  checkMin: number;
  /** Ready minus planned likely, min; the band is 15 min before to 25 min after the likely finish. */
  lateMin: number;
  topUpOf?: string | null;
  /** Rest volts of a group and its Ah, as it was planned; left out: nothing is known of it. */
  planned?: { fromVolts: number; toVolts: number; groupAh: number };
}

export function pastChargeRow(past: PastCharge): Charge {
  const { readyAt } = past;
  const at = (minutesBefore: number): number => readyAt - minutesBefore * MINUTE;
  const likely = at(past.lateMin);
  const currentEnd = past.restMin + past.checkMin;
  return {
    id: `charge-${past.number}`,
    workshopId: past.workshopId,
    number: `C-${String(past.number).padStart(4, '0')}`,
    repairRef: past.repairRef ?? null,
    modulePosition: null,
    spareId: past.spareId,
    repairId: null,
    neighbourSpareId: null,
    moduleTypeId: past.typeId,
    personId: past.personId,
    createdById: past.personId,
    stage: 'shelved',
    heldFrom: null,
    direction: 'charge',
    way: 'terminals',
    finish: 'over-and-settle',
    targetVolts: 3.968,
    toleranceVolts: 0.005,
    targetMeterId: null,
    targetCelsius: null,
    minRestS: 3600,
    // Nobody reads more of the plan of a closed charge for its waits.
    option: {} as Charge['option'],
    frozen: frozenOf(past) as Charge['frozen'],
    reckoning: null,
    readyBy: null,
    clipOnAt: at(past.waitMin),
    plannedEarlyAt: likely - 15 * MINUTE,
    plannedLikelyAt: likely,
    plannedLateAt: likely + 25 * MINUTE,
    earlyAt: null,
    likelyAt: null,
    lateAt: null,
    queuedAt: null,
    startedAt: at(past.waitMin - past.queueMin),
    taperAt: past.taperMin > 0 ? at(currentEnd + past.taperMin) : null,
    currentEndAt: at(currentEnd),
    currentOffSaid: true,
    checkDueAt: at(past.checkMin),
    checkedAt: readyAt,
    readyAt,
    closedAt: readyAt,
    heldAt: null,
    stoppedAt: null,
    stopReason: null,
    topUpOf: past.topUpOf ?? null,
    nextDueAt: null,
    rev: 1,
    createdAt: at(past.waitMin),
  };
}

const frozenOf = ({ planned }: PastCharge): object =>
  planned
    ? {
        spare: { groupVolts: [planned.fromVolts, planned.fromVolts], capacityAh: planned.groupAh },
        target: { volts: planned.toVolts },
      }
    : {};

export async function writePast(manager: EntityManager, past: readonly PastCharge[]): Promise<void> {
  const rows = past.map(pastChargeRow);
  const holds = past.flatMap(({ number, workshopId, channelIds }, place) =>
    channelIds.map((channelId, stepIndex) => ({
      id: `hold-${number}-${stepIndex}`,
      workshopId,
      chargeId: `charge-${number}`,
      stepIndex,
      channelId,
      state: 'released' as const,
      fromAt: rows[place]!.startedAt,
      toAt: rows[place]!.currentEndAt,
    })),
  );
  for (let from = 0; from < rows.length; from += 200) await manager.insert(Charge, rows.slice(from, from + 200));
  for (let from = 0; from < holds.length; from += 200) await manager.insert(ChannelHold, holds.slice(from, from + 200));
  await fillWaits(manager);
}
