import { queryOptions, useQuery } from '@tanstack/react-query';
import type { ChangePersonInput, InvitationDto, InviteInput, OneUseLinkDto, PersonDto } from '@/shared/contract/people';
import { api } from './api';
import { roots } from './query-keys';
import { staleTimes } from './stale-times';
import { useWrite } from './use-write';

export const peopleQuery = () =>
  queryOptions({
    queryKey: [roots.people],
    queryFn: ({ signal }) => api.get<PersonDto[]>('/people', { signal }),
    staleTime: staleTimes.setUp,
  });
export const usePeople = () => useQuery(peopleQuery());

/** Those not yet joined. */
export const useInvitations = (enabled = true) =>
  useQuery({
    queryKey: [roots.invitations],
    queryFn: ({ signal }) => api.get<InvitationDto[]>('/invitations', { signal }),
    staleTime: staleTimes.setUp,
    enabled,
  });

export const useChangePerson = () =>
  useWrite({
    send: ({ id, rev, ...input }: ChangePersonInput & { id: string; rev: number }) =>
      api.patch<PersonDto>(`/people/${id}`, input, { rev }),
    changes: [roots.people, roots.session],
  });

/** A one-use link, shown once to copy. */
export const useResetLink = () =>
  useWrite({
    send: ({ personId }: { personId: string }) => api.post<OneUseLinkDto>(`/people/${personId}/reset-link`, {}),
  });

export const useInvite = () =>
  useWrite({
    send: (input: InviteInput) => api.post<OneUseLinkDto>('/invitations', input),
    changes: [roots.invitations],
  });

export const useRecallInvitation = () =>
  useWrite({ send: (id: string) => api.delete(`/invitations/${id}`), changes: [roots.invitations] });
