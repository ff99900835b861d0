import { queryOptions, useQuery } from '@tanstack/react-query';
import type { AlertDto } from '@/shared/contract/alert';
import { isOpen } from './alarm-rings';
import { api } from './api';
import { roots } from './query-keys';
import { useSession } from './session';
import { staleTimes } from './stale-times';
import { useWrite } from './use-write';

export const alertsQuery = () =>
  queryOptions({
    queryKey: [roots.alerts],
    queryFn: ({ signal }) => api.get<AlertDto[]>('/alerts', { signal }),
    staleTime: staleTimes.running,
  });
export const useAlerts = () => useQuery(alertsQuery());

export { isOpen };

/** Alerts that nobody has taken yet; for the badge. */
export function useOpenAlertCount(): number {
  const signedIn = Boolean(useSession().data);
  return useQuery({ ...alertsQuery(), enabled: signedIn, select: (alerts) => alerts.filter(isOpen).length }).data ?? 0;
}

export const useTakeAlert = () =>
  useWrite({
    send: ({ id }: { id: string }) => api.post<AlertDto>(`/alerts/${id}/take`, {}),
    changes: [roots.alerts, roots.board],
  });

export const usePassAlert = () =>
  useWrite({
    send: ({ id, personId }: { id: string; personId: string }) =>
      api.post<AlertDto>(`/alerts/${id}/pass`, { personId }),
    changes: [roots.alerts],
  });
