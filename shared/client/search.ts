import { keepPreviousData, queryOptions, useQuery } from '@tanstack/react-query';
import type { SearchDto } from '@/shared/contract/search';
import { api } from './api';
import { roots } from './query-keys';
import { staleTimes } from './stale-times';

/** One look through repairs, spares and charges; the last answer stays while the next comes. */
export const searchQuery = (q: string) =>
  queryOptions({
    queryKey: [roots.search, q],
    queryFn: ({ signal }) => api.get<SearchDto>('/search', { query: { q }, signal }),
    staleTime: staleTimes.running,
    enabled: q !== '',
    placeholderData: keepPreviousData,
  });
export const useSearch = (q: string) => useQuery(searchQuery(q));
