import type { MeterDto } from '@/shared/contract/equipment';
import { useChargers } from './chargers';
import { useMeters } from './meters';

/** The meters that go to a module: none that is the display of a charger. Empty until both are known. */
export function useHandMeters(): MeterDto[] {
  const meters = useMeters();
  const chargers = useChargers();
  if (!meters.data || !chargers.data) return [];
  const displays = new Set(chargers.data.map(({ meterId }) => meterId));
  return meters.data.filter(({ id }) => !displays.has(id));
}
