/** The rows behind the waiting statistics: charges that became ready, what hangs on them, and the narrow row of each. */
import { In, LessThan, MoreThan, type EntityManager } from 'typeorm';
import { Channel } from '../entities/channel';
import { ChannelHold } from '../entities/channel-hold';
import { Charge } from '../entities/charge';
import { FinishedWait } from '../entities/finished-wait';
import { rowsOf, type WaitFilter } from './wait-figures.repository';

const columns = {
  id: true,
  workshopId: true,
  number: true,
  repairRef: true,
  repairId: true,
  moduleTypeId: true,
  personId: true,
  way: true,
  createdAt: true,
  readyAt: true,
  plannedEarlyAt: true,
  plannedLikelyAt: true,
  plannedLateAt: true,
  startedAt: true,
  taperAt: true,
  currentEndAt: true,
  checkDueAt: true,
  checkedAt: true,
  topUpOf: true,
  readyBy: true,
} as const satisfies Partial<Record<keyof Charge, true>>;

/** A charge without its plan, which is large. */
export type WaitedCharge = Pick<Charge, keyof typeof columns>;

export const waitedChargesById = (
  manager: EntityManager,
  workshopId: string,
  ids: readonly string[],
): Promise<WaitedCharge[]> =>
  manager.find(Charge, { where: { workshopId, id: In([...ids]) }, select: columns, order: { id: 'ASC' } });

/** Of the charges that are written down those whose wait has a moment within a stretch, epoch ms. */
export async function waitedWithin(
  manager: EntityManager,
  workshopId: string,
  { from, to }: { from: number; to: number },
): Promise<{ id: string; readyAt: number }[]> {
  const rows = await manager.find(FinishedWait, {
    where: { workshopId, readyAt: MoreThan(from), askedAt: LessThan(to) },
    select: { workshopId: true, chargeId: true, readyAt: true },
  });
  return rows.map(({ chargeId, readyAt }) => ({ id: chargeId, readyAt }));
}

/** Charges that became ready and have no row yet, by workshop, in the order of time. */
export async function unrecordedCharges(
  manager: EntityManager,
): Promise<Map<string, { id: string; readyAt: number }[]>> {
  const found = new Map<string, { id: string; readyAt: number }[]>();
  // Every charge has one row, so that two counts over indexes say at every start that nothing is missing.
  const [counts] = (await manager.query(
    `SELECT (SELECT count(*) FROM charge WHERE ready_at IS NOT NULL) AS ready,
            (SELECT count(*) FROM finished_wait) AS recorded`,
  )) as [{ ready: number; recorded: number }];
  if (counts.ready === counts.recorded) return found;
  const rows = (await manager.query(
    `SELECT c.id AS id, c.workshop_id AS workshopId, c.ready_at AS readyAt FROM charge c
     WHERE c.ready_at IS NOT NULL AND NOT EXISTS (SELECT 1 FROM finished_wait w WHERE w.charge_id = c.id)
     ORDER BY c.workshop_id, c.ready_at, c.id`,
  )) as { id: string; workshopId: string; readyAt: number }[];
  for (const { id, workshopId, readyAt } of rows) {
    const own = found.get(workshopId);
    if (own) own.push({ id, readyAt });
    else found.set(workshopId, [{ id, readyAt }]);
  }
  return found;
}

