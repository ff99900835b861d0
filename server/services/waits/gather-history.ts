/** Gathers what a replay is made from. */
import { setImmediate } from 'node:timers/promises';
import type { EntityManager } from 'typeorm';
import { chemistryParameters, guessedLongResistance, longResistance } from '@/calc/index';
import { MOST_REPLAYED } from '@/shared/contract/waits-replay';
import type { Channel } from '../../entities/channel';
import type { FinishedWait } from '../../entities/finished-wait';
import type { Workshop } from '../../entities/workshop';
import type { ModuleType } from '../../entities/module-type';
import { listChannels, listChargers } from '../../repositories/chargers.repository';
import { listModuleTypes } from '../../repositories/module-types.repository';
import { waitTotals } from '../../repositories/wait-figures.repository';
import { finishedWaitPage } from '../../repositories/waits.repository';
import { moduleParameters, workshopParameters } from '../plan-parameters';
import { NONE } from './finished-wait-row';
import type { HistoryCharge, ReplayHistory, ReplayKind, ReplayType } from './replay-history';
import type { WaitAsk } from './wait-filter';

/** Read at once, others are answered in between. */
const PAGE = 4000;
/** Kinds of channels that the simulator tells apart. */
const MOST_KINDS = 20;

export interface Gathered {
  history: ReplayHistory;
  /** Index of a channel's kind by its id; of those in use now and before. */
  kindOf: ReadonlyMap<string, number>;
  typeOf: ReadonlyMap<string, number>;
  leftOut: { charges: number; because: string }[];
}

/** The newest charges of a period with the channels and module types of the workshop. */
export async function gatherHistory(manager: EntityManager, { filter, workshop }: WaitAsk): Promise<Gathered> {
  const { kinds, kindOf } = await gatherKinds(manager, workshop.id);
  const types = await listModuleTypes(manager, workshop.id);
  const typeOf = new Map(types.map(({ id }, place) => [id, place]));
  const left = new Map<string, number>();
  const leave = (because: string, charges = 1): void => {
    if (charges > 0) left.set(because, (left.get(because) ?? 0) + charges);
  };
  const charges: HistoryCharge[] = [];
  const all = (await waitTotals(manager, filter)).charges;
  leave(`Only the newest ${MOST_REPLAYED.toLocaleString('en')} of a period are replayed.`, all - MOST_REPLAYED);
  let after: Parameters<typeof finishedWaitPage>[3] = null;
  for (let read = 0; read < Math.min(all, MOST_REPLAYED);) {
    const size = Math.min(PAGE, MOST_REPLAYED - read);
    const rows: FinishedWait[] = await finishedWaitPage(manager, filter, size, after);
    for (const row of rows) {
      const charge = historyCharge(row, kindOf, typeOf);
      if (typeof charge === 'string') leave(charge);
      else charges.push(charge);
    }
    const last = rows.at(-1);
    if (!last || rows.length < size) break;
    after = { readyAt: last.readyAt, chargeId: last.chargeId };
    read += rows.length;
    await setImmediate();
  }
  const history: ReplayHistory = {
    charges,
    kinds,
    types: types.map(replayType),
    hours: { zone: workshop.zone, workingHours: workshop.workingHours },
    lookInMinutes: workshop.lookInMinutes,
    unattended: workshop.unattendedCharges === true,
    hands: handsOf(workshop),
  };
  return { history, kindOf, typeOf, leftOut: [...left].map(([because, count]) => ({ charges: count, because })) };
}

/** Times of hands at a charge. */
export function handsOf(workshop: Workshop): ReplayHistory['hands'] {
  const { clipOnS, clipOffS, busbarsS } = workshopParameters(workshop, 0);
  return { clipOnS, clipOffS, busbarsS };
}

/** A row as the replay takes it, or why it cannot. */
function historyCharge(
  row: FinishedWait,
  kindOf: ReadonlyMap<string, number>,
  typeOf: ReadonlyMap<string, number>,
): HistoryCharge | string {
  if (row.channelId === NONE) return 'They used no channel.';
  const { heldFromAt, heldToAt, fromVolts, toVolts, groupAh } = row;
  if (heldFromAt === null || heldToAt === null || heldToAt <= heldFromAt)
    return 'Nothing is written down of their time on a channel.';
  if (fromVolts === null || toVolts === null || groupAh === null || !(groupAh > 0))
    return 'Nothing is written down of the volts they were planned with.';
  const kind = kindOf.get(row.channelId);
  const type = typeOf.get(row.moduleTypeId);
  if (kind === undefined || type === undefined) return 'Their channel or module type is not kept here any more.';
  const open = row.usedMs + row.lostMs;
  return {
    ...{ id: row.chargeId, type, kind, way: row.way, fromVolts, toVolts, groupAh, heldFromAt, heldToAt },
    ...{ askedAt: row.askedAt, bookedAt: row.bookedAt, dueAt: row.dueAt, readyAt: row.readyAt },
    usedShare: open > 0 ? row.usedMs / open : 0,
  };
}

/** Channels by what decides how long a charge takes; the kinds with the most channels first. */
export async function gatherKinds(
  manager: EntityManager,
  workshopId: string,
): Promise<{ kinds: ReplayKind[]; kindOf: Map<string, number> }> {
  const gone = new Set((await listChargers(manager, workshopId)).filter(({ retired }) => retired).map(({ id }) => id));
  const found = new Map<string, { kind: ReplayKind; ids: string[] }>();
  for (const channel of await listChannels(manager, workshopId)) {
    const kind = kindOfChannel(channel);
    const key = JSON.stringify(kind);
    const one = found.get(key) ?? { kind, ids: [] };
    found.set(key, one);
    one.ids.push(channel.id);
    if (!channel.retired && !gone.has(channel.chargerId)) one.kind = { ...one.kind, count: one.kind.count + 1 };
  }
  const most = [...found.values()]
    .sort((one, other) => other.kind.count - one.kind.count || other.ids.length - one.ids.length)
    .slice(0, MOST_KINDS);
  return {
    kinds: most.map(({ kind }) => kind),
    kindOf: new Map(most.flatMap(({ ids }, place) => ids.map((id): [string, number] => [id, place]))),
  };
}

const kindOfChannel = (channel: Channel): ReplayKind => ({
  count: 0,
  maxAmps: channel.maxAmps,
  maxVolts: channel.maxVolts,
  maxWatts: channel.maxWatts,
  leadOhm: channel.leadMilliohm / 1000,
  singleGroup: channel.singleGroup,
  adjustableVolts: channel.adjustableVolts,
  dischargeAmps: channel.canDischarge
    ? (channel.dischargeAmps ?? (channel.loadOhm === null ? channel.maxAmps : null))
    : null,
  loadOhm: channel.canDischarge && channel.dischargeAmps === null ? channel.loadOhm : null,
});

/** A module type as the replay takes it. */
export function replayType(type: ModuleType): ReplayType {
  const module = moduleParameters(type);
  const ohm =
    module.resistanceOhm === null
      ? guessedLongResistance(type.chemistry, type.ratedAh)
      : longResistance(module.resistanceKind, module.resistanceOhm);
  return {
    curve: module.curve ?? chemistryParameters(type.chemistry).curve,
    groups: type.groupsInSeries,
    groupOhm: ohm + module.linkResistanceOhm,
    ratedAh: type.ratedAh,
    maxChargeAmps: type.maxChargeAmps,
    maxDischargeAmps: type.maxDischargeAmps,
    capVolts: type.chargeLimitVolts,
    floorVolts: type.dischargeLimitVolts,
  };
}
