import type { PickedPhoto } from './pick-photo';

export const canPickPhoto = true;

/** Formats the server can read: a phone that keeps its own sends one of these in its place. */
const accepted = 'image/jpeg,image/png,image/webp';

/**
 * Opens the camera, where the device has one for pages, or the browser's picker; null where nothing was taken. The file is
 * not read here: it goes out as it is.
 */
export const pickPhoto = (from: 'camera' | 'files'): Promise<PickedPhoto | null> =>
  new Promise((resolve) => {
    const input = document.createElement('input');
    input.type = 'file';
    input.accept = from === 'camera' ? 'image/*' : accepted;
    if (from === 'camera') input.setAttribute('capture', 'environment');
    input.addEventListener('cancel', () => resolve(null));
    input.addEventListener('change', () => {
      const file = input.files?.[0];
      if (!file) return resolve(null);
      const { name, size, lastModified } = file;
      resolve({ name, bytes: size, file, mark: `${name}.${size}.${lastModified}` });
    });
    input.click();
  });
