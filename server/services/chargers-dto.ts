import type { ChannelDto, ChargerDto } from '@/shared/contract/equipment';
import type { Channel } from '../entities/channel';
import type { Charger } from '../entities/charger';
import type { PersonName } from '../repositories/charge-stock.repository';
import type { ChannelHolder } from './channel-availability';
import { faultDto } from './channel-fault';
import { titleOf } from './charge-words';
import { toInstant } from './instants';

/** A charger with its channels in service; retired channels are left out. */
export function chargerDto(
  charger: Charger,
  channels: readonly Channel[],
  holders: ReadonlyMap<string, ChannelHolder>,
  people: ReadonlyMap<string, PersonName>,
): ChargerDto {
  return {
    id: charger.id,
    name: charger.name,
    place: charger.place,
    meterId: charger.meterId,
    channels: channels
      .filter((channel) => channel.chargerId === charger.id && !channel.retired)
      .map((channel) => channelDto(channel, charger, holders.get(channel.id), people)),
    retired: charger.retired,
    rev: charger.rev,
  };
}

const channelDto = (
  channel: Channel,
  charger: Charger,
  holder: ChannelHolder | undefined,
  people: ReadonlyMap<string, PersonName>,
): ChannelDto => ({
  id: channel.id,
  chargerId: charger.id,
  chargerName: charger.name,
  name: channel.name,
  maxAmps: channel.maxAmps,
  minAmps: channel.minAmps,
  maxVolts: channel.maxVolts,
  maxWatts: channel.maxWatts,
  adjustableVolts: channel.adjustableVolts,
  senses: channel.senses,
  leadMilliohm: channel.leadMilliohm,
  displayStepMillivolts: channel.displayStepMillivolts,
  displayStepAmps: channel.displayStepAmps,
  leadsMeasured: channel.leadsMeasured,
  deratingAboveCelsius: channel.deratingAboveCelsius,
  deratingPercent: channel.deratingPercent,
  dutyPercent: channel.dutyPercent,
  singleGroup: channel.singleGroup,
  canDischarge: channel.canDischarge,
  dischargeAmps: channel.dischargeAmps,
  loadOhm: channel.loadOhm,
  fault: faultDto(channel, people),
  heldBy: holder
    ? {
        chargeId: holder.charge.id,
        title: titleOf(holder.charge),
        stage: holder.charge.stage,
        freeAt: holder.freeAt === null ? null : toInstant(holder.freeAt),
      }
    : null,
});
