import { useLocalSearchParams } from 'expo-router';
import { useMemo, useState } from 'react';
import { emptyPlan, type PlanTyped } from '@/shared/ui/plan/plan-typed';

/**
 * What the address brings along: a spare from the stock, or everything of a top-up or of a plan made again. Read once;
 * what is typed then counts.
 */
export function useAddress(): { topUpOf: string | null; insteadOf: string | null; initial: PlanTyped } {
  const params = useLocalSearchParams();
  const [address] = useState(params);
  return useMemo(() => {
    const text = (name: string): string => {
      const value = address[name];
      return (Array.isArray(value) ? value[0] : value) ?? '';
    };
    return {
      topUpOf: text('topUpOf') || null,
      insteadOf: text('insteadOf') || null,
      initial: {
        ...emptyPlan,
        spareId: text('spare'),
        targetVolts: text('target'),
        targetBy: text('soc') === '' ? '' : 'soc',
        targetSoc: text('soc'),
        toleranceMillivolts: text('tolerance'),
        meterId: text('meter'),
        packCelsius: text('celsius'),
        repairRef: text('repair'),
        modulePosition: text('position'),
      },
    };
  }, [address]);
}
