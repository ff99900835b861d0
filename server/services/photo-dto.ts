import type { PhotoDto } from '@/shared/contract/photo';
import type { Photo } from '../entities/photo';
import { personRef } from './alert-dto';
import { toInstant } from './instants';
import type { RepairFile } from './repair-file';

/** The spare that a photo shows has its label here and nothing else: its own page tells the rest. */
export function photoDto({ people, spares }: Pick<RepairFile, 'people' | 'spares'>, photo: Photo): PhotoDto {
  const spare = spares.get(photo.spareId ?? '');
  return {
    id: photo.id,
    at: toInstant(photo.at),
    by: personRef(people, photo.personId)!,
    width: photo.width,
    height: photo.height,
    caption: photo.caption,
    seen: photo.seen,
    modulePosition: photo.modulePosition,
    spare: spare ? { id: spare.id, label: spare.label } : null,
    rev: photo.rev,
  };
}
