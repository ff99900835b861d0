import { queryOptions, useQuery } from '@tanstack/react-query';
import type { ChargerDto, ChargerInput } from '@/shared/contract/equipment';
import { api } from './api';
import { roots } from './query-keys';
import { staleTimes } from './stale-times';
import { useWrite } from './use-write';

export const chargersQuery = () =>
  queryOptions({
    queryKey: [roots.chargers],
    queryFn: ({ signal }) => api.get<ChargerDto[]>('/chargers', { signal }),
    staleTime: staleTimes.setUp,
  });
export const useChargers = () => useQuery(chargersQuery());

export const chargerQuery = (id: string) =>
  queryOptions({
    queryKey: [roots.chargers, id],
    queryFn: ({ signal }) => api.get<ChargerDto>(`/chargers/${id}`, { signal }),
    staleTime: staleTimes.running,
    enabled: id !== '',
  });
export const useCharger = (id: string) => useQuery(chargerQuery(id));

export const useSaveCharger = () =>
  useWrite({
    /** With id and rev: changes that one (a channel left out is retired). Without: a new one. */
    send: ({ id, rev, ...input }: ChargerInput & { id?: string; rev?: number }) =>
      id ? api.patch<ChargerDto>(`/chargers/${id}`, input, { rev }) : api.post<ChargerDto>('/chargers', input),
    changes: [roots.chargers, roots.board],
  });

export const useRetireCharger = () =>
  useWrite({
    send: ({ id, rev }: { id: string; rev: number }) => api.delete(`/chargers/${id}`, { rev }),
    changes: [roots.chargers, roots.board],
  });
