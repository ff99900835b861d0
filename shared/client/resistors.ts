import { queryOptions, useQuery } from '@tanstack/react-query';
import type { ResistorDto, ResistorInput } from '@/shared/contract/equipment';
import { api } from './api';
import { roots } from './query-keys';
import { staleTimes } from './stale-times';
import { useWrite } from './use-write';

export const resistorsQuery = () =>
  queryOptions({
    queryKey: [roots.resistors],
    queryFn: ({ signal }) => api.get<ResistorDto[]>('/resistors', { signal }),
    staleTime: staleTimes.setUp,
  });
export const useResistors = () => useQuery(resistorsQuery());

export const useSaveResistor = () =>
  useWrite({
    /** With id and rev: changes that one. Without: a new one. */
    send: ({ id, rev, ...input }: ResistorInput & { id?: string; rev?: number }) =>
      id ? api.patch<ResistorDto>(`/resistors/${id}`, input, { rev }) : api.post<ResistorDto>('/resistors', input),
    changes: [roots.resistors],
  });

export const useRemoveResistor = () =>
  useWrite({
    send: ({ id, rev }: { id: string; rev: number }) => api.delete(`/resistors/${id}`, { rev }),
    changes: [roots.resistors],
  });
