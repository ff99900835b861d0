import type { EntityManager } from 'typeorm';
import type { WaitDimension, WaitStage, waitWays } from '@/shared/contract/waits';
import { listChannels, listChargers } from '../../repositories/chargers.repository';
import { listModuleTypes } from '../../repositories/module-types.repository';
import { personRefs } from '../../repositories/person-refs.repository';
import { NONE } from './finished-wait-row';

const weekdays = ['Monday', 'Tuesday', 'Wednesday', 'Thursday', 'Friday', 'Saturday', 'Sunday'];

export const wayNames: Record<(typeof waitWays)[number], string> = {
  terminals: 'Through the terminals',
  'group-by-group': 'Group by group',
  paralleled: 'Groups paralleled',
  resistor: 'Through a resistor',
};

export const stageNames: Record<WaitStage, string> = {
  queue: 'Queue',
  charging: 'Charging',
  tapering: 'Tapering',
  resting: 'Resting',
  'check-due': 'Check due',
};

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
    weekday: (key) => weekdays[Number(key) - 1] ?? key,
  };
}
