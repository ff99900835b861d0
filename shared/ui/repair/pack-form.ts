/** The numbers of a pack as they are typed. Pure. */
import type { PackDto } from '@/shared/contract/pack';

export interface PackTyped {
  /** Empty: not known. */
  moduleTypeId: string;
  groupCount: string;
  groupsPerModule: string;
  /** 'A module for each group, in their order: 1, 1, 2, 2'; empty: they follow each other. */
  positionOfGroup: string;
}

export const emptyPack: PackTyped = { moduleTypeId: '', groupCount: '', groupsPerModule: '', positionOfGroup: '' };

export const packTexts = (pack: PackDto): PackTyped => ({
  moduleTypeId: pack.moduleTypeId ?? '',
  groupCount: String(pack.groupCount),
  groupsPerModule: String(pack.groupsPerModule),
  positionOfGroup: pack.positionOfGroup?.join(', ') ?? '',
});

/**
 * The map as typed: parted by commas, semicolons or lines, so that a position may have a space ('3 left'); where there
 * is none of them, by spaces. Null: nothing was typed.
 */
export function positionsTyped(text: string): string[] | null {
  const bare = text.trim().replace(/[,;\s]+$/, '');
  if (bare === '') return null;
  return bare.split(/[,;\n\t]/.test(bare) ? /\s*[,;\n\t]\s*/ : /\s+/).map((one) => one.trim());
}

/** As the contract wants it; what is wrong in it is said by the contract. */
export const packTypedOf = (typed: PackTyped): unknown => ({
  ...typed,
  moduleTypeId: typed.moduleTypeId === '' ? null : typed.moduleTypeId,
  positionOfGroup: positionsTyped(typed.positionOfGroup),
});

/** 'Wanted: 96. Typed: 94.' while the map is typed; null where there is nothing to say. */
export function mapHint({ groupCount, positionOfGroup }: PackTyped): string | null {
  const typed = positionsTyped(positionOfGroup)?.length ?? 0;
  return typed === 0 ? null : `${typed} of ${groupCount.trim() || '?'} groups have a position.`;
}
