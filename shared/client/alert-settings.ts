import { queryOptions, useQuery } from '@tanstack/react-query';
import type { AlertDto } from '@/shared/contract/alert';
import type {
  AlertSettingsDto,
  ChangeAlertSettingsInput,
  PushDeviceDto,
  PushDeviceInput,
  UndeliveredDto,
} from '@/shared/contract/alert-settings';
import { isHeld } from '@/shared/contract/quiet-hours';
import { api } from './api';
import { roots } from './query-keys';
import { staleTimes } from './stale-times';
import { useWrite } from './use-write';

/** Where one's own alerts go. */
export const alertSettingsQuery = () =>
  queryOptions({
    queryKey: [roots.alertSettings],
    queryFn: ({ signal }) => api.get<AlertSettingsDto>('/me/alert-settings', { signal }),
    staleTime: staleTimes.setUp,
  });
export const useAlertSettings = (enabled = true) => useQuery({ ...alertSettingsQuery(), enabled });

/** Whether the open page tells an alert at `at` (epoch ms): its person wants it so, and has no quiet hours then. */
export function isHeardHere(
  settings: AlertSettingsDto,
  alert: Pick<AlertDto, 'kind' | 'level'>,
  zone: string,
  at: number,
): boolean {
  const cause = settings.ways.find(({ kind, level }) => kind === alert.kind && level === alert.level);
  if (cause && !cause.ways.includes('app')) return false;
  return !isHeld(settings, alert.level, zone, at);
}

export const useChangeAlertSettings = () =>
  useWrite({
    send: (input: ChangeAlertSettingsInput) => api.patch<AlertSettingsDto>('/me/alert-settings', input),
    store: (client, settings) => client.setQueryData(alertSettingsQuery().queryKey, settings),
  });

export const useAddPushDevice = () =>
  useWrite({
    send: (device: PushDeviceInput) => api.post<PushDeviceDto>('/me/push-devices', device),
    changes: [roots.alertSettings],
  });

export const useRemovePushDevice = () =>
  useWrite({
    send: ({ id }: { id: string }) => api.delete(`/me/push-devices/${id}`),
    changes: [roots.alertSettings],
  });

/** What could not be brought to somebody; for those who may see it. */
export const useUndelivered = (enabled: boolean) =>
  useQuery({
    queryKey: [roots.alerts, 'undelivered'],
    queryFn: ({ signal }) => api.get<UndeliveredDto[]>('/alerts/undelivered', { signal }),
    staleTime: staleTimes.running,
    enabled,
  });

export const useDecideUndelivered = () =>
  useWrite({
    send: ({ id, what }: { id: string; what: 'again' | 'drop' }) =>
      api.post<void>(`/alerts/undelivered/${id}/${what}`, {}),
    // The page of the server counts them.
    changes: [roots.alerts, roots.status],
  });
