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

let asked = false;

/**
 * Fetches the planner (32 KiB) with the first touch or key on the page, ahead of the first whole numbers: the first
 * load does not carry it, and nobody waits for it either.
 */
export function preloadEstimate(): void {
  if (asked) return;
  asked = true;
  const events = ['pointerdown', 'keydown', 'focusin'] as const;
  const fetchIt = () => {
    for (const event of events) document.removeEventListener(event, fetchIt, { capture: true });
    // Not reached now: the first estimate asks again and says so.
    void import('@/calc/plan/estimate').catch(() => undefined);
  };
  for (const event of events) document.addEventListener(event, fetchIt, { capture: true, passive: true });
}
