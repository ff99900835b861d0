import { useQuery } from '@tanstack/react-query';
import type { EstimateDto, EstimateInput } from '@/shared/contract/estimate';
import { roots } from './query-keys';

/**
 * The quick estimate, reckoned on this device by the very function the server uses; nothing is sent. The planner is
 * loaded when the first numbers are whole. While the next is reckoned the last stays (`isPlaceholderData`).
 *
 * @param input null: the numbers are not whole yet
 */
export const useEstimate = (input: EstimateInput | null) =>
  useQuery<EstimateDto>({
    queryKey: [roots.estimate, input],
    queryFn: async () => {
      const { quickEstimate } = await import('@/calc/plan/estimate');
      return quickEstimate(input!);
    },
    enabled: input !== null,
    staleTime: Infinity,
    gcTime: 60_000,
    retry: false,
    placeholderData: (last) => last,
  });

/** Fetches the planner ahead of the first numbers; call it after the first paint. */
export const preloadEstimate = (): void => void import('@/calc/plan/estimate').catch(() => undefined);
