/** Charges in the lanes of their channels. */
import type { PlanChannelDto, PlanChargeDto } from '@/shared/contract/bench-plan';
import type { Channel } from '../../entities/channel';
import { isFaulty } from '../channel-fault';
import { chargeCard } from '../charge-dto';
import type { ChargeFile } from '../charge-file';
import { isWaitingToStart } from '../charge-stages';
import { plainAmpsText } from '../charge-words';
import { toInstant } from '../instants';
import { lookInDto, type GivenLookIn } from './charge-look-ins';
import { hasTime, type BenchGround } from './ground';
import { heldSpans } from './held-spans';
import { overlaps } from './spans';

/** '10 A', 'two-way 10 A', 'one group 5 A', 'out of order' */
export function kindOf(channel: Channel): string {
  if (isFaulty(channel)) return 'out of order';
  const { maxAmps, canDischarge, singleGroup } = channel;
  const kind = canDischarge ? 'two-way ' : singleGroup ? 'one group ' : '';
  return `${kind}${plainAmpsText(maxAmps)}`;
}

/** Channels with when each is likely free; one whose charge is held back is free nobody knows when. */
export function planChannels({ channels, files, now }: BenchGround): PlanChannelDto[] {
  return channels.map((channel) => {
    // Nobody knows when it works again.
    let freeAt: number | null = isFaulty(channel) ? null : now;
    for (const file of files)
      for (const span of heldSpans(file, now)) {
        // What is only planned or queued has the channel later: it is free until then.
        if (span.channelId !== channel.id || span.to < now || span.from > now) continue;
        if (file.charge.stage === 'held') freeAt = null;
        else if (freeAt !== null && !isWaitingToStart(file.charge.stage)) freeAt = Math.max(freeAt, span.to);
      }
    return {
      id: channel.id,
      name: channel.name,
      kind: kindOf(channel),
      freeAt: freeAt === null ? null : toInstant(freeAt),
    };
  });
}

/** Why a charge cannot be moved; null: it can. */
export function fixedBecause({ charge }: ChargeFile, stuck: ReadonlyMap<string, string>): string | null {
  if (isWaitingToStart(charge.stage)) return stuck.get(charge.id) ?? null;
  if (charge.stage === 'held') return 'It is held: it keeps its channel until it goes on or is stopped.';
  if (charge.stage === 'resting' || charge.stage === 'check-due') return 'Its current is over: it rests where it is.';
  if (charge.startedAt !== null && charge.readyAt === null && charge.closedAt === null)
    return 'It is clipped on: it stays where it is.';
  return 'It is over.';
}

/** The charges whose time lies within the days. A plan that nobody has queued is shown from its clip-on time on. */
export function planCharges(
  ground: BenchGround,
  stuck: ReadonlyMap<string, string>,
  lookIns: readonly GivenLookIn[],
): PlanChargeDto[] {
  const { files, days, now } = ground;
  return files
    .filter((file) => hasTime(file, now))
    .flatMap((file) => {
      const holds = heldSpans(file, now);
      const card = chargeCard(file, now);
      const times = [
        ...holds,
        ...card.segments.map(({ from, to }) => ({ from: Date.parse(from), to: Date.parse(to) })),
      ];
      if (!times.some((one) => overlaps(one, days))) return [];
      return [
        {
          card,
          holds: holds.map(({ channelId, from, to }) => ({ channelId, from: toInstant(from), to: toInstant(to) })),
          fixedBecause: fixedBecause(file, stuck),
          lookIns: lookIns
            .filter((one) => one.file === file && one.doneAt === null)
            .map((one) => lookInDto(ground, one)),
        },
      ];
    });
}
