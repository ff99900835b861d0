/** Photos of a repair: taking one in, saying what is seen on it, giving it out, and removing it. */
import { conditionSeen, photoSightNames, type PhotoNoteInput } from '@/shared/contract/photo';
import { groupsAt } from '@/shared/contract/pack';
import type { RepairPageDto } from '@/shared/contract/repair';
import type { Deps, Member } from '../deps';
import type { Photo } from '../entities/photo';
import { conflict, invalid, notFound, stale } from '../errors/domain-error';
import { countPhotos, deletePhoto, findPhoto, insertPhoto, updatePhoto } from '../repositories/photos.repository';
import { findRepair } from '../repositories/repairs.repository';
import { lowerFirst } from './charge-words';
import { announce, type Announcement } from './charge-write';
import { newId } from './ids';
import { dropPhoto, keepPhoto, readPhoto, type PhotoPart } from './photo-files';
import { takePhoto } from './photo-image';
import { setSpareAside } from './quarantine.service';
import { repairPage } from './repair-dto';
import type { RepairFile } from './repair-file';
import { changeRepair, type RepairWrite } from './repair-write';
import { knownSpare } from './spare-file';

/** A repair is told in a dozen photos; more than this is a mistake of the sender. */
const MOST_PHOTOS = 60;
const whileIn = ['open', 'handed-over'] as const;

async function refuseMore({ dataSource }: Deps, { workshopId }: Member, repairId: string): Promise<void> {
  if (!(await findRepair(dataSource.manager, workshopId, repairId))) throw notFound('This repair');
  if ((await countPhotos(dataSource.manager, workshopId, repairId)) >= MOST_PHOTOS)
    throw conflict('photos_full', `A repair holds ${MOST_PHOTOS} photos. Remove one that nobody needs.`);
}

/**
 * Takes a photo in. Its files are written before its row and removed where the row is not: nothing half is left.
 * @throws DomainError 400, 413 or 415 with what to change, 404, 409
 */
export async function addPhoto(
  deps: Deps,
  member: Member,
  repairId: string,
  bytes: Buffer,
  now: number,
): Promise<RepairPageDto> {
  await refuseMore(deps, member, repairId);
  const taken = await takePhoto(bytes);
  const file = await keepPhoto(deps.config, taken);
  const { workshopId, personId } = member;
  const { width, height, sha256, picture } = taken;
  try {
    return await changeRepair(deps, member, repairId, now, { whileIn }, async ({ manager, note }) => {
      await insertPhoto(manager, {
        ...{ id: newId(), workshopId, repairId, file, width, height, bytes: picture.length, sha256 },
        ...{ caption: null, seen: 'none', modulePosition: null, spareId: null, at: now, personId, rev: 1 },
      });
      note('photo added');
    });
  } catch (error) {
    await dropPhoto(deps.config, file);
    throw error;
  }
}

/** The photo a write is about, and its repair. @throws DomainError 404 */
async function knownPhoto({ dataSource }: Deps, { workshopId }: Member, id: string): Promise<Photo> {
  const photo = await findPhoto(dataSource.manager, workshopId, id);
  if (!photo) throw notFound('This photo');
  return photo;
}

/** The photo as it stands within the transaction. @throws DomainError 404 removed meanwhile, 412 changed meanwhile */
async function photoAt({ manager, file, now }: RepairWrite, id: string, rev: number): Promise<Photo> {
  const photo = file.photos.find((one) => one.id === id);
  if (!photo) throw notFound('This photo');
  if (photo.rev !== rev) throw stale(await repairPage(manager, file, now));
  return photo;
}

/**
 * Says what a photo shows. What is seen on a module of the pack is that module's condition from then; a spare of ours it is
 * seen on goes into quarantine in the same transaction.
 * @throws DomainError 400 a module that the pack does not have or a spare that is not this repair's; 409 where the spare is
 * on a charge that is begun, or on one that the person has not seen; 412 stale
 */
