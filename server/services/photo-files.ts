/** The files of photos. Their names are random and made here: nothing a client sends ever becomes part of a path. */
import { randomBytes } from 'node:crypto';
import fs from 'node:fs/promises';
import path from 'node:path';
import type { Config } from '../config';
import { photoFolder } from '../data-files';
import type { TakenPhoto } from './photo-image';

type Kept = Pick<Config, 'dataDir'>;
export type PhotoPart = 'picture' | 'thumbnail';

const endings: Record<PhotoPart, string> = { picture: '.jpg', thumbnail: '.thumb.jpg' };
const pathOf = ({ dataDir }: Kept, file: string, part: PhotoPart): string =>
  path.join(photoFolder(dataDir), `${file}${endings[part]}`);

/** The name that a row gives a photo of which this is a file; null: it is the file of none. */
export const photoFileOf = (name: string): string | null => /^([0-9a-f]{32})(?:\.thumb)?\.jpg$/.exec(name)?.[1] ?? null;

/** Writes through to the disk: the row that names the file must not outlive it. */
async function write(to: string, bytes: Buffer): Promise<void> {
  const handle = await fs.open(to, 'wx', 0o600);
  try {
    await handle.writeFile(bytes);
    await handle.sync();
  } finally {
    await handle.close();
  }
}

/** Keeps a picture and its thumbnail, both or none. @returns their name */
export async function keepPhoto(config: Kept, photo: Pick<TakenPhoto, PhotoPart>): Promise<string> {
  await fs.mkdir(photoFolder(config.dataDir), { recursive: true, mode: 0o700 });
  const file = randomBytes(16).toString('hex');
  try {
    await write(pathOf(config, file, 'picture'), photo.picture);
    await write(pathOf(config, file, 'thumbnail'), photo.thumbnail);
  } catch (error) {
    await dropPhoto(config, file);
    throw error;
  }
  return file;
}

/** Removes both; one that is gone already is no error. */
export async function dropPhoto(config: Kept, file: string): Promise<void> {
  for (const part of ['picture', 'thumbnail'] as const) await fs.rm(pathOf(config, file, part), { force: true });
}

/** Null: the file is gone. */
export async function readPhoto(config: Kept, file: string, part: PhotoPart): Promise<Buffer | null> {
  try {
    return await fs.readFile(pathOf(config, file, part));
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'ENOENT') return null;
    throw error;
  }
}
