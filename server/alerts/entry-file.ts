/** What decides about an entry of the outbox at the moment it is to go out. */
import type { EntityManager } from 'typeorm';
import type { Alert } from '../entities/alert';
import type { OutboxEntry } from '../entities/outbox-entry';
import type { Person } from '../entities/person';
import type { PushDevice } from '../entities/push-device';
import type { Workshop } from '../entities/workshop';
import { alertSettingsOf } from '../repositories/alert-settings.repository';
import { findAlert } from '../repositories/alerts.repository';
import { findWorkshop } from '../repositories/charge-stock.repository';
import { findPerson } from '../repositories/people.repository';
import { pushDevicesOf } from '../repositories/push-devices.repository';
import { isHeld } from '@/shared/contract/quiet-hours';
import { quietUntil } from './quiet-until';

export interface EntryFile {
  alert: Alert;
  person: Person;
  workshop: Workshop;
  /** Devices of the entry's way that it has not reached yet. */
  devices: PushDevice[];
  /** The quiet hours of its person last until then, epoch ms; null: it may go out now. */
  heldUntil: number | null;
}

/** @returns why it is not needed any more, as a sentence; else all that its sending needs */
export async function readEntryFile(
  manager: EntityManager,
  entry: OutboxEntry,
  now: number,
): Promise<EntryFile | string> {
  const { workshopId, personId } = entry;
  const alert = await findAlert(manager, workshopId, entry.alertId);
  const person = await findPerson(manager, workshopId, personId);
  const workshop = await findWorkshop(manager, workshopId);
  if (!alert || !workshop) return 'The alert is not there any more.';
  if (alert.clearedAt !== null) return 'Its cause is gone.';
  if (alert.takenAt !== null) return 'Somebody has it.';
  if (!person || person.disabledAt !== null) return 'This person does not sign in any more.';
  const settings = (await alertSettingsOf(manager, workshopId, [personId])).get(personId);
  const { quietFrom: from = null, quietTo: to = null, alarmsBreakThrough = true } = settings ?? {};
  const quiet = from === null || to === null ? null : { from, to };
  const held = isHeld({ quiet, alarmsBreakThrough }, alert.level, workshop.zone, now);
  const kind = entry.way === 'phone-push' ? 'phone' : 'browser';
  const devices = entry.way === 'e-mail' ? [] : await pushDevicesOf(manager, workshopId, [personId]);
  return {
    alert,
    person,
    workshop,
    devices: devices.filter((one) => one.kind === kind && !entry.reached.includes(one.id)),
    heldUntil: held && quiet !== null ? quietUntil(quiet, workshop.zone, now) : null,
  };
}
