import { In, type EntityManager } from 'typeorm';
import { Channel } from '../entities/channel';
import { Charger } from '../entities/charger';

export const listChargers = (manager: EntityManager, workshopId: string): Promise<Charger[]> =>
  manager.find(Charger, { where: { workshopId }, order: { name: 'ASC' } });

export const findCharger = (manager: EntityManager, workshopId: string, id: string): Promise<Charger | null> =>
  manager.findOneBy(Charger, { workshopId, id });

export const findChargerNamed = (manager: EntityManager, workshopId: string, name: string): Promise<Charger | null> =>
  manager.findOneBy(Charger, { workshopId, name });

export const findChannel = (manager: EntityManager, workshopId: string, id: string): Promise<Channel | null> =>
  manager.findOneBy(Channel, { workshopId, id });

/** All channels, the retired ones too, by name. */
export const listChannels = (manager: EntityManager, workshopId: string): Promise<Channel[]> =>
  manager.find(Channel, { where: { workshopId }, order: { name: 'ASC' } });

export const findChannelsNamed = (manager: EntityManager, workshopId: string, names: string[]): Promise<Channel[]> =>
  manager.findBy(Channel, { workshopId, name: In(names) });

/** Channels that a plan may use: neither they nor their charger are retired. */
export async function listUsableChannels(
  manager: EntityManager,
  workshopId: string,
): Promise<{ channel: Channel; charger: Charger }[]> {
  const chargers = new Map((await listChargers(manager, workshopId)).map((charger) => [charger.id, charger]));
  return (await listChannels(manager, workshopId)).flatMap((channel) => {
    const charger = chargers.get(channel.chargerId);
    return charger && !charger.retired && !channel.retired ? [{ channel, charger }] : [];
  });
}

export const saveCharger = (manager: EntityManager, charger: Charger): Promise<Charger> =>
  manager.save(Charger, charger);

export const saveChannels = (manager: EntityManager, channels: Channel[]): Promise<Channel[]> =>
  manager.save(Channel, channels);

/** Chargers that name a meter as their own. */
export const countChargersWithMeter = (manager: EntityManager, workshopId: string, meterId: string): Promise<number> =>
  manager.countBy(Charger, { workshopId, meterId });
