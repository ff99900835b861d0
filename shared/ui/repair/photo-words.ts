/** What is said of photos. Pure; instants are epoch ms. */
import {
  photoOf,
  photoSightNames,
  type ModuleConditionDto,
  type PhotoDto,
  type PhotoSight,
} from '@/shared/contract/photo';
import { MOST_PHOTO_BYTES } from '@/shared/contract/photo-upload';
import { moduleFateNames } from '@/shared/contract/repair';
import { firstName } from '../charge/card-model';

/** For who cannot see it: 'Photo of module 17, swelling: bulged at the left, Ines, 14:31' */
export function photoAlt(photo: PhotoDto, at: string): string {
  const of = photoOf(photo).replace(/^(Module|The)/, (word) => word.toLowerCase());
  const seen = photo.seen === 'none' ? '' : `, ${photoSightNames[photo.seen].toLowerCase()}`;
  const caption = photo.caption === null ? '' : `: ${photo.caption}`;
  return `Photo of ${of}${seen}${caption}, ${firstName(photo.by.name)}, ${at}`;
}

/** 'Module 17 is leaking.' with what became of it. */
export function conditionText({ modulePosition, condition, fate }: ModuleConditionDto): string {
  const what = `Module ${modulePosition} is ${condition}`;
  return fate === null ? `${what}.` : `${what}: ${moduleFateNames[fate].toLowerCase()}.`;
}

export const sightMeanings: Record<PhotoSight, string> = {
  none: 'As it should be, as far as the photo shows.',
  swelling: 'It bulges. The repair waits until it is recorded what became of it.',
  leak: 'Wet, stained or it smells. The repair waits until it is recorded what became of it.',
  damage: 'Dented, torn or burnt. It is named on the repair.',
};

const mega = 1024 * 1024;
const megabytes = (bytes: number): string => `${(bytes / mega).toFixed(1)} MB`;

/** Why a picture need not be sent at all; null: it may be. */
export function photoProblem({ bytes }: { bytes: number }): string | null {
  if (bytes === 0) return 'This file is empty. Take the photo again.';
  if (bytes > MOST_PHOTO_BYTES)
    return `This photo has ${megabytes(bytes)}, and ${megabytes(MOST_PHOTO_BYTES)} is the most. Take it at a lower resolution.`;
  return null;
}

/** 'Sending the photo, 1.2 of 3.4 MB' */
export const sendingText = (bytes: number, share: number): string =>
  share >= 1
    ? 'Sent. The photo is being looked at.'
    : `Sending the photo, ${(share * (bytes / mega)).toFixed(1)} of ${megabytes(bytes)}`;
