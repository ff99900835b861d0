import { conditionSeen, type ModuleConditionDto, type SeenCondition } from '@/shared/contract/photo';
import type { RepairBlock } from '@/shared/contract/repair';
import { personRef } from './alert-dto';
import { toInstant } from './instants';
import type { RepairFile } from './repair-file';

type Seen = Pick<RepairFile, 'photos' | 'removed' | 'people'>;

/** The worst first: what leaks burns and poisons, what swells may leak next, a dent is looked at. */
const worst: readonly SeenCondition[] = ['leaking', 'swollen', 'dented'];

/** What the photos show of the modules of the pack, out of the rows alone; the worst first. */
export function moduleConditions({ photos, removed, people }: Seen): ModuleConditionDto[] {
  const found = new Map<string, ModuleConditionDto>();
  for (const one of worst)
    // The newest first: of several that show the same, the last counts.
    for (const photo of photos) {
      const { modulePosition, seen } = photo;
      if (modulePosition === null || conditionSeen[seen] !== one || found.has(modulePosition)) continue;
      found.set(modulePosition, {
        modulePosition,
        condition: one,
        photoId: photo.id,
        at: toInstant(photo.at),
        by: personRef(people, photo.personId)!,
        fate: removed.find((module) => module.modulePosition === modulePosition)?.fate ?? null,
      });
    }
  return [...found.values()];
}

/** The condition that stands of a module; null: nothing was seen. */
export const conditionOf = (file: Seen, modulePosition: string): ModuleConditionDto | null =>
  moduleConditions(file).find((one) => one.modulePosition === modulePosition) ?? null;

/**
 * A module that leaks or swells keeps the repair from going on until it is recorded what became of it: out, or back in at
 * the customer's wish. The failing one comes out anyway. A dent only warns.
 */
export function conditionBlock(file: Seen, failing: string | null): RepairBlock | null {
  const open = moduleConditions(file).find(
    ({ condition, fate, modulePosition }) => condition !== 'dented' && fate === null && modulePosition !== failing,
  );
  if (!open) return null;
  return {
    code: 'module-condition',
    text: `Module ${open.modulePosition} is ${open.condition} on a photo. Record that it came out, or that the customer declined.`,
    role: null,
  };
}
