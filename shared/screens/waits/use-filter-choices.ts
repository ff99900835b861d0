import { useChargers } from '@/shared/client/chargers';
import { useModuleTypes } from '@/shared/client/module-types';
import { usePeople } from '@/shared/client/people';
import type { SelectOption } from '@/shared/ui/primitives/select';
import type { AddressKey, WaitParams } from '@/shared/ui/waits/wait-address';
import { dimensionNames, stageNames, wayNames, weekdayNames } from '@/shared/contract/wait-names';

export interface FilterChoice {
  key: AddressKey;
  label: string;
  /** What stands there while nothing is chosen. */
  all: string;
  options: SelectOption<string>[];
}

const named = (names: Record<string, string>): SelectOption<string>[] =>
  Object.entries(names).map(([value, label]) => ({ value, label }));

/** What the page can be narrowed by. A value that has gone meanwhile (a retired charger) stays choosable while it is set. */
export function useFilterChoices(params: WaitParams): FilterChoice[] {
  const types = useModuleTypes().data ?? [];
  const chargers = useChargers().data ?? [];
  const people = usePeople().data ?? [];
  const ids = (rows: readonly { id: string; name: string }[]): SelectOption<string>[] =>
    rows.map(({ id, name }) => ({ value: id, label: name }));
  const none = (label: string): SelectOption<string> => ({ value: 'none', label });
  const choices: FilterChoice[] = [
    { key: 'type', label: dimensionNames['module-type'], all: 'All module types', options: ids(types) },
    {
      key: 'channel',
      label: dimensionNames.channel,
      all: 'All channels',
      options: [...chargers.flatMap(({ channels }) => ids(channels)), none('No channel')],
    },
    {
      key: 'charger',
      label: dimensionNames.charger,
      all: 'All chargers',
      options: [...ids(chargers), none('No charger')],
    },
    {
      key: 'technician',
      label: dimensionNames.technician,
      all: 'Everybody',
      options: [...ids(people), none('Nobody')],
    },
    { key: 'way', label: dimensionNames.way, all: 'All ways', options: named(wayNames) },
    { key: 'weekday', label: dimensionNames.weekday, all: 'All days', options: named(weekdayNames) },
    { key: 'stage', label: 'Stage', all: 'The whole wait', options: named(stageNames) },
  ];
  return choices.map((choice) => {
    const set = params[choice.key];
    return set === undefined || choice.options.some(({ value }) => value === set)
      ? choice
      : { ...choice, options: [...choice.options, { value: set, label: 'One that has gone' }] };
  });
}

/** '2-series 66 Ah, channel A1': in words, what the page is narrowed to; '' where to nothing. */
export const narrowedWords = (choices: readonly FilterChoice[], params: WaitParams): string =>
  choices
    .flatMap(({ key, options }) => options.filter(({ value }) => value === params[key]).map(({ label }) => label))
    .join(', ');
