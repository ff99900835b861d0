import { keepPreviousData, skipToken, useInfiniteQuery, useMutation, useQuery } from '@tanstack/react-query';
import type {
  CompareWaitsDto,
  WaitChargesDto,
  WaitChargesQuery,
  WaitDimension,
  WaitGroupsDto,
  WaitsCsvQuery,
  WaitsDto,
  WaitsQuery,
} from '@/shared/contract/waits';
import { api } from './api';
import { roots } from './query-keys';
import { saveFile } from './save-file';
import { staleTimes } from './stale-times';

export const useWaits = (query: WaitsQuery = {}) =>
  useQuery({
    queryKey: [roots.waits, query],
    queryFn: ({ signal }) => api.get<WaitsDto>('/waits', { query: { ...query }, signal }),
    staleTime: staleTimes.statistics,
    placeholderData: keepPreviousData,
  });

/** The same parted by one dimension. */
export const useWaitGroups = (by: WaitDimension, query: WaitsQuery = {}) =>
  useQuery({
    queryKey: [roots.waits, 'groups', by, query],
    queryFn: ({ signal }) => api.get<WaitGroupsDto>('/waits/groups', { query: { ...query, by }, signal }),
    staleTime: staleTimes.statistics,
    placeholderData: keepPreviousData,
  });

/** The charges behind the figures, newest first, page after page. */
export const useWaitCharges = (query: Omit<WaitChargesQuery, 'after'> = {}) =>
  useInfiniteQuery({
    queryKey: [roots.waits, 'charges', query],
    queryFn: ({ signal, pageParam }) =>
      api.get<WaitChargesDto>('/waits/charges', {
        query: { ...query, ...(pageParam === null ? {} : { after: pageParam }) },
        signal,
      }),
    initialPageParam: null as string | null,
    getNextPageParam: ({ next }) => next,
    staleTime: staleTimes.statistics,
    placeholderData: keepPreviousData,
  });

/** The period of the query against another; null: nothing is compared. */
export const useCompareWaits = (query: WaitsQuery, days: { from: string; to: string } | null) =>
  useQuery({
    queryKey: [roots.waits, 'compare', query, days],
    queryFn: days
      ? ({ signal }) =>
          api.get<CompareWaitsDto>('/waits/compare', {
            query: { ...query, compareFrom: days.from, compareTo: days.to },
            signal,
          })
      : skipToken,
    staleTime: staleTimes.statistics,
  });

/** Saves a figure's table, or the charges behind it, as CSV on this device. */
export const useSaveWaits = () =>
  useMutation({
    mutationFn: async (query: WaitsCsvQuery) => {
      const { what = 'charges', from, to } = query;
      const name = ['waits', ...(what === 'charges' ? [] : ['by', what]), from, to].filter(Boolean).join('-');
      saveFile(await api.blob('/waits.csv', { query: { ...query } }), `${name}.csv`);
    },
  });
