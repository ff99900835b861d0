import { queryOptions, useQuery } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import type { BoardDto } from '@/shared/contract/board';
import type { WallCodeDto, WallMeDto } from '@/shared/contract/wall';
import { api, orNull } from './api';
import { serverNow } from './clock';
import { onLive, useLink } from './link';
import { startLive } from './live';
import { newBuildThere, takeNewBuild } from './new-build';
import { queryClient } from './query-client';
import { roots } from './query-keys';
import { staleTimes } from './stale-times';
import { recall, remember } from './storage';
import { pairWall, type PairingState } from './wall-pairing';

const pairedKey = 'wall-paired';

/** Which wall this screen is; null: none yet. A screen that was never paired is not asked about. */
export const wallMeQuery = () =>
  queryOptions({
    queryKey: [roots.wallMe],
    queryFn: async ({ signal }) => {
      if (recall(pairedKey) !== '1') return null;
      const me = await orNull(api.get<WallMeDto>('/wall/me', { open: true, signal }), [401, 403]);
      if (!me) remember(pairedKey, null);
      return me;
    },
    staleTime: Infinity,
    gcTime: Infinity,
    // A wall tries for ever: nobody stands by to press a button.
    retry: true,
  });
export const useWallMe = () => useQuery(wallMeQuery());

/** The board as a wall reads it. Asked for by itself every minute while the socket is away. */
export function useWallBoard(enabled: boolean) {
  const { state } = useLink();
  return useQuery({
    queryKey: [roots.board, 'wall'],
    queryFn: async ({ signal }) => {
      const board = await orNull(api.get<BoardDto>('/wall/board', { open: true, signal }), [401, 403]);
      if (!board) unpair();
      return board;
    },
    enabled,
    staleTime: staleTimes.running,
    retry: true,
    retryDelay: (attempt) => Math.min(10_000, 1000 * 2 ** attempt) * (0.75 + Math.random() / 2),
    refetchInterval: state === 'live' ? 5 * 60_000 : 60_000,
    refetchIntervalInBackground: true,
  });
}

/** The right was taken back, or never there: show a code again. */
function unpair(): void {
  remember(pairedKey, null);
  queryClient.removeQueries({ queryKey: [roots.board, 'wall'] });
  queryClient.setQueryData(wallMeQuery().queryKey, null);
}

/** Keeps a paired wall connected; goes back to the code when its right is taken back. */
export function useWallLive(paired: boolean): void {
  useEffect(() => (paired ? startLive('wall', unpair) : undefined), [paired]);
}

/** Loads the page anew when the server came back with another build: nobody stands by to do it. */
export function useNewBuildReload(): void {
  useEffect(
    () =>
      onLive(() => {
        void newBuildThere().then((yes) => {
          if (yes) void takeNewBuild();
        });
      }),
    [],
  );
}

/** Runs the pairing while the screen is not paired. */
export function useWallPairing(active: boolean): PairingState {
  const [state, setState] = useState<PairingState>({ kind: 'asking' });
  useEffect(() => {
    if (!active) return;
    let over = false;
    void pairWall({
      askCode: () => api.post<WallCodeDto>('/wall/codes', {}, { open: true }),
      askToken: (deviceCode) => api.post('/wall/token', { deviceCode }, { open: true }),
      now: serverNow,
      wait: (ms) => new Promise((resolve) => setTimeout(resolve, ms)),
      stopped: () => over,
      show: (next) => {
        if (over) return;
        if (next.kind === 'paired') {
          remember(pairedKey, '1');
          void queryClient.invalidateQueries({ queryKey: wallMeQuery().queryKey });
        }
        setState(next);
      },
    });
    return () => {
      over = true;
    };
  }, [active]);
  return state;
}
