import { In, type EntityManager } from 'typeorm';
import { ChannelHold } from '../entities/channel-hold';
import { Channel } from '../entities/channel';
import { Charge } from '../entities/charge';

export type WaitedCharge = Pick<
  Charge,
  | 'id'
  | 'number'
  | 'repairRef'
  | 'moduleTypeId'
  | 'createdAt'
  | 'readyAt'
  | 'plannedEarlyAt'
  | 'plannedLikelyAt'
  | 'plannedLateAt'
  | 'startedAt'
  | 'taperAt'
  | 'currentEndAt'
  | 'checkDueAt'
  | 'checkedAt'
  | 'topUpOf'
>;

export interface WaitPeriod {
  /** Ready from here on, epoch ms. */
  fromAt: number;
  /** Ready before this, epoch ms. */
  toAt: number;
  moduleTypeId: string | null;
}

const columns = [
  'id',
  'number',
  'repairRef',
  'moduleTypeId',
  'createdAt',
  'readyAt',
  'plannedEarlyAt',
  'plannedLikelyAt',
  'plannedLateAt',
  'startedAt',
  'taperAt',
  'currentEndAt',
  'checkDueAt',
  'checkedAt',
  'topUpOf',
] as const satisfies readonly (keyof Charge)[];

/**
 * Charges that became ready in a period, newest first, without their plans, which are large.
 * @param page of how many, and after which one; null: all at once
 */
export function listWaitedCharges(
  manager: EntityManager,
  workshopId: string,
  period: WaitPeriod,
  page: { size: number; after: { readyAt: number; id: string } | null } | null = null,
): Promise<WaitedCharge[]> {
  const query = manager
    .createQueryBuilder(Charge, 'charge')
    .select(columns.map((column) => `charge.${column}`))
    .where('charge.workshopId = :workshopId', { workshopId })
    .andWhere('charge.readyAt >= :fromAt AND charge.readyAt < :toAt', { fromAt: period.fromAt, toAt: period.toAt })
    .orderBy('charge.readyAt', 'DESC')
    .addOrderBy('charge.id', 'ASC');
  if (period.moduleTypeId !== null)
    query.andWhere('charge.moduleTypeId = :moduleTypeId', { moduleTypeId: period.moduleTypeId });
  if (page?.after)
    query.andWhere('(charge.readyAt < :lastAt OR (charge.readyAt = :lastAt AND charge.id > :lastId))', {
      lastAt: page.after.readyAt,
      lastId: page.after.id,
    });
  if (page) query.limit(page.size);
  return query.getMany();
}

/** When each of these charges was planned, and of which one it is a top-up. */
export async function askedInstants(
  manager: EntityManager,
  workshopId: string,
  ids: readonly string[],
): Promise<Map<string, Pick<Charge, 'id' | 'createdAt' | 'topUpOf'>>> {
  if (ids.length === 0) return new Map();
  const rows = await manager.find(Charge, {
    where: { workshopId, id: In([...ids]) },
    select: { id: true, createdAt: true, topUpOf: true },
  });
  return new Map(rows.map((row) => [row.id, row]));
}

/** The charger of each charge's first step, by the charge's id; a charge without a channel is left out. */
export async function chargerOfCharges(
  manager: EntityManager,
  workshopId: string,
  period: WaitPeriod,
): Promise<Map<string, string>> {
  const rows = await manager
    .createQueryBuilder(ChannelHold, 'hold')
    .innerJoin(Charge, 'charge', 'charge.id = hold.chargeId')
    .innerJoin(Channel, 'channel', 'channel.id = hold.channelId')
    .select('hold.chargeId', 'chargeId')
    .addSelect('channel.chargerId', 'chargerId')
    .where('hold.workshopId = :workshopId AND charge.workshopId = :workshopId', { workshopId })
    .andWhere('charge.readyAt >= :fromAt AND charge.readyAt < :toAt', { fromAt: period.fromAt, toAt: period.toAt })
    .orderBy('hold.stepIndex', 'DESC')
    .addOrderBy('channel.name', 'DESC')
    .getRawMany<{ chargeId: string; chargerId: string }>();
  // The first step comes last, so that it is the one that stays in the map.
  return new Map(rows.map((row) => [row.chargeId, row.chargerId]));
}
