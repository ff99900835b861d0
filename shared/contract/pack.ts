/** A pack: how many groups it has, in which modules, and the workshop's own templates of it. */
import * as z from 'zod/mini';
import { id, optionalText, text } from './common';
import { optionalQuantity, quantity } from './quantity';

export const MOST_GROUPS = 400;
const MOST_PER_MODULE = 24;

/**
 * Spread at or under which a repair is proven where its pack has no aim of its own, mV. Common practice: what packs in good
 * order show at rest, and about what two readings of 96 groups can tell apart.
 */
export const USUAL_AIM_MILLIVOLTS = 10;

/** The name of a module position as the workshop has it: '17', '3 left'. */
const position = text('The module position', 20);

/**
 * The groups of a pack in the order in which its instrument numbers them. Without a list of its own, group 1 begins in module
 * 1 and the groups of a module follow each other.
 */
export const packSchema = z
  .object({
    moduleTypeId: z.nullable(id),
    groupCount: quantity({ name: 'Groups', unit: '', min: 1, max: MOST_GROUPS, whole: true }),
    groupsPerModule: quantity({ name: 'Groups per module', unit: '', min: 1, max: MOST_PER_MODULE, whole: true }),
    /** One position for each group, where the order is another; null: 1, 1, 2, 2, … */
    positionOfGroup: z.nullable(z.array(position)),
    /** Current of the pack's own balancing, A; empty: nobody knows it. 0: it does not balance. */
    bleedAmps: z.optional(optionalQuantity({ name: 'Bleed current', unit: 'A', min: 0, max: 10 })),
    /** Spread at or under which it is proven, mV; empty: the usual one. */
    aimMillivolts: z.optional(optionalQuantity({ name: 'Aim', unit: 'mV', min: 1, max: 200, whole: true })),
  })
  .check((context) => {
    const { groupCount, groupsPerModule, positionOfGroup } = context.value;
    if (positionOfGroup === null && groupCount % groupsPerModule !== 0)
      context.issues.push({
        code: 'custom',
        message: `${groupCount} groups do not fill modules of ${groupsPerModule}. Change one of the two, or type the positions.`,
        input: groupsPerModule,
        path: ['groupsPerModule'],
      });
    if (positionOfGroup !== null && positionOfGroup.length !== groupCount)
      context.issues.push({
        code: 'custom',
        message: `${groupCount} groups need ${groupCount} positions; ${positionOfGroup.length} were typed.`,
        input: positionOfGroup,
        path: ['positionOfGroup'],
      });
  });
export type PackInput = z.infer<typeof packSchema>;

export const packTypeSchema = z.object({
  name: text('The name', 60),
  pack: packSchema,
  /** Rest voltage per group with which such packs usually arrive; empty: as the workshop's own arrivals tell. */
  usualArrivalVolts: z.optional(optionalQuantity({ name: 'Usual arrival', unit: 'V', min: 0.5, max: 5 })),
  note: optionalText('The note'),
});
export type PackTypeInput = z.infer<typeof packTypeSchema>;

export interface PackDto extends PackInput {
  bleedAmps: number | null;
  aimMillivolts: number;
  moduleTypeName: string | null;
  moduleCount: number;
}

export interface PackTypeDto extends Omit<PackTypeInput, 'pack' | 'usualArrivalVolts'> {
  id: string;
  usualArrivalVolts: number | null;
  pack: PackDto;
  rev: number;
}

/** Position of each group, in the order of the groups. */
export function positionsOf(pack: Pick<PackInput, 'groupCount' | 'groupsPerModule' | 'positionOfGroup'>): string[] {
  return (
    pack.positionOfGroup ??
    Array.from({ length: pack.groupCount }, (_, group) => String(Math.floor(group / pack.groupsPerModule) + 1))
  );
}

/** Groups of a module position, 0-based, in their order. */
export function groupsAt(
  pack: Pick<PackInput, 'groupCount' | 'groupsPerModule' | 'positionOfGroup'>,
  modulePosition: string,
): number[] {
  return positionsOf(pack).flatMap((one, group) => (one === modulePosition ? [group] : []));
}

export const aimOf = ({ aimMillivolts }: Pick<PackInput, 'aimMillivolts'>): number =>
  aimMillivolts ?? USUAL_AIM_MILLIVOLTS;
