/** The mailbox of the demo: what was sent, to whom, and what came twice. */
import type { MailboxDto, MailboxEntryDto } from '@/shared/contract/mailbox';
import type { Deps, Member } from '../deps';
import type { Outside, SentOut } from '../demo/outside/outside';
import { notFound } from '../errors/domain-error';
import { alertsById } from '../repositories/alerts.repository';
import { listPeople } from '../repositories/people.repository';
import { pushDevicesOf } from '../repositories/push-devices.repository';
import { digestIds } from '../repositories/weekly-digest.repository';
import { addPushDevice } from './alert-settings.service';
import { toInstant } from './instants';
import { letterId } from './waits/digest-letter';

function outsideOf({ outside }: Deps): Outside {
  if (outside === null) throw notFound('The mailbox of the demo');
  return outside;
}

/**
 * Everything that was sent for alerts of the workshop of who asks, and its weekly letters, newest first.
 * @throws DomainError 404 where this server sends to the real services
 */
export async function mailbox(deps: Deps, member: Member): Promise<MailboxDto> {
  const { sent, since, phoneToken } = outsideOf(deps);
  const { manager } = deps.dataSource;
  const { workshopId } = member;
  const alerts = await alertsById(manager, workshopId, [...new Set(sent.map(({ alertId }) => alertId))]);
  const digests = new Set((await digestIds(manager, workshopId)).map(letterId));
  const people = await listPeople(manager, workshopId);
  const devices = await pushDevicesOf(
    manager,
    workshopId,
    people.map(({ id }) => id),
  );
  const names = new Map([
    ...people.map(({ email, name }): [string, string] => [email, name]),
    ...devices.flatMap(({ address, personId }): [string, string][] => {
      const person = people.find(({ id }) => id === personId);
      return person ? [[address, person.name]] : [];
    }),
  ]);
  const own = phoneToken(member.sessionId);
  return {
    since: toInstant(since),
    entries: marked(sent.filter(({ alertId }) => alerts.has(alertId) || digests.has(alertId)))
      .map((one) =>
        entryOf({ ...one, alertId: alerts.has(one.alertId) ? one.alertId : null }, names.get(one.to) ?? null),
      )
      .reverse(),
    hasPhone: devices.some(({ address }) => address === own),
  };
}

/** The receiver tells by alert and turn what it has already. */
function marked(sent: readonly SentOut[]): (SentOut & { again: boolean })[] {
  const had = new Set<string>();
  return sent.map((one) => {
    const key = JSON.stringify([one.way, one.to, one.alertId, one.turn]);
    const again = had.has(key);
    had.add(key);
    return { ...one, again };
  });
}

const entryOf = (
  { at, to, ...one }: Omit<SentOut, 'alertId'> & Pick<MailboxEntryDto, 'again' | 'alertId'>,
  name: string | null,
): MailboxEntryDto => ({
  ...one,
  at: toInstant(at),
  to: { name, address: to },
});

/** Gives who asks a phone of the demo, to which pushes to phones go from now on. */
export async function addDemoPhone(deps: Deps, member: Member, now: number): Promise<MailboxDto> {
  const token = outsideOf(deps).phoneToken(member.sessionId);
  await addPushDevice(deps, member, { kind: 'phone', token }, undefined, now);
  return mailbox(deps, member);
}
