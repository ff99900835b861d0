import type { InvitationDto, PersonDto } from '@/shared/contract/people';
import type { Invitation } from '../entities/invitation';
import type { Person } from '../entities/person';
import { toInstant, toOptionalInstant } from './instants';

export const personDto = (person: Person): PersonDto => ({
  id: person.id,
  name: person.name,
  email: person.email,
  role: person.role,
  disabled: person.disabledAt !== null,
  lastSeenAt: toOptionalInstant(person.lastSeenAt),
  rev: person.rev,
});

export const invitationDto = (invitation: Invitation, invitedBy: string, now: number): InvitationDto => ({
  id: invitation.id,
  email: invitation.email,
  role: invitation.role,
  expiresAt: toInstant(invitation.expiresAt),
  lapsed: now >= invitation.expiresAt,
  invitedBy,
});