/** Puts rows in the place of those of these charges. */
export async function replaceFinishedWaits(
  manager: EntityManager,
  workshopId: string,
  chargeIds: readonly string[],
  rows: readonly FinishedWait[],
): Promise<void> {
  await manager.delete(FinishedWait, { workshopId, chargeId: In([...chargeIds]) });
  if (rows.length > 0)
    await manager
      .createQueryBuilder()
      .insert()
      .into(FinishedWait)
      .values([...rows])
      .updateEntity(false)
      .execute();
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

/** What charges of a filter were aimed at, rest volts of a group, the newest 20,000. */
export async function recordedTargets(manager: EntityManager, filter: WaitFilter): Promise<number[]> {
  const { text, values } = rowsOf(filter);
  const rows = (await manager.query(
    `SELECT to_volts AS volts ${text} AND to_volts IS NOT NULL ORDER BY ready_at DESC LIMIT 20000`,
    values,
  )) as { volts: number }[];
  return rows.map(({ volts }) => volts);
}

/** What each of these charges was planned with; out of the plan by SQLite, which is quicker than reading it whole. */
export async function plannedNumbers(
  manager: EntityManager,
  workshopId: string,
  ids: readonly string[],
): Promise<Map<string, PlannedNumbers>> {
  const found = new Map<string, PlannedNumbers>();
  for (const id of ids) {
    const [row] = (await manager.query(
      `SELECT json_extract(frozen, '$.spare.groupVolts') AS volts, json_extract(frozen, '$.target.volts') AS toVolts,
              json_extract(frozen, '$.spare.capacityAh') AS ampHours
       FROM charge WHERE id = ? AND workshop_id = ?`,
      [id, workshopId],
    )) as { volts: string | null; toVolts: number | null; ampHours: string | number | null }[];
    if (!row) continue;
    const { volts, toVolts, ampHours } = row;
    found.set(id, {
      fromVolts: volts === null ? null : mean(JSON.parse(volts) as number[]),
      toVolts,
      groupAh: typeof ampHours === 'string' ? mean(JSON.parse(ampHours) as number[]) : ampHours,
    });
  }
  return found;
}
export interface PlannedNumbers {
  fromVolts: number | null;
  toVolts: number | null;
  groupAh: number | null;
}
const mean = (values: readonly number[]): number => values.reduce((sum, one) => sum + one, 0) / values.length;

/** Of a charge: channel and charger of its first step, and when its first channel was taken and its last one freed. */
export interface ChannelUse {
  channelId: string;
  chargerId: string;
  fromAt: number;
  /** Null: it has one still. */
  toAt: number | null;
}

/** How each charge used channels, by its id; one without a channel is left out. */
export async function channelUses(
  manager: EntityManager,
  workshopId: string,
  chargeIds: readonly string[],
): Promise<Map<string, ChannelUse>> {
  const rows = await manager
    .createQueryBuilder(ChannelHold, 'hold')
    .innerJoin(Channel, 'channel', 'channel.id = hold.channelId')
    .select('hold.chargeId', 'chargeId')
    .addSelect('hold.channelId', 'channelId')
    .addSelect('channel.chargerId', 'chargerId')
    .addSelect('hold.fromAt', 'fromAt')
    .addSelect('hold.toAt', 'toAt')
    .where('hold.workshopId = :workshopId AND hold.chargeId IN (:...chargeIds)', {
      workshopId,
      chargeIds: [...chargeIds],
    })
    .orderBy('hold.stepIndex', 'DESC')
    .addOrderBy('channel.name', 'DESC')
    .getRawMany<ChannelUse & { chargeId: string }>();
  const uses = new Map<string, ChannelUse>();
  for (const { chargeId, ...use } of rows) {
    const later = uses.get(chargeId);
    // The first step comes last, so that it is the one whose channel stays.
    const toAt = !later ? use.toAt : use.toAt === null || later.toAt === null ? null : Math.max(use.toAt, later.toAt);
    uses.set(chargeId, { ...use, fromAt: Math.min(use.fromAt, later?.fromAt ?? use.fromAt), toAt });
  }
  return uses;
}

/**
 * A page of rows, newest first.
 *
 * EXPLAIN QUERY PLAN: SEARCH finished_wait USING PRIMARY KEY (workshop_id=? AND ready_at>? AND ready_at<?), read backwards,
 * nothing sorted.
 */
export async function finishedWaitPage(
  manager: EntityManager,
  filter: WaitFilter,
  size: number,
  after: { readyAt: number; chargeId: string } | null,
): Promise<FinishedWait[]> {
  const { text, values } = rowsOf(
    after === null ? filter : { ...filter, toAt: Math.min(filter.toAt, after.readyAt + 1) },
  );
  const { columns: all } = manager.connection.getMetadata(FinishedWait);
  const rows = (await manager.query(
    `SELECT ${all.map(({ databaseName, propertyName }) => `${databaseName} AS ${propertyName}`).join(', ')} ${text}
     ${after === null ? '' : 'AND (ready_at, charge_id) < (?, ?)'} ORDER BY ready_at DESC, charge_id DESC LIMIT ?`,
    [...values, ...(after === null ? [] : [after.readyAt, after.chargeId]), size],
  )) as (Omit<FinishedWait, 'inBand'> & { inBand: number })[];
  return rows.map((row) => ({ ...row, inBand: row.inBand === 1 }));
}
