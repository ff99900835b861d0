import { queryOptions, useQuery } from '@tanstack/react-query';
import type { MeterDto, MeterInput } from '@/shared/contract/equipment';
import { api } from './api';
import { roots } from './query-keys';
import { staleTimes } from './stale-times';
import { useWrite } from './use-write';

export const metersQuery = () =>
  queryOptions({
    queryKey: [roots.meters],
    queryFn: ({ signal }) => api.get<MeterDto[]>('/meters', { signal }),
    staleTime: staleTimes.setUp,
  });
export const useMeters = () => useQuery(metersQuery());

export const useSaveMeter = () =>
  useWrite({
    /** With id and rev: changes that one. Without: a new one. */
    send: ({ id, rev, ...input }: MeterInput & { id?: string; rev?: number }) =>
      id ? api.patch<MeterDto>(`/meters/${id}`, input, { rev }) : api.post<MeterDto>('/meters', input),
    changes: [roots.meters],
  });

export const useRemoveMeter = () =>
  useWrite({
    send: ({ id, rev }: { id: string; rev: number }) => api.delete(`/meters/${id}`, { rev }),
    changes: [roots.meters],
  });
