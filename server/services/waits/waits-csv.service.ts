import { Readable } from 'node:stream';
import type { EntityManager } from 'typeorm';
import {
  waitDimensions,
  type WaitDimension,
  type WaitGroupDto,
  type WaitsCsvQuery,
  type WaitSpreadDto,
} from '@/shared/contract/waits';
import type { Deps, Member } from '../../deps';
import { csvBegin, csvLines, type CsvCell } from '../csv';
import { waitRowDto, waitRowPage } from './wait-charges.service';
import { waitAsk, type WaitAsk } from './wait-filter';
import { dimensionNames, wayNames } from '@/shared/contract/wait-names';
import { waitNames } from './wait-names';
import { localMinute, waitGroups, waits } from './waits.service';

const CSV_PAGE = 500;

export interface CsvFile {
  name: string;
  lines: Readable;
}

/**
 * A figure's table or the charges behind it as a CSV; the charges are read and written page by page. What would begin a
 * formula in a spreadsheet is escaped.
 */
export async function waitsCsv(deps: Deps, member: Member, query: WaitsCsvQuery, now: number): Promise<CsvFile> {
  const { manager } = deps.dataSource;
  const ask = await waitAsk(manager, member.workshopId, query, now);
  const { what = 'charges', ...filters } = query;
  const { from, to } = ask.period;
  if (what === 'charges') return { name: `waits-${from}-${to}.csv`, lines: Readable.from(chargePages(manager, ask)) };
  const dimension = waitDimensions.find((one) => one === what);
  const table = dimension
    ? groupTable(dimension, (await waitGroups(deps, member, { ...filters, by: dimension }, now)).groups)
    : await figureTable(deps, member, what as 'weeks' | 'stages' | 'channels', filters, now);
  return { name: `waits-by-${what}-${from}-${to}.csv`, lines: Readable.from([csvBegin + csvLines(table)]) };
}

const hours = (value: number): number => Math.round(value * 100) / 100;
const minutes = (seconds: number): number => Math.round(seconds / 60);
const percent = (share: number): number => Math.round(share * 1000) / 10;
const spreadHead = [
  'Charges',
  'Waited, h',
  'Used, h',
  'Lost, h',
  'Half under, min',
  '9 of 10 under, min',
  'Fewer than 5',
];
const fewCell = (few: boolean): string => (few ? 'yes' : '');
const spreadCells = (one: WaitSpreadDto): CsvCell[] => [
  ...[one.charges, hours(one.waitHours), hours(one.usedHours), hours(one.lostHours)],
  ...[minutes(one.medianS), minutes(one.p90S), fewCell(one.few)],
];

function groupTable(by: WaitDimension, groups: readonly WaitGroupDto[]): CsvCell[][] {
  const planHead = ['Against the plan, min', 'Mean against the plan, min', 'Middle error, min', 'Inside band, %'];
  return [
    [dimensionNames[by], ...spreadHead, ...planHead],
    ...groups.map((group) => [
      group.name,
      ...spreadCells(group),
      ...[minutes(group.againstPlanS), minutes(group.biasS), minutes(group.absErrorS), percent(group.insideBand)],
    ]),
  ];
}

async function figureTable(
  deps: Deps,
  member: Member,
  what: 'weeks' | 'stages' | 'channels',
  filters: Omit<WaitsCsvQuery, 'what'>,
  now: number,
): Promise<CsvCell[][]> {
  const found = await waits(deps, member, filters, now);
  if (what === 'weeks')
    return [
      ['Week', 'Monday', ...spreadHead],
      ...found.weeks.map((week) => [week.week, week.monday, ...spreadCells(week)]),
    ];
  if (what === 'stages')
    return [
      ['Stage', 'Charges', 'Hours', 'Half under, min', '9 of 10 under, min', 'Fewer than 5'],
      ...found.stages.map((one) => [
        ...[one.stage, one.charges, hours(one.waitHours), minutes(one.medianS), minutes(one.p90S), fewCell(one.few)],
      ]),
    ];
  return [
    ['Channel', 'Charger', 'Busy, h', 'Working hours, h', 'Busy, %'],
    ...found.channels.map((one) => [
      ...[one.name, one.chargerName, hours(one.busyHours), hours(one.openHours)],
      one.share === null ? null : percent(one.share),
    ]),
  ];
}

const CHARGE_HEAD = [
  ...['Charge', 'Module type', 'Charger', 'Channel', 'Technician', 'Way', 'Asked', 'Ready', 'Waited, min', 'Used, min'],
  ...['Lost, min', 'Planned, min', 'Actual, min', 'Inside band', 'Queue, min', 'Charging, min', 'Tapering, min'],
  ...['Resting, min', 'Check due, min'],
];

async function* chargePages(manager: EntityManager, { filter, workshop: { zone } }: WaitAsk): AsyncGenerator<string> {
  const names = await waitNames(manager, filter.workshopId);
  yield csvBegin + csvLines([CHARGE_HEAD]);
  let after: string | null = null;
  do {
    const page: Awaited<ReturnType<typeof waitRowPage>> = await waitRowPage(manager, filter, CSV_PAGE, after);
    if (page.rows.length > 0)
      yield csvLines(
        page.rows.map((row) => {
          const dto = waitRowDto(row, names);
          const stage = (name: string): CsvCell => {
            const found = dto.stages.find((one) => one.stage === name);
            return found ? minutes(found.seconds) : null;
          };
          return [
            ...[dto.title, dto.typeName, dto.chargerName, dto.channelName, dto.technicianName, wayNames[dto.way]],
            ...[localMinute(row.wait.askedAt, zone), localMinute(row.wait.readyAt, zone)],
            ...[dto.waitS, dto.usedS, dto.lostS, dto.plannedS, dto.actualS].map(minutes),
            dto.insideBand ? 'yes' : 'no',
            ...['queue', 'charging', 'tapering', 'resting', 'check-due'].map(stage),
          ];
        }),
      );
    after = page.next;
  } while (after !== null);
}
