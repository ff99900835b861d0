/** Photos of a repair: what they show, and what was seen on them. */
import * as z from 'zod/mini';
import { id, optionalText, type Instant, type PersonRef } from './common';
import type { ModuleFate } from './repair';
import type { SpareInput } from './spare';

export const photoSights = ['none', 'swelling', 'leak', 'damage'] as const;
export type PhotoSight = (typeof photoSights)[number];
export const photoSightNames: Record<PhotoSight, string> = {
  none: 'Nothing wrong',
  swelling: 'Swelling',
  leak: 'Leak',
  damage: 'Damage',
};

/** What a module is after it was seen so; null: sound, as far as a picture tells. */
export type SeenCondition = Extract<SpareInput['condition'], 'swollen' | 'leaking' | 'dented'>;
export const conditionSeen: Record<PhotoSight, SeenCondition | null> = {
  none: null,
  swelling: 'swollen',
  leak: 'leaking',
  damage: 'dented',
};

export const photoNoteSchema = z
  .object({
    caption: optionalText('What the photo shows', 200),
    seen: z.enum(photoSights),
    /** The module of the pack it shows. */
    modulePosition: optionalText('The module position', 20),
    /** The spare of this repair it shows, in place of a module of the pack. */
    spareId: z.nullable(id),
    /** The charge that waits for that spare and falls away with its quarantine, as the person saw it. */
    charge: z.optional(z.nullable(z.object({ id, rev: z.int().check(z.minimum(1)) }))),
  })
  .check(
    z.refine((one) => one.seen === 'none' || one.modulePosition !== null || one.spareId !== null, {
      message: 'Say on which module it was seen.',
      path: ['modulePosition'],
    }),
    z.refine((one) => one.modulePosition === null || one.spareId === null, {
      message: 'It shows a module of the pack or the spare. Name one of them.',
      path: ['modulePosition'],
    }),
  );
export type PhotoNoteInput = z.infer<typeof photoNoteSchema>;

export interface PhotoDto {
  id: string;
  at: Instant;
  by: PersonRef;
  /** Pixels of the picture as it is kept, upright. */
  width: number;
  height: number;
  caption: string | null;
  seen: PhotoSight;
  modulePosition: string | null;
  spare: { id: string; label: string } | null;
  rev: number;
}

/** 'Module 17', 'S-0398', 'The pack' */
export const photoOf = ({ modulePosition, spare }: Pick<PhotoDto, 'modulePosition' | 'spare'>): string =>
  spare ? spare.label : modulePosition !== null ? `Module ${modulePosition}` : 'The pack';

/** What a photo has shown of a module of the pack; of several the worst. */
export interface ModuleConditionDto {
  modulePosition: string;
  condition: SeenCondition;
  photoId: string;
  at: Instant;
  by: PersonRef;
  /** What became of the module since; null: nothing is recorded. */
  fate: ModuleFate | null;
}
