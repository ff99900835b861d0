/** A channel that somebody has called out of order, as a charge on it meets it. */
import type { ChannelFaultDto } from '@/shared/contract/equipment';
import type { Channel } from '../entities/channel';
import type { PersonName } from '../repositories/charge-stock.repository';
import { personRef } from './alert-dto';
import type { ChargeFile } from './charge-file';
import { isOpen, isRunning } from './charge-stages';
import { bare } from './charge-words';
import { toInstant } from './instants';

export type FaultyChannel = Channel & { faultAt: number; faultSeen: string };

export const isFaulty = (channel: Channel | undefined): channel is FaultyChannel =>
  channel !== undefined && channel.faultAt !== null && channel.faultSeen !== null;

/** 'B2 is out of order: no current.' */
export const faultWords = ({ name, faultSeen }: FaultyChannel): string =>
  `${name} is out of order: ${bare(faultSeen)}.`;

export const faultDto = (channel: Channel, people: ReadonlyMap<string, PersonName>): ChannelFaultDto | null =>
  isFaulty(channel)
    ? { at: toInstant(channel.faultAt), seen: channel.faultSeen, by: personRef(people, channel.faultById) }
    : null;

/** The channels that an open charge has or is to have, each once, by name. */
export function channelsOf({ charge, channels, holds }: ChargeFile): Channel[] {
  if (!isOpen(charge.stage)) return [];
  const ids = new Set(holds.filter(({ state }) => state !== 'released').map(({ channelId }) => channelId));
  return [...channels.values()].filter(({ id }) => ids.has(id));
}

export interface FaultOfCharge {
  channel: FaultyChannel;
  /** Current of this charge comes from it now; else it is to. */
  flows: boolean;
}

/** Those of them that are out of order. */
export const faultsOf = (file: ChargeFile): FaultOfCharge[] =>
  channelsOf(file)
    .filter(isFaulty)
    .map((channel) => ({
      channel,
      flows:
        isRunning(file.charge.stage) &&
        file.holds.some(({ channelId, state }) => channelId === channel.id && state === 'running'),
    }));
