import { DateTime } from 'luxon';
import type { EntityManager } from 'typeorm';
import { openBetween } from '@/calc/index';
import type { ChannelBusyDto } from '@/shared/contract/waits';
import type { Workshop } from '../../entities/workshop';
import { listChannels, listChargers } from '../../repositories/chargers.repository';
import { heldStretches } from '../../repositories/wait-figures.repository';
import { presentSpans } from '../presence';
import { hours } from './wait-dto';

/**
 * How busy each channel was within working hours, as far as the period has passed; by name. A channel counts from when its
 * charger was added, or from its first hold where that is earlier; one that has gone counts only where it was held.
 */
export async function channelsBusy(
  manager: EntityManager,
  workshop: Workshop,
  period: { fromAt: number; toAt: number },
  now: number,
): Promise<ChannelBusyDto[]> {
  const { fromAt } = period;
  const toAt = Math.min(period.toAt, now);
  const held = toAt > fromAt ? await heldStretches(manager, workshop.id, fromAt, toAt) : new Map<string, never[]>();
  const chargers = new Map((await listChargers(manager, workshop.id)).map((charger) => [charger.id, charger]));
  const rows = (await listChannels(manager, workshop.id)).flatMap((channel) => {
    const charger = chargers.get(channel.chargerId);
    const own = held.get(channel.id) ?? [];
    const retired = channel.retired || charger?.retired === true;
    if (!charger || (retired && own.length === 0)) return [];
    const since = own.reduce((least, [from]) => Math.min(least, from), charger.createdAt);
    return [{ channel, charger, own, retired, since: Math.max(fromAt, since) }];
  });
  const first = rows.reduce((least, { since }) => Math.min(least, since), toAt);
  const open = openOf(workshop, first, toAt);
  return rows.map(({ channel, charger, own, retired, since }) => {
    const openMs = open(since, toAt);
    const busyMs = own.reduce((sum, [from, to]) => sum + open(from, to), 0);
    return {
      ...{ channelId: channel.id, name: channel.name, chargerName: charger.name, retired },
      ...{ busyHours: hours(busyMs), openHours: hours(openMs), share: openMs > 0 ? busyMs / openMs : null },
    };
  });
}

/** Working hours between two instants, ms, of the last workshops that were asked for: two years of days take a while. */
const kept = new Map<string, ReturnType<typeof openBetween>>();
const MOST_KEPT = 60;

/** Of whole days, so that the same is asked for all day. */
function openOf({ zone, workingHours }: Workshop, from: number, to: number): ReturnType<typeof openBetween> {
  const [first, last] = [from, to].map((at) => DateTime.fromMillis(at, { zone }));
  const [begin, end] = [first!.startOf('day').toMillis(), last!.endOf('day').toMillis() + 1];
  const key = JSON.stringify([zone, workingHours, begin, end]);
  const known = kept.get(key);
  if (known) return known;
  const spans = presentSpans({ zone, workingHours }, null, begin, end);
  // An instant is a minute to it: it only adds lengths up.
  const open = openBetween(spans.map((span) => ({ fromMinutes: span.from, toMinutes: span.to })));
  const [oldest] = kept.keys();
  if (kept.size >= MOST_KEPT && oldest !== undefined) kept.delete(oldest);
  kept.set(key, open);
  return open;
}
