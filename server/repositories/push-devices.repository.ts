import { In, type EntityManager } from 'typeorm';
import { PushDevice } from '../entities/push-device';
import { Session } from '../entities/session';

/** Devices of people whose sessions go on: a device that was signed out gets nothing any more. Oldest first. */
export async function pushDevicesOf(
  manager: EntityManager,
  workshopId: string,
  personIds: readonly string[],
): Promise<PushDevice[]> {
  if (personIds.length === 0) return [];
  return manager
    .createQueryBuilder(PushDevice, 'device')
    .innerJoin(Session, 'session', 'session.id = device.session_id AND session.ended_at IS NULL')
    .where('device.workshop_id = :workshopId AND device.person_id IN (:...personIds)', {
      workshopId,
      personIds: [...personIds],
    })
    .orderBy('device.created_at', 'ASC')
    .addOrderBy('device.id', 'ASC')
    .getMany();
}

export const findPushDevice = (
  manager: EntityManager,
  workshopId: string,
  personId: string,
  id: string,
): Promise<PushDevice | null> => manager.findOneBy(PushDevice, { workshopId, personId, id });

/** Whoever has it: an address is one browser or one phone, and only who holds it can name it. */
export const findPushDeviceByAddress = (manager: EntityManager, address: string): Promise<PushDevice | null> =>
  manager.findOneBy(PushDevice, { address });

export async function insertPushDevice(manager: EntityManager, device: PushDevice): Promise<void> {
  await manager.insert(PushDevice, device);
}

export async function deletePushDevices(
  manager: EntityManager,
  workshopId: string,
  ids: readonly string[],
): Promise<void> {
  if (ids.length > 0) await manager.delete(PushDevice, { workshopId, id: In([...ids]) });
}
