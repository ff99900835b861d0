import { queryOptions, useQuery } from '@tanstack/react-query';
import type { ModuleTypeDto, ModuleTypeInput, OwnCurveInput } from '@/shared/contract/equipment';
import { api } from './api';
import { roots } from './query-keys';
import { staleTimes } from './stale-times';
import { useWrite } from './use-write';

export const moduleTypesQuery = () =>
  queryOptions({
    queryKey: [roots.moduleTypes],
    queryFn: ({ signal }) => api.get<ModuleTypeDto[]>('/module-types', { signal }),
    staleTime: staleTimes.setUp,
  });
export const useModuleTypes = () => useQuery(moduleTypesQuery());

export const moduleTypeQuery = (id: string) =>
  queryOptions({
    queryKey: [roots.moduleTypes, id],
    queryFn: ({ signal }) => api.get<ModuleTypeDto>(`/module-types/${id}`, { signal }),
    staleTime: staleTimes.setUp,
    enabled: id !== '',
  });
export const useModuleType = (id: string) => useQuery(moduleTypeQuery(id));

export const useSaveModuleType = () =>
  useWrite({
    /** With id and rev: changes that one. Without: a new one. */
    send: ({ id, rev, ...input }: ModuleTypeInput & { id?: string; rev?: number }) =>
      id
        ? api.patch<ModuleTypeDto>(`/module-types/${id}`, input, { rev })
        : api.post<ModuleTypeDto>('/module-types', input),
    changes: [roots.moduleTypes, roots.spares, roots.spare],
  });

/** Keeps a table as the type's own curve; 400: a sentence for each row in `fields` ('csv.4', 'csv' of the whole). */
export const useSaveOwnCurve = () =>
  useWrite({
    send: ({ id, rev, csv }: OwnCurveInput & { id: string; rev: number }) =>
      api.put<ModuleTypeDto>(`/module-types/${id}/curve`, { csv }, { rev }),
    changes: [roots.moduleTypes],
  });

/** The published curve rules again. */
export const useRemoveOwnCurve = () =>
  useWrite({
    send: ({ id, rev }: { id: string; rev: number }) => api.delete<ModuleTypeDto>(`/module-types/${id}/curve`, { rev }),
    changes: [roots.moduleTypes],
  });

export const useRemoveModuleType = () =>
  useWrite({
    send: ({ id, rev }: { id: string; rev: number }) => api.delete(`/module-types/${id}`, { rev }),
    changes: [roots.moduleTypes],
  });
