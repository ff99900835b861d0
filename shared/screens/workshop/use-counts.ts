import { useChargers } from '@/shared/client/chargers';
import { useModuleTypes } from '@/shared/client/module-types';
import { usePeople } from '@/shared/client/people';

/** 'Harbour Lane Traction · 6 people, 6 channels, 4 module types' */
export function useCounts(name: string): string {
  const people = usePeople().data?.filter((person) => !person.disabled).length;
  const channels = useChargers()
    .data?.filter((charger) => !charger.retired)
    .reduce((sum, charger) => sum + charger.channels.length, 0);
  const types = useModuleTypes().data?.length;
  const counted = (count: number | undefined, one: string, many: string) =>
    count === undefined ? [] : [`${count} ${count === 1 ? one : many}`];
  const counts = [
    ...counted(people, 'person', 'people'),
    ...counted(channels, 'channel', 'channels'),
    ...counted(types, 'module type', 'module types'),
  ].join(', ');
  return counts ? `${name} · ${counts}` : name;
}
