import type { EntityManager } from 'typeorm';
import type { WaitChargesDto, WaitChargesQuery, WaitRowDto, WaitStage } from '@/shared/contract/waits';
import type { Deps, Member } from '../../deps';
import type { FinishedWait } from '../../entities/finished-wait';
import type { WaitFilter } from '../../repositories/wait-figures.repository';
import { finishedWaitPage, waitedChargesById, type WaitedCharge } from '../../repositories/waits.repository';
import { titleOf } from '../charge-words';
import { toInstant } from '../instants';
import { waitAsk } from './wait-filter';
import { waitNames, type WaitNames } from './wait-names';

/** Rows of a page on a screen. */
const PAGE = 100;

/** A finished wait with its charge. */
export interface WaitRow {
  wait: FinishedWait;
  charge: WaitedCharge;
}

/** The charges behind a number, newest first, a page after another. */
export async function waitCharges(
  deps: Deps,
  member: Member,
  query: WaitChargesQuery,
  now: number,
): Promise<WaitChargesDto> {
  const { manager } = deps.dataSource;
  const { filter } = await waitAsk(manager, member.workshopId, query, now);
  const names = await waitNames(manager, member.workshopId);
  const { rows, next } = await waitRowPage(manager, filter, PAGE, query.after ?? null);
  return { rows: rows.map((row) => waitRowDto(row, names)), next };
}

/** One page of rows, and the mark of the next; null: this is the last. */
export async function waitRowPage(
  manager: EntityManager,
  filter: WaitFilter,
  size: number,
  after: string | null,
): Promise<{ rows: WaitRow[]; next: string | null }> {
  const [readyAt, ...id] = (after ?? '').split('.');
  const waits = await finishedWaitPage(
    manager,
    filter,
    size + 1,
    after === null ? null : { readyAt: Number(readyAt), chargeId: id.join('.') },
  );
  const page = waits.slice(0, size);
  const charges = await waitedChargesById(
    manager,
    filter.workshopId,
    page.map(({ chargeId }) => chargeId),
  );
  const byId = new Map(charges.map((charge) => [charge.id, charge]));
  const last = page.at(-1);
  return {
    rows: page.flatMap((wait) => {
      const charge = byId.get(wait.chargeId);
      return charge ? [{ wait, charge }] : [];
    }),
    next: waits.length > size && last ? `${last.readyAt}.${last.chargeId}` : null,
  };
}

const stagesOf = (wait: FinishedWait): [WaitStage, number | null][] => [
  ['queue', wait.queueMs],
  ['charging', wait.chargingMs],
  ['tapering', wait.taperingMs],
  ['resting', wait.restingMs],
  ['check-due', wait.checkDueMs],
];

export const waitRowDto = ({ wait, charge }: WaitRow, names: WaitNames): WaitRowDto => ({
  chargeId: wait.chargeId,
  title: titleOf(charge),
  typeName: names['module-type'](wait.moduleTypeId),
  chargerName: names.charger(wait.chargerId),
  channelName: names.channel(wait.channelId),
  technicianName: names.technician(wait.technicianId),
  way: wait.way,
  askedAt: toInstant(wait.askedAt),
  readyAt: toInstant(wait.readyAt),
  waitS: wait.waitMs / 1000,
  usedS: wait.usedMs / 1000,
  lostS: wait.lostMs / 1000,
  plannedS: (charge.plannedLikelyAt - charge.createdAt) / 1000,
  actualS: (wait.readyAt - charge.createdAt) / 1000,
  insideBand: wait.inBand,
  stages: stagesOf(wait).flatMap(([stage, ms]) => (ms === null ? [] : [{ stage, seconds: ms / 1000 }])),
});
