/** The workshop's own templates of packs. */
import { queryOptions, useQuery } from '@tanstack/react-query';
import type { PackTypeDto, PackTypeInput } from '@/shared/contract/pack';
import { api } from './api';
import { roots } from './query-keys';
import { staleTimes } from './stale-times';
import { useWrite } from './use-write';

export const packTypesQuery = () =>
  queryOptions({
    queryKey: [roots.packTypes],
    queryFn: ({ signal }) => api.get<PackTypeDto[]>('/pack-types', { signal }),
    staleTime: staleTimes.setUp,
  });
export const usePackTypes = () => useQuery(packTypesQuery());

export const useSavePackType = () =>
  useWrite({
    /** With id and rev: changes that one. Without: a new one. */
    send: ({ id, rev, ...input }: PackTypeInput & { id?: string; rev?: number }) =>
      id ? api.patch<PackTypeDto>(`/pack-types/${id}`, input, { rev }) : api.post<PackTypeDto>('/pack-types', input),
    changes: [roots.packTypes, roots.repairs, roots.repair],
  });
