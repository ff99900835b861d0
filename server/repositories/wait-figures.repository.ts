/**
 * The figures of the waiting statistics, out of the database itself: medians and 90th percentiles are SQLite's
 * `percentile_cont`, which is the quantile of type 7. Raw SQL, because a query builder knows no percentile.
 *
 * EXPLAIN QUERY PLAN of every one of them: SEARCH finished_wait USING PRIMARY KEY (workshop_id=? AND ready_at>? AND
 * ready_at<?), and of the grouped ones USE TEMP B-TREE FOR GROUP BY. That of the holds: SEARCH channel_hold USING COVERING
 * INDEX ix_channel_hold_time (workshop_id=? AND state=? AND to_at>?).
 */
import type { EntityManager } from 'typeorm';
import type { WaitDimension, WaitStage, waitWays } from '@/shared/contract/waits';

export interface WaitFilter {
  workshopId: string;
  /** Ready from here on, and before `toAt`, epoch ms. */
  fromAt: number;
  toAt: number;
  moduleTypeId?: string | undefined;
  chargerId?: string | undefined;
  channelId?: string | undefined;
  technicianId?: string | undefined;
  way?: (typeof waitWays)[number] | undefined;
  weekday?: number | undefined;
  /** What is measured; left out: the whole wait. */
  stage?: WaitStage | undefined;
  /** Monday of a week. */
  monday?: string | undefined;
}

const dimensionColumns: Record<WaitDimension, string> = {
  'module-type': 'module_type_id',
  charger: 'charger_id',
  channel: 'channel_id',
  technician: 'technician_id',
  way: 'way',
  weekday: 'weekday',
};
export const stageColumns: Record<WaitStage, string> = {
  queue: 'queue_ms',
  charging: 'charging_ms',
  tapering: 'tapering_ms',
  resting: 'resting_ms',
  'check-due': 'check_due_ms',
};
export const measureOf = ({ stage }: WaitFilter): string => (stage === undefined ? 'wait_ms' : stageColumns[stage]);

export interface Sql {
  text: string;
  values: (string | number)[];
}

/** The rows of a filter, as the end of a statement. */
export function rowsOf(filter: WaitFilter): Sql {
  const given: [string, string | number | undefined][] = [
    ['module_type_id', filter.moduleTypeId],
    ['charger_id', filter.chargerId],
    ['channel_id', filter.channelId],
    ['technician_id', filter.technicianId],
    ['way', filter.way],
    ['weekday', filter.weekday],
    ['monday', filter.monday],
  ];
  const set = given.filter((one): one is [string, string | number] => one[1] !== undefined);
  const stage = filter.stage === undefined ? '' : ` AND ${stageColumns[filter.stage]} IS NOT NULL`;
  return {
    text: `FROM finished_wait WHERE workshop_id = ? AND ready_at >= ? AND ready_at < ?${set
      .map(([column]) => ` AND ${column} = ?`)
      .join('')}${stage}`,
    values: [filter.workshopId, filter.fromAt, filter.toAt, ...set.map(([, value]) => value)],
  };
}

/** Of a number of charges, ms; medians are null where there is none. */
export interface SpreadRow {
  charges: number;
  waitMs: number;
  medianMs: number | null;
  p90Ms: number | null;
  usedMs: number;
  lostMs: number;
}
export interface PlanRow {
  lateMedianMs: number | null;
  biasMs: number | null;
  errorMs: number | null;
  insideBand: number | null;
}
export interface StageRow {
  charges: number;
  waitMs: number;
  medianMs: number | null;
  p90Ms: number | null;
}

const spread = (measure: string): string => `count(*) AS charges, total(${measure}) AS waitMs,
  percentile_cont(${measure}, 0.5) AS medianMs, percentile_cont(${measure}, 0.9) AS p90Ms,
  total(used_ms) AS usedMs, total(lost_ms) AS lostMs`;
const plan = `percentile_cont(late_ms, 0.5) AS lateMedianMs, avg(late_ms) AS biasMs,
  percentile_cont(abs(late_ms), 0.5) AS errorMs, avg(in_band) AS insideBand`;

/** All charges of a filter together. */
export async function waitTotals(manager: EntityManager, filter: WaitFilter): Promise<SpreadRow & PlanRow> {
  const rows = rowsOf(filter);
  const [row] = (await manager.query(`SELECT ${spread(measureOf(filter))}, ${plan} ${rows.text}`, rows.values)) as [
    SpreadRow & PlanRow,
  ];
  return row;
}

