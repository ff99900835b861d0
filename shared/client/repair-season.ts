import { useQuery } from '@tanstack/react-query';
import type { RepairSeasonDto } from '@/shared/contract/repair-season';
import { api } from './api';
import { roots } from './query-keys';
import { staleTimes } from './stale-times';

/** Where the time of a repair went; asked for only when somebody wants to see it. */
export const useRepairSeason = (id: string, wanted: boolean) =>
  useQuery({
    queryKey: [roots.repair, id, 'season'],
    queryFn: ({ signal }) => api.get<RepairSeasonDto>(`/repairs/${id}/season`, { signal }),
    staleTime: staleTimes.running,
    enabled: wanted,
  });
