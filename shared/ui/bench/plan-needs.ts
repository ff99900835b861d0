/** What a first plan needs, out of what the workshop has. Pure. */
import type { ChargerDto, ModuleTypeDto } from '@/shared/contract/equipment';
import type { SpareDto } from '@/shared/contract/spare';
import type { PlanNeed } from './first-plan';

const count = (number: number, one: string, many: string) => `${number} ${number === 1 ? one : many}`;

/**
 * @param may who may enter equipment and stock
 * @returns null while something is still being read
 */
export function needsOf(
  {
    chargers,
    types,
    spares,
  }: {
    chargers: readonly ChargerDto[] | undefined;
    types: readonly ModuleTypeDto[] | undefined;
    spares: readonly SpareDto[] | undefined;
  },
  may: { equipment: boolean; stock: boolean },
): PlanNeed[] | null {
  if (!chargers || !types || !spares) return null;
  const channels = chargers.filter((charger) => !charger.retired).reduce((sum, one) => sum + one.channels.length, 0);
  const read = spares.filter((spare) => spare.where === 'shelf' && spare.reading !== null).length;
  const byManager = 'A manager enters it under Workshop.';
  return [
    {
      key: 'charger',
      title: 'A charger',
      detail: channels > 0 ? count(channels, 'channel', 'channels') : may.equipment ? 'with its channels' : byManager,
      done: channels > 0,
      ...(may.equipment ? { enter: { title: 'Enter one', path: '/workshop' } } : {}),
    },
    {
      key: 'type',
      title: 'A module type with its limits',
      detail: types.length > 0 ? count(types.length, 'type', 'types') : may.equipment ? 'from the maker' : byManager,
      done: types.length > 0,
      ...(may.equipment ? { enter: { title: 'Enter one', path: '/workshop' } } : {}),
    },
    {
      key: 'spare',
      title: 'A spare with its readings',
      detail: read > 0 ? count(read, 'on the shelf', 'on the shelf') : 'none on the shelf yet',
      done: read > 0,
      ...(may.stock && types.length > 0 ? { enter: { title: 'Enter one', path: '/spares/new' } } : {}),
    },
  ];
}
