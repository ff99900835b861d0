import { photoOf, photoSightNames } from '@/shared/contract/photo';
import type { Config } from '../config';
import type { Photo } from '../entities/photo';
import type { PaperPhoto } from '../papers/hand-over-content';
import type { PaperWords } from '../papers/paper-words';
import { bare, lowerFirst } from './charge-words';
import { firstName } from './hand-over-words';
import { paperPicture } from './photo-image';
import { readPhoto } from './photo-files';
import type { RepairFile } from './repair-file';

/** The photos of a repair as its papers carry them, the first taken first. */
export async function paperPhotos(config: Config, file: RepairFile, words: PaperWords): Promise<PaperPhoto[]> {
  const drawn: PaperPhoto[] = [];
  // One after the other: only one of the large pictures is held at a time.
  for (const [place, photo] of [...file.photos].reverse().entries()) {
    const kept = await readPhoto(config, photo.file, 'picture');
    drawn.push({
      title: titleOf(file, photo, place + 1),
      note: `${photo.caption === null ? '' : `${bare(photo.caption)}. `}${firstName(file, photo.personId)}, ${words.date(photo.at)} ${words.clock(photo.at)}`,
      picture: kept === null ? null : await paperPicture(kept),
      width: photo.width,
      height: photo.height,
    });
  }
  return drawn;
}

function titleOf({ spares }: RepairFile, { spareId, modulePosition, seen }: Photo, number: number): string {
  const of = photoOf({ modulePosition, spare: spares.get(spareId ?? '') ?? null });
  return `Photo ${number}: ${of}${seen === 'none' ? '' : `, ${lowerFirst(photoSightNames[seen])}`}`;
}
