/** What goes out of the house for an alert, written in the transaction that gives the alert to somebody. */
import type { EntityManager } from 'typeorm';
import { sentWays, waysOf, type SentWay } from '@/shared/contract/alert-settings';
import type { Alert } from '../entities/alert';
import type { OutboxEntry } from '../entities/outbox-entry';
import type { Person } from '../entities/person';
import { alertSettingsOf } from '../repositories/alert-settings.repository';
import { insertEntries } from '../repositories/outbox.repository';
import { pushDevicesOf } from '../repositories/push-devices.repository';
import { newId } from '../services/ids';

/** An entry for each person and each way that they want and have: a push needs a device. */
export async function writeOutbox(
  manager: EntityManager,
  alert: Alert,
  people: readonly Person[],
  now: number,
): Promise<void> {
  const { workshopId } = alert;
  const ids = people.map((person) => person.id);
  const settings = await alertSettingsOf(manager, workshopId, ids);
  const devices = await pushDevicesOf(manager, workshopId, ids);
  const has = (personId: string, way: SentWay): boolean =>
    way === 'e-mail' ||
    devices.some((one) => one.personId === personId && one.kind === (way === 'phone-push' ? 'phone' : 'browser'));
  const entries = people.flatMap(({ id }) => {
    const wanted = waysOf(settings.get(id)?.wishes ?? {}, alert);
    return sentWays.filter((way) => wanted.includes(way) && has(id, way)).map((way) => entryOf(alert, id, way, now));
  });
  await insertEntries(manager, entries);
}

const entryOf = (alert: Alert, personId: string, way: SentWay, now: number): OutboxEntry => ({
  id: newId(),
  workshopId: alert.workshopId,
  alertId: alert.id,
  turn: alert.turn,
  personId,
  way,
  state: 'waiting',
  dueAt: now,
  leasedUntil: null,
  tries: 0,
  reached: [],
  tickets: [],
  receiptDueAt: null,
  heldAt: null,
  reason: null,
  createdAt: now,
  endedAt: null,
});
