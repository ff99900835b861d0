import type { InvitationDto, InviteInput, OneUseLinkDto } from '@/shared/contract/people';
import type { LinkDto } from '@/shared/contract/session';
import type { EntityManager } from 'typeorm';
import type { Deps, Member } from '../deps';
import type { Invitation } from '../entities/invitation';
import { DomainError, conflict, notFound } from '../errors/domain-error';
import {
  findInvitation,
  findInvitationByTokenHash,
  insertInvitation,
  listOpenInvitations,
  recallLinks,
} from '../repositories/invitations.repository';
import { findPerson, findPersonByEmail, listPeople } from '../repositories/people.repository';
import { findWorkshop } from '../repositories/workshops.repository';
import { newId } from './ids';
import { toInstant } from './instants';
import { invitationDto } from './people-dto';
import { linkLifeMs } from './session-limits';
import { hashToken, newToken } from './tokens';
import { inTransaction } from './unit-of-work';

/** Makes a link that works once within 72 hours; an earlier one for the same address and purpose works no more. */
async function makeLink(
  manager: EntityManager,
  member: Member,
  link: Pick<Invitation, 'kind' | 'email' | 'role' | 'personId'>,
  baseUrl: string,
  now: number,
): Promise<OneUseLinkDto> {
  const { workshopId } = member;
  const token = newToken();
  const expiresAt = now + linkLifeMs;
  await recallLinks(manager, workshopId, { email: link.email, kind: link.kind }, now);
  await insertInvitation(manager, {
    id: newId(),
    workshopId,
    ...link,
    tokenHash: hashToken(token),
    invitedById: member.personId,
    createdAt: now,
    expiresAt,
    usedAt: null,
    recalledAt: null,
  });
  return { url: `${baseUrl}/join?token=${token}`, expiresAt: toInstant(expiresAt) };
}

/** @throws DomainError 409 where the address already belongs to somebody of this workshop */
export async function invite(
  deps: Deps,
  member: Member,
  input: InviteInput & { baseUrl: string },
  now: number,
): Promise<OneUseLinkDto> {
  const { email, role, baseUrl } = input;
  const link = await inTransaction(deps, async (manager) => {
    const there = await findPersonByEmail(manager, email);
    // Of another workshop's people nothing is said here; joining tells the person themselves.
    if (there?.workshopId === member.workshopId)
      throw conflict('already_here', `${there.name} is in this workshop already. Change the role there.`);
    return makeLink(manager, member, { kind: 'join', email, role, personId: null }, baseUrl, now);
  });
  deps.hub.toWorkshop(member.workshopId, 'people:changed', { at: toInstant(now) });
  return link;
}

/** A link with which a person sets a new password; the manager never learns it. */
export async function resetLink(
  deps: Deps,
  member: Member,
  input: { personId: string; baseUrl: string },
  now: number,
): Promise<OneUseLinkDto> {
  const link = await inTransaction(deps, async (manager) => {
    const person = await findPerson(manager, member.workshopId, input.personId);
    if (!person) throw notFound('This person');
    if (person.disabledAt !== null)
      throw conflict('disabled', `${person.name}’s sign-in is switched off. Switch it on first.`);
    const { email, role } = person;
    return makeLink(manager, member, { kind: 'reset', email, role, personId: person.id }, input.baseUrl, now);
  });
  deps.log.info({ by: member.personId, personId: input.personId }, 'reset link made');
  return link;
}

/** Those invited and not yet joined; lapsed ones too, so that somebody sees it. */
export async function pendingInvitations(deps: Deps, member: Member, now: number): Promise<InvitationDto[]> {
  const { manager } = deps.dataSource;
  const [open, people] = await Promise.all([
    listOpenInvitations(manager, member.workshopId),
    listPeople(manager, member.workshopId),
  ]);
  const names = new Map(people.map((person) => [person.id, person.name]));
  return open.map((invitation) => invitationDto(invitation, names.get(invitation.invitedById) ?? '', now));
}

export async function recallInvitation(deps: Deps, member: Member, id: string, now: number): Promise<void> {
  await inTransaction(deps, async (manager) => {
    const invitation = await findInvitation(manager, member.workshopId, id);
    if (!invitation || invitation.kind !== 'join' || invitation.usedAt !== null || invitation.recalledAt !== null)
      throw notFound('This invitation');
    await recallLinks(manager, member.workshopId, { id }, now);
  });
  deps.hub.toWorkshop(member.workshopId, 'people:changed', { at: toInstant(now) });
}

/**
 * The link a token belongs to, if it may still be used.
 * @throws DomainError 404, the same for a used, a recalled, a lapsed and an invented one
 */
export async function openLink(manager: EntityManager, token: string, now: number): Promise<Invitation> {
  const link = await findInvitationByTokenHash(manager, hashToken(token));
  if (!link || link.usedAt !== null || link.recalledAt !== null || now >= link.expiresAt)
    throw new DomainError(404, 'link_over', 'This link was used, has lapsed or was taken back. Ask for a new one.');
  return link;
}

/** What a link is for, before it is used. */
export async function describeLink(deps: Deps, token: string, now: number): Promise<LinkDto> {
  const { manager } = deps.dataSource;
  const link = await openLink(manager, token, now);
  const workshop = await findWorkshop(manager, link.workshopId);
  if (!workshop) throw notFound('The workshop');
  const { kind, email, role } = link;
  return { kind, workshopName: workshop.name, email, role, expiresAt: toInstant(link.expiresAt) };
}
