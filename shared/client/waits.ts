import { useQuery } from '@tanstack/react-query';
import type { WaitsDto, WaitsQuery } from '@/shared/contract/waits';
import { api } from './api';
import { roots } from './query-keys';
import { saveFile } from './save-file';
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
  const name = `waits${query.from ? `-${query.from}` : ''}${query.to ? `-${query.to}` : ''}.csv`;
  saveFile(await api.blob('/waits.csv', { query: { ...query } }), name);
}
