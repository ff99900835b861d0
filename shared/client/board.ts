import { queryOptions, useQuery } from '@tanstack/react-query';
import type { BoardDto } from '@/shared/contract/board';
import { api } from './api';
import { roots } from './query-keys';
import { staleTimes } from './stale-times';

export const boardQuery = () =>
  queryOptions({
    queryKey: [roots.board],
    queryFn: ({ signal }) => api.get<BoardDto>('/board', { signal }),
    staleTime: staleTimes.running,
  });
/** All charges of the workshop, as the bench shows them. */
export const useBoard = () => useQuery(boardQuery());
