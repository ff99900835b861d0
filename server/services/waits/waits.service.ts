import { setImmediate } from 'node:timers/promises';
import { DateTime } from 'luxon';
import type { EntityManager } from 'typeorm';
import type { WaitGroupDto, WaitGroupsDto, WaitsDto, WaitsQuery, WaitDimension } from '@/shared/contract/waits';
import type { Deps, Member } from '../../deps';
import {
  waitGroupRows,
  waitStageRows,
  waitTotals,
  waitWeekRows,
  waitsReach,
  type SpreadRow,
  type WaitFilter,
} from '../../repositories/wait-figures.repository';
import { channelsBusy } from './channel-busy';
import { noSpread, planDto, spreadDto, stageDto } from './wait-dto';
import { waitAsk, type WaitAsk } from './wait-filter';
import { waitNames } from './wait-names';
import { mondayOf, weekNumberOf } from './wait-period';

/** Weeks without a charge are shown in a period of at most so many: a year. */
const SHOWN_EMPTY = 54;

/**
 * The waits of a period as figures. Each figure is a statement of its own, and others are answered between two of them: of
 * 200,000 charges one takes a fifth of a second.
 */
export async function waits(deps: Deps, member: Member, query: WaitsQuery, now: number): Promise<WaitsDto> {
  const { manager } = deps.dataSource;
  const ask = await waitAsk(manager, member.workshopId, query, now);
  const { filter, period, workshop } = ask;
  const totals = await waitTotals(manager, filter);
  await setImmediate();
  const stages = await waitStageRows(manager, filter);
  await setImmediate();
  const weeks = await weeksOf(manager, ask);
  await setImmediate();
  const byModuleType = await groupsBy(manager, filter, 'module-type');
  await setImmediate();
  return {
    ...spreadDto(totals),
    from: period.from,
    to: period.to,
    plan: totals.charges === 0 ? null : planDto(totals),
    weeks,
    stages: stages.filter(({ row }) => row.charges > 0).map(({ stage, row }) => stageDto(stage, row)),
    byModuleType,
    channels: await channelsBusy(manager, workshop, period, now),
  };
}

/** The same parted by one dimension. */
export async function waitGroups(
  deps: Deps,
  member: Member,
  query: WaitsQuery & { by: WaitDimension },
  now: number,
): Promise<WaitGroupsDto> {
  const { manager } = deps.dataSource;
  const { filter } = await waitAsk(manager, member.workshopId, query, now);
  return { by: query.by, groups: await groupsBy(manager, filter, query.by) };
}

async function groupsBy(manager: EntityManager, filter: WaitFilter, by: WaitDimension): Promise<WaitGroupDto[]> {
  const names = await waitNames(manager, filter.workshopId);
  const groups = (await waitGroupRows(manager, filter, by)).map((row): WaitGroupDto => ({
    key: row.key,
    name: names[by](row.key),
    ...spreadDto(row),
    ...planDto(row),
  }));
  if (by === 'weekday') return groups.sort((one, other) => Number(one.key) - Number(other.key));
  return groups.sort((one, other) => other.charges - one.charges || one.name.localeCompare(other.name));
}

/** Every week of the period, those without a charge too; of more than a year from the first one with a charge on. */
async function weeksOf(
  manager: EntityManager,
  { filter, period, workshop: { zone } }: WaitAsk,
): Promise<WaitsDto['weeks']> {
  const rows = new Map((await waitWeekRows(manager, filter)).map((row): [string, SpreadRow] => [row.monday, row]));
  const [least] = rows.keys();
  const reach = least === undefined ? null : await waitsReach(manager, filter.workshopId);
  const begin = reach === null ? null : mondayOf(Math.max(reach.first, period.fromAt), zone);
  let mondays = period.mondays;
  if (mondays.length > SHOWN_EMPTY) mondays = begin === null ? [] : mondays.filter((monday) => monday >= begin);
  return mondays.map((monday) => {
    const row = rows.get(monday);
    const { charges, ...figures } = row === undefined ? noSpread : spreadDto(row);
    return { monday, week: weekNumberOf(monday), charges, ...figures };
  });
}

/** Of an instant by the workshop's clock: '2026-06-09 10:00'. */
export const localMinute = (at: number, zone: string): string =>
  DateTime.fromMillis(at, { zone }).toFormat('yyyy-MM-dd HH:mm');
