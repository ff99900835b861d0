import { useQuery } from '@tanstack/react-query';
import type { WaitChargesDto, WaitDimension, WaitGroupsDto, WaitsDto, WaitsQuery } from '@/shared/contract/waits';
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

/** The same parted by one dimension. */
export const useWaitGroups = (by: WaitDimension, query: WaitsQuery = {}) =>
  useQuery({
    queryKey: [roots.waits, 'groups', by, query],
    queryFn: ({ signal }) => api.get<WaitGroupsDto>('/waits/groups', { query: { ...query, by }, signal }),
    staleTime: staleTimes.statistics,
    placeholderData: (last) => last,
  });

/** The newest charges behind the figures. */
export const useWaitCharges = (query: WaitsQuery = {}) =>
  useQuery({
    queryKey: [roots.waits, 'charges', query],
    queryFn: ({ signal }) => api.get<WaitChargesDto>('/waits/charges', { query: { ...query }, signal }),
    staleTime: staleTimes.statistics,
    placeholderData: (last) => last,
  });

/** Saves the table as CSV on this device. */
export async function downloadWaits(query: WaitsQuery = {}): Promise<void> {
  const name = `waits${query.from ? `-${query.from}` : ''}${query.to ? `-${query.to}` : ''}.csv`;
  saveFile(await api.blob('/waits.csv', { query: { ...query } }), name);
}