export async function notePhoto(
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  input: PhotoNoteInput,
  now: number,
): Promise<RepairPageDto> {
  const { repairId } = await knownPhoto(deps, member, id);
  let takenOff: Announcement | null = null;
  const page = await changeRepair(deps, member, repairId, now, { whileIn, stock: true }, async (write) => {
    const photo = await photoAt(write, id, rev);
    refuseStrange(write.file, input);
    const { caption, seen, modulePosition, spareId } = input;
    const same = photo.seen === seen && photo.modulePosition === modulePosition && photo.spareId === spareId;
    await updatePhoto(write.manager, member.workshopId, id, { caption, seen, modulePosition, spareId, rev: rev + 1 });
    if (same) return;
    takenOff = await setAsideSeen(write, input);
    write.note(await sightText(write, input));
  });
  // What TypeScript cannot follow: the act has run by now.
  const announcement = takenOff as Announcement | null;
  if (announcement) announce(deps, announcement, now);
  return page;
}

function refuseStrange({ repair, spare, charges }: RepairFile, { modulePosition, spareId }: PhotoNoteInput): void {
  if (modulePosition !== null && groupsAt(repair, modulePosition).length === 0)
    throw invalid({ modulePosition: `This pack has no module ${modulePosition}. Type another.` });
  if (spareId !== null && spare?.id !== spareId && !charges.some((one) => one.spare.id === spareId))
    throw invalid({ spareId: 'This spare is not one of this repair. Choose another.' });
}

async function setAsideSeen(
  { manager, file, member, now }: RepairWrite,
  { seen, spareId, charge }: PhotoNoteInput,
): Promise<Announcement | null> {
  const condition = conditionSeen[seen];
  if (spareId === null || condition === null) return null;
  const spare = await knownSpare(manager, member.workshopId, spareId);
  if (spare.quarantinedAt !== null) return null;
  const reason = `${photoSightNames[seen]} seen on a photo of ${file.repair.number}.`;
  return setSpareAside(manager, member, spare, { reason, condition, charge: charge ?? null }, now);
}

async function sightText(
  { manager, member }: RepairWrite,
  { seen, modulePosition, spareId }: PhotoNoteInput,
): Promise<string> {
  const of =
    spareId !== null
      ? (await knownSpare(manager, member.workshopId, spareId)).label
      : modulePosition !== null
        ? `module ${modulePosition}`
        : 'the pack';
  return `photo of ${of}: ${lowerFirst(photoSightNames[seen])}`;
}

/**
 * Removes a photo and its files, for good.
 * @throws DomainError 409 while a condition stands on it, 412 stale
 */
export async function removePhoto(
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  now: number,
): Promise<RepairPageDto> {
  const { repairId, file } = await knownPhoto(deps, member, id);
  const page = await changeRepair(deps, member, repairId, now, { whileIn }, async (write) => {
    const photo = await photoAt(write, id, rev);
    if (photo.seen !== 'none')
      throw conflict(
        'photo_shows',
        `This photo shows ${lowerFirst(photoSightNames[photo.seen])}. Say first that nothing is wrong, where that is so.`,
      );
    await deletePhoto(write.manager, member.workshopId, id);
    write.note('photo removed');
  });
  // After the commit: a row without its file would be worse than a file without its row.
  await dropPhoto(deps.config, file);
  return page;
}

/** A photo's bytes and what tells two of them apart. @throws DomainError 404 unknown, or its file is gone */
export async function photoBytes(
  deps: Deps,
  member: Member,
  id: string,
  part: PhotoPart,
): Promise<{ bytes: Buffer; tag: string }> {
  const { file, sha256 } = await knownPhoto(deps, member, id);
  const bytes = await readPhoto(deps.config, file, part);
  if (!bytes) throw notFound('The file of this photo');
  return { bytes, tag: `"${sha256.slice(0, 32)}-${part}"` };
}
