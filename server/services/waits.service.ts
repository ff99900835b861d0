import { Readable } from 'node:stream';
import { DateTime } from 'luxon';
import type { EntityManager } from 'typeorm';
import type { WaitRowDto, WaitsDto, WaitsQuery } from '@/shared/contract/waits';
import type { Deps, Member } from '../deps';
import { listChargers } from '../repositories/chargers.repository';
import { listModuleTypes } from '../repositories/module-types.repository';
import {
  askedInstants,
  chargerOfCharges,
  listWaitedCharges,
  type WaitedCharge,
  type WaitPeriod,
} from '../repositories/waits.repository';
import { workshopForPlans } from '../repositories/workshop-for-plans.repository';
import { titleOf } from './charge-words';
import { csvBegin, csvLines } from './csv';
import { toInstant } from './instants';
import { waitPeriod, type DayPeriod } from './wait-period';
import { isInsideBand, waitFigures, waitSeconds, type Wait } from './wait-statistics';

/** Rows that the table carries; the CSV has all. */
const MOST_ROWS = 2000;
const CSV_PAGE = 500;
/** Charger of a charge that used none: a resistor alone. */
const NO_CHARGER = { id: '', name: 'no charger' };

/** The waits of a period: figures, and the charges they come from, newest first. */
export async function waits(deps: Deps, member: Member, query: WaitsQuery, now: number): Promise<WaitsDto> {
  const manager = deps.dataSource.manager;
  const ask = await askOf(manager, member.workshopId, query, now);
  const found = await waitsOf(manager, ask, await listWaitedCharges(manager, member.workshopId, ask.where));
  return { ...waitFigures(found, ask.period, ask.zone), rows: found.slice(0, MOST_ROWS).map(waitRowDto) };
}

export interface CsvFile {
  name: string;
  lines: Readable;
}

/**
 * The same charges as a CSV, read and written page by page. What would begin a formula in a spreadsheet is escaped.
 */
export async function waitsCsv(deps: Deps, member: Member, query: WaitsQuery, now: number): Promise<CsvFile> {
  const manager = deps.dataSource.manager;
  const ask = await askOf(manager, member.workshopId, query, now);
  return {
    name: `waits-${ask.period.from}-${ask.period.to}.csv`,
    lines: Readable.from(csvPages(manager, member.workshopId, ask)),
  };
}

async function* csvPages(manager: EntityManager, workshopId: string, ask: Ask): AsyncGenerator<string> {
  yield csvBegin + csvLines([CSV_HEADER]);
  let after: { readyAt: number; id: string } | null = null;
  for (;;) {
    const page: WaitedCharge[] = await listWaitedCharges(manager, workshopId, ask.where, { size: CSV_PAGE, after });
    const found = await waitsOf(manager, ask, page);
    if (found.length > 0) yield csvLines(found.map((wait) => csvRow(wait, ask.zone)));
    const last = page.at(-1);
    if (page.length < CSV_PAGE || !last) return;
    after = { readyAt: last.readyAt ?? 0, id: last.id };
  }
}

const CSV_HEADER = [
  'Charge',
  'Module type',
  'Charger',
  'Asked',
  'Ready',
  'Waited, min',
  'Planned, min',
  'Actual, min',
  'Inside band',
];

function csvRow(wait: Wait, zone: string): (string | number)[] {
  const local = (at: number): string => DateTime.fromMillis(at, { zone }).toFormat('yyyy-MM-dd HH:mm');
  const minutes = (seconds: number): number => Math.round(seconds / 60);
  const row = waitRowDto(wait);
  return [
    row.title,
    row.typeName,
    row.chargerName,
    local(wait.askedAt),
    local(wait.readyAt),
    minutes(row.waitS),
    minutes(row.plannedS),
    minutes(row.actualS),
    row.insideBand ? 'yes' : 'no',
  ];
}

interface Ask {
  workshopId: string;
  zone: string;
  period: DayPeriod;
  where: WaitPeriod;
  chargerId: string | null;
  typeNames: Map<string, string>;
  chargerNames: Map<string, string>;
  chargerOf: Map<string, string>;
}

async function askOf(manager: EntityManager, workshopId: string, query: WaitsQuery, now: number): Promise<Ask> {
  const { zone } = await workshopForPlans(manager, workshopId);
  const period = waitPeriod(query, zone, now);
  const where = { fromAt: period.fromAt, toAt: period.toAt, moduleTypeId: query.moduleTypeId ?? null };
  return {
    workshopId,
    zone,
    period,
    where,
    chargerId: query.chargerId ?? null,
    typeNames: new Map((await listModuleTypes(manager, workshopId)).map(({ id, name }) => [id, name])),
    chargerNames: new Map((await listChargers(manager, workshopId)).map(({ id, name }) => [id, name])),
    chargerOf: await chargerOfCharges(manager, workshopId, where),
  };
}

async function waitsOf(manager: EntityManager, ask: Ask, charges: WaitedCharge[]): Promise<Wait[]> {
  const firstAsked = await firstAskedInstants(manager, ask.workshopId, charges);
  return charges.flatMap((charge) => {
    const chargerId = ask.chargerOf.get(charge.id) ?? NO_CHARGER.id;
    if (charge.readyAt === null || (ask.chargerId !== null && chargerId !== ask.chargerId)) return [];
    return [
      {
        chargeId: charge.id,
        title: titleOf(charge),
        typeId: charge.moduleTypeId,
        typeName: ask.typeNames.get(charge.moduleTypeId) ?? '',
        chargerId,
        chargerName: ask.chargerNames.get(chargerId) ?? NO_CHARGER.name,
        askedAt: firstAsked.get(charge.id) ?? charge.createdAt,
        plannedAt: charge.createdAt,
        readyAt: charge.readyAt,
        earlyAt: charge.plannedEarlyAt,
        likelyAt: charge.plannedLikelyAt,
        lateAt: charge.plannedLateAt,
        startedAt: charge.startedAt,
        taperAt: charge.taperAt,
        currentEndAt: charge.currentEndAt,
        checkDueAt: charge.checkDueAt,
        checkedAt: charge.checkedAt,
      },
    ];
  });
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

const waitRowDto = (wait: Wait): WaitRowDto => ({
  chargeId: wait.chargeId,
  title: wait.title,
  typeName: wait.typeName,
  chargerName: wait.chargerName,
  askedAt: toInstant(wait.askedAt),
  readyAt: toInstant(wait.readyAt),
  waitS: waitSeconds(wait),
  plannedS: (wait.likelyAt - wait.plannedAt) / 1000,
  actualS: (wait.readyAt - wait.plannedAt) / 1000,
  insideBand: isInsideBand(wait),
});
