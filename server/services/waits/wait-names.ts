import type { EntityManager } from 'typeorm';
import { wayNames, weekdayNames } from '@/shared/contract/wait-names';
import type { WaitDimension } from '@/shared/contract/waits';
import { listChannels, listChargers } from '../../repositories/chargers.repository';
import { listModuleTypes } from '../../repositories/module-types.repository';
import { personRefs } from '../../repositories/person-refs.repository';
import { NONE } from './finished-wait-row';

export type WaitNames = Record<WaitDimension, (key: string) => string>;

/** What people call the keys of each dimension, those of retired and disabled ones too. */
export async function waitNames(manager: EntityManager, workshopId: string): Promise<WaitNames> {
  const named = (rows: Iterable<{ id: string; name: string }>, none: string) => {
    const names = new Map([...rows].map(({ id, name }) => [id, name]));
    return (key: string): string => (key === NONE ? none : (names.get(key) ?? 'gone'));
  };
  return {
    'module-type': named(await listModuleTypes(manager, workshopId), 'no type'),
    charger: named(await listChargers(manager, workshopId), 'no charger'),
    channel: named(await listChannels(manager, workshopId), 'no channel'),
    technician: named((await personRefs(manager, workshopId)).values(), 'nobody'),
    way: (key) => wayNames[key as keyof typeof wayNames] ?? key,
    weekday: (key) => weekdayNames[key as keyof typeof weekdayNames] ?? key,
  };
}
