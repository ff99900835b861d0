import { queryOptions, useQuery } from '@tanstack/react-query';
import type { FrontDoorDto } from '@/shared/contract/session';
import { api } from './api';
import { roots } from './query-keys';
import { staleTimes } from './stale-times';

export const frontDoorQuery = () =>
  queryOptions({
    queryKey: [roots.frontDoor],
    queryFn: ({ signal }) => api.get<FrontDoorDto>('/front-door', { open: true, signal }),
    staleTime: staleTimes.setUp,
  });

/** What this installation is: a demo, an empty one, its version. */
export const useFrontDoor = () => useQuery(frontDoorQuery());
