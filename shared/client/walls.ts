import { useQuery } from '@tanstack/react-query';
import type { ApproveWallInput, WallDto, WallRequestDto } from '@/shared/contract/wall';
import { api } from './api';
import { isPassing } from './api-problem';
import { roots } from './query-keys';
import { staleTimes } from './stale-times';
import { useWrite } from './use-write';

/** Paired walls. */
export const useWalls = () =>
  useQuery({
    queryKey: [roots.walls],
    queryFn: ({ signal }) => api.get<WallDto[]>('/walls', { signal }),
    staleTime: staleTimes.running,
  });

/** The screen that shows this code; waits until the code is whole. 404: no screen shows it. */
export const useWallRequest = (userCode: string | null) =>
  useQuery({
    queryKey: [roots.wallRequest, userCode],
    queryFn: ({ signal }) =>
      api.get<WallRequestDto>(`/wall/requests/${encodeURIComponent(userCode ?? '')}`, { signal }),
    enabled: userCode !== null,
    staleTime: 10_000,
    retry: (failures, error) => failures < 2 && isPassing(error),
  });

export const useApproveWall = () =>
  useWrite({
    send: (input: ApproveWallInput) => api.post<WallDto>('/wall/approvals', input),
    // Its request is not asked for again: it is answered, and the page that showed it closes.
    changes: [roots.walls],
  });

/** Takes a wall's right to read back; its screen shows a code again. */
export const useRevokeWall = () =>
  useWrite({ send: (id: string) => api.delete(`/walls/${id}`), changes: [roots.walls] });

/** Refuses the screen that shows this code. */
export const useRefuseWall = () =>
  useWrite({
    send: (userCode: string) => api.delete(`/wall/requests/${encodeURIComponent(userCode)}`),
  });
