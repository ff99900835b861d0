import type { EntityManager } from 'typeorm';
import type { CreateWorkshopInput } from '@/shared/contract/session';
import type { Deps } from '../deps';
import { DomainError } from '../errors/domain-error';
import type { Person } from '../entities/person';
import { useInvitation } from '../repositories/invitations.repository';
import { findPerson, findPersonByEmail, insertPerson, updatePerson } from '../repositories/people.repository';
import { endSessionsOf } from '../repositories/sessions.repository';
import { findWorkshop, insertWorkshop } from '../repositories/workshops.repository';
import { newId } from './ids';
import { toInstant } from './instants';
import { openLink } from './invitations.service';
import { ownWords, refuseWeakPassword } from './password-rules';
import { openSession, type SignedIn } from './sessions.service';
import { withDevice, type AskingDevice, type SignedInHere } from './sign-in.service';
import { inTransaction } from './unit-of-work';
import { defaultSettings } from './workshop-defaults';

const linkUsed = () =>
  new DomainError(404, 'link_over', 'This link was used, has lapsed or was taken back. Ask for a new one.');

/** @throws DomainError 409 at the field `email` */
async function refuseTakenEmail(manager: EntityManager, email: string): Promise<void> {
  if (await findPersonByEmail(manager, email))
    throw new DomainError(409, 'email_taken', 'Somebody signs in with this address already.', {
      fields: { email: 'Somebody signs in with this address already. Sign in, or use another one.' },
    });
}

const newPerson = (
  person: Pick<Person, 'workshopId' | 'name' | 'email' | 'passwordHash' | 'role'>,
  now: number,
): Person => ({
  id: newId(),
  ...person,
  disabledAt: null,
  lastSeenAt: now,
  rev: 1,
  createdAt: now,
});

/** Makes a workshop with its first manager, who is signed in. */
export async function createWorkshop(
  deps: Deps,
  input: CreateWorkshopInput,
  device: AskingDevice,
  now: number,
): Promise<SignedInHere> {
  refuseWeakPassword(input.password, ownWords(input));
  await refuseTakenEmail(deps.dataSource.manager, input.email);
  const passwordHash = await deps.passwords.hash(input.password);
  const signedIn = await inTransaction(deps, async (manager) => {
    await refuseTakenEmail(manager, input.email);
    const workshopId = newId();
    await insertWorkshop(manager, {
      ...defaultSettings(input.workshopName, input.zone),
      id: workshopId,
      boardRev: 1,
      chargeCount: 0,
      rev: 1,
      createdAt: now,
    });
    const { name, email } = input;
    const person = newPerson({ workshopId, name, email, passwordHash, role: 'manager' }, now);
    await insertPerson(manager, person);
    return openSession(deps, manager, person, device.userAgent, now);
  });
  deps.log.info({ workshopId: signedIn.session.workshop.id }, 'workshop created');
  return withDevice(deps, signedIn, device);
}

/** Uses an invitation: the person exists from now on, and is signed in. */
export async function join(
  deps: Deps,
  input: { token: string; name: string; password: string },
  device: AskingDevice,
  now: number,
): Promise<SignedInHere> {
  const { manager: reader } = deps.dataSource;
  const link = await openLink(reader, input.token, now);
  if (link.kind !== 'join') throw linkUsed();
  const { workshopId, email, role } = link;
  const workshopName = (await findWorkshop(reader, workshopId))?.name ?? '';
  refuseWeakPassword(input.password, ownWords({ workshopName, name: input.name, email }));
  const passwordHash = await deps.passwords.hash(input.password);
  const signedIn = await inTransaction(deps, async (manager): Promise<SignedIn> => {
    if (!(await useInvitation(manager, workshopId, link.id, now))) throw linkUsed();
    await refuseTakenEmail(manager, email);
    const person = newPerson({ workshopId, name: input.name, email, passwordHash, role }, now);
    await insertPerson(manager, person);
    return openSession(deps, manager, person, device.userAgent, now);
  });
  deps.hub.toWorkshop(workshopId, 'people:changed', { at: toInstant(now) });
  return withDevice(deps, signedIn, device);
}

/** Uses a reset link: the new password holds, and every other session of the person ends. */
export async function resetPassword(
  deps: Deps,
  input: { token: string; password: string },
  device: AskingDevice,
  now: number,
): Promise<SignedInHere> {
  const { manager: reader } = deps.dataSource;
  const link = await openLink(reader, input.token, now);
  const { workshopId, personId, email } = link;
  const before = personId === null ? null : await findPerson(reader, workshopId, personId);
  if (link.kind !== 'reset' || !before || before.disabledAt !== null) throw linkUsed();
  const workshopName = (await findWorkshop(reader, workshopId))?.name ?? '';
  refuseWeakPassword(input.password, ownWords({ workshopName, name: before.name, email }));
  const passwordHash = await deps.passwords.hash(input.password);
  const signedIn = await inTransaction(deps, async (manager) => {
    if (!(await useInvitation(manager, workshopId, link.id, now))) throw linkUsed();
    const person = await findPerson(manager, workshopId, before.id);
    if (!person || person.disabledAt !== null) throw linkUsed();
    await updatePerson(manager, workshopId, person.id, { passwordHash });
    await endSessionsOf(manager, workshopId, person.id, now, 'password');
    return openSession(deps, manager, person, device.userAgent, now);
  });
  deps.hub.end({ personId: before.id }, 'revoked');
  deps.log.info({ personId: before.id }, 'password reset');
  return withDevice(deps, signedIn, device);
}
