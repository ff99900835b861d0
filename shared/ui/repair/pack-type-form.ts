/** A template of a pack as it is typed. Pure. */
import * as z from 'zod/mini';
import { packTypeSchema, type PackTypeDto } from '@/shared/contract/pack';
import type { LocaleMarks } from '../format/marks';
import { typedNumber } from '../workshop/numbers-typed';
import { emptyPack, packTexts, packTypedOf, type PackTyped } from './pack-form';

export interface PackTypeTyped {
  name: string;
  pack: PackTyped;
  /** V per group; empty: as the workshop's own arrivals tell. */
  usualArrivalVolts: string;
  note: string;
  baseRev: number;
}

export const packTypeTexts = (of: PackTypeDto | null, marks: LocaleMarks): PackTypeTyped => ({
  name: of?.name ?? '',
  pack: of ? packTexts(of.pack, marks) : emptyPack,
  usualArrivalVolts: typedNumber(of?.usualArrivalVolts, 3, marks),
  note: of?.note ?? '',
  baseRev: of?.rev ?? 0,
});

export const packTypeForm = z.pipe(
  z.transform((raw: unknown): unknown => {
    const { name, pack, usualArrivalVolts, note } = raw as PackTypeTyped;
    return { name, note, usualArrivalVolts, pack: packTypedOf(pack) };
  }),
  packTypeSchema,
);

export const packTypeNames = {
  name: 'Name',
  groups: 'Groups',
  perModule: 'Groups per module',
  positions: 'Module of each group',
  bleed: 'Bleed current',
  aim: 'Aim after the fit',
  usualArrivalVolts: 'Usually arrives at',
  note: 'Note',
} as const;

/** The texts in one level, for what differs between two of them. */
export const flatPackType = ({ name, pack, usualArrivalVolts, note }: PackTypeTyped): Record<string, string> => ({
  name,
  groups: pack.groupCount,
  perModule: pack.groupsPerModule,
  positions: pack.positionOfGroup,
  bleed: pack.bleedAmps,
  aim: pack.aimMillivolts,
  usualArrivalVolts,
  note,
});
