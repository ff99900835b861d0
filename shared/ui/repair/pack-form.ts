/** The numbers of a pack as they are typed. Pure. */
import { USUAL_AIM_MILLIVOLTS, type PackDto } from '@/shared/contract/pack';
import { NBSP, pointMarks, type LocaleMarks } from '../format/marks';
import { millivolts } from '../format/quantities';
import { typedNumber } from '../workshop/numbers-typed';

export interface PackTyped {
  /** Empty: not known. */
  moduleTypeId: string;
  groupCount: string;
  groupsPerModule: string;
  /** 'A module for each group, in their order: 1, 1, 2, 2'; empty: they follow each other. */
  positionOfGroup: string;
  /** A; empty: nobody knows it. */
  bleedAmps: string;
  /** mV. */
  aimMillivolts: string;
}

export const emptyPack: PackTyped = {
  ...{ moduleTypeId: '', groupCount: '', groupsPerModule: '', positionOfGroup: '', bleedAmps: '' },
  aimMillivolts: String(USUAL_AIM_MILLIVOLTS),
};

export const packTexts = (pack: PackDto, marks: LocaleMarks = pointMarks): PackTyped => ({
  moduleTypeId: pack.moduleTypeId ?? '',
  groupCount: String(pack.groupCount),
  groupsPerModule: String(pack.groupsPerModule),
  positionOfGroup: pack.positionOfGroup?.join(', ') ?? '',
  bleedAmps: typedNumber(pack.bleedAmps, 0, marks),
  aimMillivolts: typedNumber(pack.aimMillivolts, 0, marks),
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

/** 'Aim 10 mV, bleed current 0.15 A' */
export function aimWords({ aimMillivolts, bleedAmps }: PackDto, marks: LocaleMarks = pointMarks): string {
  const bleed = bleedAmps === null ? '' : `, bleed current ${typedNumber(bleedAmps, 0, marks)}${NBSP}A`;
  return `Aim ${millivolts(aimMillivolts / 1000)}${bleed}`;
}
