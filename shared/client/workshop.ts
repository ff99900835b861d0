import { queryOptions, useQuery } from '@tanstack/react-query';
import type { WorkshopDto, WorkshopSettings } from '@/shared/contract/workshop';
import { api } from './api';
import { roots } from './query-keys';
import { useSession } from './session';
import { staleTimes } from './stale-times';
import { useWrite } from './use-write';

export const workshopQuery = () =>
  queryOptions({
    queryKey: [roots.workshop],
    queryFn: ({ signal }) => api.get<WorkshopDto>('/workshop', { signal }),
    staleTime: staleTimes.setUp,
  });
export const useWorkshop = () => useQuery(workshopQuery());

/** The workshop's zone; the device's own where nobody is signed in. */
export function useZone(): string {
  return useSession().data?.workshop.zone ?? Intl.DateTimeFormat().resolvedOptions().timeZone;
}

export const useChangeWorkshop = () =>
  useWrite({
    send: ({ rev, ...input }: Partial<WorkshopSettings> & { rev: number }) =>
      api.patch<WorkshopDto>('/workshop', input, { rev }),
    store: (client, workshop) => client.setQueryData(workshopQuery().queryKey, workshop),
    changes: [roots.session, roots.board],
  });
