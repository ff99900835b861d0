import type { ChargerDto } from '@/shared/contract/equipment';
import { api } from './api';
import { roots, type Root } from './query-keys';
import { useWrite } from './use-write';

/** What stands otherwise once a channel fails, or works again. */
const changes: Root[] = [roots.chargers, roots.charge, roots.charges, roots.board, roots.alerts, roots.benchPlan];

/** Says that a channel is out of order. */
export const useChannelFailed = () =>
  useWrite({
    send: ({ id, seen }: { id: string; seen: string }) => api.post<ChargerDto>(`/channels/${id}/fault`, { seen }),
    changes,
  });

/** Says that it works again. */
export const useChannelWorks = () =>
  useWrite({ send: ({ id }: { id: string }) => api.post<ChargerDto>(`/channels/${id}/works`, {}), changes });
