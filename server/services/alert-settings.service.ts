import {
  alertCauses,
  causeKey,
  waysOf,
  type AlertSettingsDto,
  type ChangeAlertSettingsInput,
  type PushDeviceDto,
  type PushDeviceInput,
  type PushKeyDto,
} from '@/shared/contract/alert-settings';
import { isPushEndpoint } from '../alerts/ways/public-address';
import type { Deps, Member } from '../deps';
import type { AlertSetting } from '../entities/alert-setting';
import type { PushDevice } from '../entities/push-device';
import { conflict, invalid, notFound } from '../errors/domain-error';
import { alertSettingsOf, saveAlertSetting } from '../repositories/alert-settings.repository';
import { findPerson } from '../repositories/people.repository';
import { releaseHeld } from '../repositories/outbox.repository';
import {
  deletePushDevices,
  findPushDevice,
  findPushDeviceByAddress,
  insertPushDevice,
  pushDevicesOf,
} from '../repositories/push-devices.repository';
import { deviceName } from './device-name';
import { newId } from './ids';
import { toInstant } from './instants';
import { inTransaction } from './unit-of-work';

/** A person has so many devices at most: each is a further sending for each alert. */
const MOST_DEVICES = 10;

/** Where the alerts of who asks go. */
export async function alertSettings(deps: Deps, member: Member): Promise<AlertSettingsDto> {
  const { manager } = deps.dataSource;
  const { workshopId, personId } = member;
  const setting = (await alertSettingsOf(manager, workshopId, [personId])).get(personId);
  const person = await findPerson(manager, workshopId, personId);
  if (!person) throw notFound('This person');
  const wishes = setting?.wishes ?? {};
  const { quietFrom = null, quietTo = null } = setting ?? {};
  return {
    ways: alertCauses.map((cause) => ({ ...cause, ways: waysOf(wishes, cause) })),
    quiet: quietFrom === null || quietTo === null ? null : { from: quietFrom, to: quietTo },
    alarmsBreakThrough: setting?.alarmsBreakThrough ?? true,
    eMail: { address: person.email, on: deps.outbox.eMail },
    devices: (await pushDevicesOf(manager, workshopId, [personId])).map((one) => deviceDto(deps, one, member)),
  };
}

/** What a browser needs to subscribe; in the demo it is subscribed already, at the push service of the demo. */
export const pushKey = ({ outbox, outside }: Deps, { sessionId }: Member): PushKeyDto => ({
  key: outbox.pushKey,
  demo: outside === null ? null : outside.subscribe(sessionId),
});

/** Changes what is given and leaves the rest as it is. */
export async function changeAlertSettings(
  deps: Deps,
  member: Member,
  input: ChangeAlertSettingsInput,
  now: number,
): Promise<AlertSettingsDto> {
  const { workshopId, personId } = member;
  await inTransaction(deps, async (manager) => {
    const before = (await alertSettingsOf(manager, workshopId, [personId])).get(personId);
    const row: AlertSetting = {
      id: before?.id ?? newId(),
      workshopId,
      personId,
      wishes: {
        ...before?.wishes,
        ...Object.fromEntries((input.ways ?? []).map((cause) => [causeKey(cause), [...new Set(cause.ways)]])),
      },
      quietFrom: input.quiet === undefined ? (before?.quietFrom ?? null) : (input.quiet?.from ?? null),
      quietTo: input.quiet === undefined ? (before?.quietTo ?? null) : (input.quiet?.to ?? null),
      alarmsBreakThrough: input.alarmsBreakThrough ?? before?.alarmsBreakThrough ?? true,
      changedAt: now,
    };
    await saveAlertSetting(manager, row);
    if (input.quiet !== undefined || input.alarmsBreakThrough !== undefined)
      await releaseHeld(manager, workshopId, personId, now);
  });
  deps.outbox.poke();
  return alertSettings(deps, member);
}

function deviceDto({ outside }: Deps, device: PushDevice, { sessionId }: Member): PushDeviceDto {
  // A phone of the demo came with a browser, and is beside it.
  const lent = outside !== null && device.kind === 'phone' && outside.isPhone(device.address);
  return {
    id: device.id,
    kind: device.kind,
    name: lent ? 'Phone of the demo' : device.name,
    addedAt: toInstant(device.createdAt),
    here: device.sessionId === sessionId && !lent,
  };
}

/**
 * Pushes come to this device from now on. One that was somebody else's is theirs no more: who signs in on it last has it.
 * @throws DomainError 400 for an address that is no push service's, 409 beyond ten devices
 */
export async function addPushDevice(
  deps: Deps,
  member: Member,
  input: PushDeviceInput,
  userAgent: string | undefined,
  now: number,
): Promise<PushDeviceDto> {
  const browser = input.kind === 'browser';
  if (browser && !deps.config.localPush && !isPushEndpoint(input.endpoint))
    throw invalid({ endpoint: 'This is no address of a push service on the internet.' });
  const { workshopId, personId, sessionId } = member;
  const device: PushDevice = {
    id: newId(),
    workshopId,
    personId,
    sessionId,
    kind: input.kind,
    address: browser ? input.endpoint : input.token,
    p256dh: browser ? input.keys.p256dh : null,
    auth: browser ? input.keys.auth : null,
    name: deviceName(userAgent),
    createdAt: now,
  };
  await inTransaction(deps, async (manager) => {
    const before = await findPushDeviceByAddress(manager, device.address);
    if (before) await deletePushDevices(manager, before.workshopId, [before.id]);
    const others = await pushDevicesOf(manager, workshopId, [personId]);
    if (others.length >= MOST_DEVICES)
      throw conflict('too_many_devices', `You have ${MOST_DEVICES} devices with push. Switch one of them off first.`);
    // A session that goes on keeps what it had: one browser has one subscription.
    const same = others.filter((one) => one.sessionId === sessionId && one.kind === device.kind);
    await deletePushDevices(
      manager,
      workshopId,
      same.map((one) => one.id),
    );
    await insertPushDevice(manager, device);
  });
  return deviceDto(deps, device, member);
}

/** Nothing is pushed to this device any more. @throws DomainError 404 where it is none of one's own */
export async function removePushDevice(deps: Deps, member: Member, id: string): Promise<void> {
  await inTransaction(deps, async (manager) => {
    const device = await findPushDevice(manager, member.workshopId, member.personId, id);
    if (!device) throw notFound('This device');
    await deletePushDevices(manager, member.workshopId, [id]);
  });
}
