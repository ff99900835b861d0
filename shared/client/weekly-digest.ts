import { useQuery } from '@tanstack/react-query';
import type { ChangeWeeklyDigestInput, WeeklyDigestDto } from '@/shared/contract/weekly-digest';
import { api } from './api';
import { staleTimes } from './stale-times';
import { useWrite } from './use-write';

const key = ['weekly-digest'];

/** Whether the weekly letter about the waits comes to who asks. */
export const useWeeklyDigest = () =>
  useQuery({
    queryKey: key,
    queryFn: ({ signal }) => api.get<WeeklyDigestDto>('/me/weekly-digest', { signal }),
    staleTime: staleTimes.setUp,
  });

export const useChangeWeeklyDigest = () =>
  useWrite({
    send: (input: ChangeWeeklyDigestInput, idempotencyKey) =>
      api.patch<WeeklyDigestDto>('/me/weekly-digest', input, { idempotencyKey }),
    store: (client, digest) => void client.setQueryData(key, digest),
  });
