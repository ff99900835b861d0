import type { ChangePersonInput, PersonDto } from '@/shared/contract/people';
import type { Deps, Member } from '../deps';
import { conflict, notFound, stale } from '../errors/domain-error';
import { recallLinks } from '../repositories/invitations.repository';
import { countActiveManagers, findPerson, listPeople, updatePerson } from '../repositories/people.repository';
import { endSessionsOf } from '../repositories/sessions.repository';
import { announceBench } from './announce';
import { giveBackAllOf } from './finish-work.service';
import { toInstant } from './instants';
import { personDto } from './people-dto';
import { inTransaction } from './unit-of-work';

export const everybody = async (deps: Deps, member: Member): Promise<PersonDto[]> =>
  (await listPeople(deps.dataSource.manager, member.workshopId)).map(personDto);

/**
 * Changes a name or a role, switches a sign-in off or on. A switched-off person's sessions and sockets end at once.
 * @throws DomainError 404, 409 for the last manager, 412 for an old revision
 */
export async function changePerson(
  deps: Deps,
  member: Member,
  input: ChangePersonInput & { id: string; rev: number },
  now: number,
): Promise<PersonDto> {
  const { workshopId } = member;
  const { before, after } = await inTransaction(deps, async (manager) => {
    const before = await findPerson(manager, workshopId, input.id);
    if (!before) throw notFound('This person');
    if (before.rev !== input.rev) throw stale(personDto(before));
    const disabledAt =
      input.disabled === undefined ? before.disabledAt : input.disabled ? (before.disabledAt ?? now) : null;
    const after = {
      ...before,
      name: input.name ?? before.name,
      role: input.role ?? before.role,
      disabledAt,
      rev: before.rev + 1,
    };
    const wasManager = before.role === 'manager' && before.disabledAt === null;
    const staysManager = after.role === 'manager' && disabledAt === null;
    if (wasManager && !staysManager && (await countActiveManagers(manager, workshopId)) <= 1)
      throw conflict(
        'last_manager',
        `${before.name} is the only manager. Make somebody else a manager first.`,
        personDto(before),
      );
    const { name, role, rev } = after;
    await updatePerson(manager, workshopId, before.id, { name, role, disabledAt, rev });
    if (disabledAt !== null && before.disabledAt === null) {
      await endSessionsOf(manager, workshopId, before.id, now, 'disabled');
      await recallLinks(manager, workshopId, { personId: before.id }, now);
      await giveBackAllOf(manager, member, before.id, now);
    }
    return { before, after };
  });
  if (after.disabledAt !== null && before.disabledAt === null) deps.hub.end({ personId: after.id }, 'disabled');
  else if (after.role !== before.role) deps.hub.end({ personId: after.id }, 'role-changed');
  deps.hub.toWorkshop(workshopId, 'people:changed', { at: toInstant(now) });
  if ((after.disabledAt === null) !== (before.disabledAt === null)) announceBench(deps, workshopId, now);
  deps.log.info({ by: member.personId, personId: after.id, role: after.role }, 'person changed');
  return personDto(after);
}