/** Each stage over the charges that had it. */
export async function waitStageRows(
  manager: EntityManager,
  filter: WaitFilter,
): Promise<{ stage: WaitStage; row: StageRow }[]> {
  const rows = rowsOf(filter);
  const stages = Object.entries(stageColumns) as [WaitStage, string][];
  const parts = stages.map(
    ([, column], place) => `count(${column}) AS n${place}, total(${column}) AS t${place},
      percentile_cont(${column}, 0.5) AS m${place}, percentile_cont(${column}, 0.9) AS q${place}`,
  );
  const [found] = (await manager.query(`SELECT ${parts.join(', ')} ${rows.text}`, rows.values)) as [
    Record<string, number | null>,
  ];
  return stages.map(([stage], place) => ({
    stage,
    row: {
      charges: found[`n${place}`] ?? 0,
      waitMs: found[`t${place}`] ?? 0,
      medianMs: found[`m${place}`] ?? null,
      p90Ms: found[`q${place}`] ?? null,
    },
  }));
}

/** By week in which they became ready; weeks without a charge are left out. */
export async function waitWeekRows(
  manager: EntityManager,
  filter: WaitFilter,
): Promise<(SpreadRow & { monday: string })[]> {
  const rows = rowsOf(filter);
  return (await manager.query(
    `SELECT monday, ${spread(measureOf(filter))} ${rows.text} GROUP BY monday ORDER BY monday`,
    rows.values,
  )) as (SpreadRow & { monday: string })[];
}

/** By a dimension; most charges first. */
export async function waitGroupRows(
  manager: EntityManager,
  filter: WaitFilter,
  by: WaitDimension,
): Promise<(SpreadRow & PlanRow & { key: string })[]> {
  const rows = rowsOf(filter);
  const found = (await manager.query(
    `SELECT ${dimensionColumns[by]} AS key, ${spread(measureOf(filter))}, ${plan} ${rows.text}
     GROUP BY ${dimensionColumns[by]} ORDER BY charges DESC`,
    rows.values,
  )) as (SpreadRow & PlanRow & { key: string | number })[];
  return found.map((row) => ({ ...row, key: String(row.key) }));
}

/** Every measured length, ms; as one text out of the database, which takes a quarter of the time of as many rows. */
export async function waitLengths(manager: EntityManager, filter: WaitFilter): Promise<number[]> {
  const rows = rowsOf(filter);
  const [found] = (await manager.query(
    `SELECT json_group_array(${measureOf(filter)}) AS lengths ${rows.text}`,
    rows.values,
  )) as [{ lengths: string }];
  return JSON.parse(found.lengths) as number[];
}

/** The first and the last charge of a workshop that became ready, epoch ms; null: none has. */
export async function waitsReach(
  manager: EntityManager,
  workshopId: string,
): Promise<{ first: number; last: number } | null> {
  const [found] = (await manager.query(
    `SELECT (SELECT min(ready_at) FROM finished_wait WHERE workshop_id = ?) AS first,
            (SELECT max(ready_at) FROM finished_wait WHERE workshop_id = ?) AS last`,
    [workshopId, workshopId],
  )) as [{ first: number | null; last: number | null }];
  return found.first === null || found.last === null ? null : { first: found.first, last: found.last };
}

/** Of each channel that was held within a period: the stretches, cut to it, epoch ms. */
export async function heldStretches(
  manager: EntityManager,
  workshopId: string,
  fromAt: number,
  toAt: number,
): Promise<Map<string, [from: number, to: number][]>> {
  const ended = (await manager.query(
    `SELECT channel_id AS channelId, json_group_array(json_array(max(from_at, ?), min(to_at, ?))) AS held
     FROM channel_hold WHERE workshop_id = ? AND state = 'released' AND to_at > ? AND from_at < ? GROUP BY channel_id`,
    [fromAt, toAt, workshopId, fromAt, toAt],
  )) as { channelId: string; held: string }[];
  const running = (await manager.query(
    `SELECT channel_id AS channelId, from_at AS fromAt FROM channel_hold
     WHERE workshop_id = ? AND state = 'running' AND to_at IS NULL AND from_at < ?`,
    [workshopId, toAt],
  )) as { channelId: string; fromAt: number }[];
  const found = new Map(ended.map(({ channelId, held }) => [channelId, JSON.parse(held) as [number, number][]]));
  for (const { channelId, fromAt: begun } of running) {
    const own = found.get(channelId) ?? [];
    own.push([Math.max(begun, fromAt), toAt]);
    found.set(channelId, own);
  }
  return found;
}
