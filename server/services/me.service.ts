import type { ChangeMeInput } from '@/shared/contract/session';
import type { Deps, Member } from '../deps';
import { invalid, notFound } from '../errors/domain-error';
import { findPerson, updatePerson } from '../repositories/people.repository';
import { endSessionsOf } from '../repositories/sessions.repository';
import { findWorkshop } from '../repositories/workshops.repository';
import { toInstant } from './instants';
import { ownWords, refuseWeakPassword } from './password-rules';
import { inTransaction } from './unit-of-work';

/**
 * Changes one's own name, or one's password against the present one; the other sessions end with the old password.
 * @throws DomainError 400 at `currentPassword` or `password`, 429 after too many wrong present passwords
 */
export async function changeMe(deps: Deps, member: Member, input: ChangeMeInput, now: number): Promise<void> {
  const { workshopId, personId, sessionId } = member;
  const person = await findPerson(deps.dataSource.manager, workshopId, personId);
  if (!person) throw notFound('This person');
  const name = input.name ?? person.name;
  let passwordHash: string | null = null;
  if (input.password !== undefined) {
    await deps.limits.take('signInDevice', `present password ${personId}`);
    if (!(await deps.passwords.matches(input.currentPassword ?? '', person.passwordHash)))
      throw invalid({ currentPassword: 'This is not your present password.' });
    await deps.limits.forget('signInDevice', `present password ${personId}`);
    const workshopName = (await findWorkshop(deps.dataSource.manager, workshopId))?.name ?? '';
    refuseWeakPassword(input.password, ownWords({ workshopName, name, email: person.email }));
    passwordHash = await deps.passwords.hash(input.password);
  }
  const ended = await inTransaction(deps, async (manager) => {
    const present = await findPerson(manager, workshopId, personId);
    if (!present) throw notFound('This person');
    // The hash took its time: a password that was changed meanwhile is not overwritten by who knew only the last one.
    if (passwordHash && present.passwordHash !== person.passwordHash)
      throw invalid({ currentPassword: 'This is not your present password any more.' });
    // A manager's form must not put the old name back unseen.
    const renamed = input.name !== undefined && input.name !== present.name;
    // Nothing to change is no mistake.
    if (!renamed && !passwordHash) return [];
    await updatePerson(manager, workshopId, personId, {
      ...(renamed ? { name, rev: present.rev + 1 } : {}),
      ...(passwordHash ? { passwordHash } : {}),
    });
    return passwordHash ? endSessionsOf(manager, workshopId, personId, now, 'password', sessionId) : [];
  });
  for (const other of ended) deps.hub.end({ sessionId: other }, 'revoked');
  if (name !== person.name) deps.hub.toWorkshop(workshopId, 'people:changed', { at: toInstant(now) });
  if (passwordHash) deps.log.info({ personId }, 'password changed');
}
