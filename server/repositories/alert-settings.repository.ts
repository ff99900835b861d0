import { In, type EntityManager } from 'typeorm';
import { AlertSetting } from '../entities/alert-setting';

/** Settings by person; who has none is not there. */
export async function alertSettingsOf(
  manager: EntityManager,
  workshopId: string,
  personIds: readonly string[],
): Promise<Map<string, AlertSetting>> {
  if (personIds.length === 0) return new Map();
  const rows = await manager.findBy(AlertSetting, { workshopId, personId: In([...personIds]) });
  return new Map(rows.map((row) => [row.personId, row]));
}

/** Writes a person's settings, which there is one row of. */
export async function saveAlertSetting(manager: EntityManager, row: AlertSetting): Promise<void> {
  const { id, workshopId, personId, ...values } = row;
  const { affected } = await manager.update(AlertSetting, { workshopId, personId }, values);
  if (!affected) await manager.insert(AlertSetting, { id, workshopId, personId, ...values });
}
