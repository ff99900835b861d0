import { In, type EntityManager } from 'typeorm';
import { openStages } from '@/shared/contract/charge';
import { ChannelHold } from '../entities/channel-hold';
import { Charge } from '../entities/charge';

export type HoldingCharge = Pick<
  Charge,
  | 'id'
  | 'number'
  | 'repairRef'
  | 'spareId'
  | 'stage'
  | 'clipOnAt'
  | 'currentEndAt'
  | 'plannedLikelyAt'
  | 'minRestS'
  | 'currentOffSaid'
>;

export interface OpenHold {
  hold: ChannelHold;
  charge: HoldingCharge;
}

/** Holds not released yet, each with the charge that has it; without the charges' plans, which are large. */
export async function listOpenHolds(manager: EntityManager, workshopId: string): Promise<OpenHold[]> {
  const holds = await manager.findBy(ChannelHold, { workshopId, state: In(['reserved', 'running']) });
  if (holds.length === 0) return [];
  const charges: HoldingCharge[] = await manager.find(Charge, {
    where: { workshopId, id: In([...new Set(holds.map((hold) => hold.chargeId))]), stage: In([...openStages]) },
    select: {
      id: true,
      number: true,
      repairRef: true,
      spareId: true,
      stage: true,
      clipOnAt: true,
      currentEndAt: true,
      plannedLikelyAt: true,
      minRestS: true,
      currentOffSaid: true,
    },
  });
  const byId = new Map(charges.map((charge) => [charge.id, charge]));
  return holds.flatMap((hold) => {
    const charge = byId.get(hold.chargeId);
    return charge ? [{ hold, charge }] : [];
  });
}
