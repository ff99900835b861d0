/** What becomes of an uploaded picture: looked at by its content, turned upright, stripped of all else, written anew. */
import { createHash } from 'node:crypto';
import { DomainError } from '../errors/domain-error';

/** Largest picture that is decoded. Phones make up to 50 million pixels and their larger ones are tiled or enlarged. */
export const MOST_PIXELS = 64_000_000;
/** Longest edge of the picture as it is kept, and of its thumbnail, px. */
const KEPT_EDGE = 2400;
const THUMBNAIL_EDGE = 360;
/** The same on paper, where it stands 83 mm wide: some 300 dots to the inch, a tenth of the bytes. */
const PAPER_EDGE = 1000;
/** Longest time one picture may take, s. */
const MOST_SECONDS = 30;

export interface TakenPhoto {
  picture: Buffer;
  thumbnail: Buffer;
  width: number;
  height: number;
  sha256: string;
}

const refused = (code: string, message: string, status = 415): DomainError =>
  new DomainError(status, code, message, { fields: { photo: message } });

const readable = new Set(['image/jpeg', 'image/png', 'image/webp']);
const ofPhones = new Set(['image/heic', 'image/heif', 'image/heic-sequence', 'image/heif-sequence', 'image/avif']);

/** @throws DomainError 400 or 415 with what to change, by the content alone: no name and no stated type is looked at */
async function refuseOther(bytes: Buffer): Promise<void> {
  if (bytes.length === 0) throw refused('photo_empty', 'This file is empty. Take the photo again.', 400);
  const { fileTypeFromBuffer } = await import('file-type');
  const type = await fileTypeFromBuffer(bytes);
  if (type && readable.has(type.mime)) return;
  if (type && ofPhones.has(type.mime))
    throw refused(
      'photo_type',
      'This photo is in the phone’s own format, which cannot be read here. Set the camera to “most compatible”, or send it as JPEG.',
    );
  throw refused('photo_type', 'This is no photo. Choose a JPEG, PNG or WebP picture.');
}

let last: Promise<unknown> = Promise.resolve();
/** One picture after the other: each needs some hundred megabytes for the blink of an eye. */
function inTurn<T>(work: () => Promise<T>): Promise<T> {
  const mine = last.then(work);
  last = mine.catch(() => undefined);
  return mine;
}

/**
 * Makes of an upload what is kept: a JPEG without any metadata, upright, and its thumbnail.
 * @throws DomainError with what to change, where it is no picture, damaged, or has too many pixels
 */
export async function takePhoto(bytes: Buffer): Promise<TakenPhoto> {
  await refuseOther(bytes);
  const { default: sharp } = await import('sharp');
  return inTurn(async () => {
    try {
      const { data, info } = await sharp(bytes, { limitInputPixels: MOST_PIXELS, failOn: 'error' })
        .autoOrient()
        .resize({ width: KEPT_EDGE, height: KEPT_EDGE, fit: 'inside', withoutEnlargement: true })
        .flatten({ background: '#ffffff' })
        .jpeg({ quality: 82 })
        .timeout({ seconds: MOST_SECONDS })
        .toBuffer({ resolveWithObject: true });
      const thumbnail = await sharp(data)
        .resize({ width: THUMBNAIL_EDGE, height: THUMBNAIL_EDGE, fit: 'inside', withoutEnlargement: true })
        .jpeg({ quality: 72 })
        .toBuffer();
      const sha256 = createHash('sha256').update(data).digest('hex');
      return { picture: data, thumbnail, width: info.width, height: info.height, sha256 };
    } catch (error) {
      if (/pixel limit|too large|exceeds/i.test(error instanceof Error ? error.message : ''))
        throw refused(
          'photo_pixels',
          `This picture has more than ${MOST_PIXELS / 1_000_000} million pixels. Take it at a lower resolution.`,
          413,
        );
      throw refused('photo_damaged', 'This picture is damaged and cannot be read. Take it again.', 400);
    }
  });
}

/** A kept picture as a paper carries it, a JPEG again; the same picture gives the same bytes. */
export async function paperPicture(kept: Buffer): Promise<Buffer> {
  const { default: sharp } = await import('sharp');
  return inTurn(() =>
    sharp(kept)
      .resize({ width: PAPER_EDGE, height: PAPER_EDGE, fit: 'inside', withoutEnlargement: true })
      .jpeg({ quality: 80 })
      .timeout({ seconds: MOST_SECONDS })
      .toBuffer(),
  );
}
