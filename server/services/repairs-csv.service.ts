import { Readable } from 'node:stream';
import { DateTime } from 'luxon';
import type { EntityManager } from 'typeorm';
import type { RepairsQuery, RepairState } from '@/shared/contract/repair';
import { repairStepNames } from '@/shared/contract/repair-steps';
import type { Deps, Member } from '../deps';
import { listRepairs } from '../repositories/repairs.repository';
import { workshopForPlans } from '../repositories/workshop-for-plans.repository';
import { csvBegin, csvLines, type CsvCell } from './csv';
import { packDto, repairCard } from './repair-dto';
import { loadRepairFiles, type RepairFile } from './repair-file';

const CSV_PAGE = 100;
/** What is written where no state is asked for: the deleted ones are no work of the workshop. */
const allStates: readonly RepairState[] = ['open', 'handed-over', 'archived'];
const stateWords: Record<RepairState, string> = {
  open: 'open',
  'handed-over': 'handed over',
  archived: 'in the archive',
  deleted: 'deleted',
};

const CSV_HEADER = [
  ...['Number', 'Vehicle', 'Bay', 'Customer', 'With', 'State', 'Step', 'Module type', 'Groups', 'Modules'],
  ...['Failing module', 'Spread, mV', 'Target, V', 'Spare', 'Booked', 'Promised', 'Handed over', 'Waited, min'],
];

/** Repairs as a CSV, read and written page by page; times in the workshop's zone. */
export async function repairsCsv(deps: Deps, member: Member, query: RepairsQuery, now: number) {
  const { manager } = deps.dataSource;
  const { zone } = await workshopForPlans(manager, member.workshopId);
  const states = query.state === undefined ? allStates : [query.state];
  const looked = query.q?.trim().toLowerCase() ?? '';
  return {
    name: `repairs-${DateTime.fromMillis(now, { zone }).toFormat('yyyy-MM-dd')}.csv`,
    lines: Readable.from(pages(manager, member.workshopId, { states, looked, zone, now })),
  };
}

interface Ask {
  states: readonly RepairState[];
  looked: string;
  zone: string;
  now: number;
}

async function* pages(manager: EntityManager, workshopId: string, ask: Ask): AsyncGenerator<string> {
  yield csvBegin + csvLines([CSV_HEADER]);
  for (const state of ask.states)
    for (let page = 1; ; page += 1) {
      const rows = await listRepairs(manager, workshopId, state, ask.looked, page, CSV_PAGE);
      const files = await loadRepairFiles(manager, workshopId, rows);
      if (files.length > 0) yield csvLines(files.map((file) => csvRow(file, ask)));
      if (rows.length < CSV_PAGE) break;
    }
}

function csvRow(file: RepairFile, { zone, now }: Ask): CsvCell[] {
  const { repair, waits, type, spare } = file;
  const card = repairCard(file, now);
  const local = (at: number | null): string | null =>
    at === null ? null : DateTime.fromMillis(at, { zone }).toFormat('yyyy-MM-dd HH:mm');
  const waitedMs = waits.reduce((sum, { fromAt, toAt }) => sum + Math.max(0, (toAt ?? now) - fromAt), 0);
  return [
    ...[repair.number, repair.vehicle, repair.bay, repair.customerName],
    ...[card.people.map(({ name }) => name).join(', '), stateWords[card.state]],
    ...[card.step === null ? null : repairStepNames[card.step], type?.name ?? null],
    ...[repair.groupCount, packDto(repair, null).moduleCount, card.failing, card.spreadMillivolts],
    ...[repair.target?.volts ?? null, spare?.label ?? null],
    ...[local(repair.bookedAt), local(repair.promisedAt), local(repair.handedOverAt)],
    waits.length === 0 ? null : Math.round(waitedMs / 60_000),
  ];
}
