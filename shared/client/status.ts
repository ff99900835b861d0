import { useMutation, useQuery } from '@tanstack/react-query';
import type { StatusDto } from '@/shared/contract/status';
import { api } from './api';
import { roots } from './query-keys';
import { saveFile } from './save-file';
import { staleTimes } from './stale-times';
import { useWrite } from './use-write';

/** How the installation is. */
export const useStatus = () =>
  useQuery({
    queryKey: [roots.status],
    queryFn: ({ signal }) => api.get<StatusDto>('/status', { signal }),
    staleTime: staleTimes.running,
  });

/** Makes a copy of all data now. */
export const useBackUp = () =>
  useWrite({ send: () => api.post<StatusDto>('/status/backup', {}), changes: [roots.status] });

/** Saves everything the workshop has as a ZIP on this device. @param day '2026-06-09', in the file's name */
export const useExport = () =>
  useMutation({
    mutationFn: async (day: string) => saveFile(await api.blob('/export.zip'), `bidewell-${day}.zip`),
  });
