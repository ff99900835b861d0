import { useQuery } from '@tanstack/react-query';
import type { WaitsDto, WaitsQuery } from '@/shared/contract/waits';
import { api } from './api';
import { roots } from './query-keys';
import { staleTimes } from './stale-times';

export const useWaits = (query: WaitsQuery = {}) =>
  useQuery({
    queryKey: [roots.waits, query],
    queryFn: ({ signal }) => api.get<WaitsDto>('/waits', { query: { ...query }, signal }),
    staleTime: staleTimes.statistics,
    placeholderData: (last) => last,
  });

/** Saves the table as CSV on this device. */
export async function downloadWaits(query: WaitsQuery = {}): Promise<void> {
  const file = URL.createObjectURL(await api.blob('/waits.csv', { query: { ...query } }));
  const link = document.createElement('a');
  link.href = file;
  link.download = `waits${query.from ? `-${query.from}` : ''}${query.to ? `-${query.to}` : ''}.csv`;
  link.click();
  // The browser has taken it over by then.
  setTimeout(() => URL.revokeObjectURL(file), 10_000);
}
