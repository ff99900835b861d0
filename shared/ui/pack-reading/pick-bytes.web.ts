import type { PickedBytes } from './pick-bytes';

export const canPickBytes = true;

/**
 * Opens the browser's picker and reads what was chosen; null where none was. Of a file over the most only one byte more
 * than that is read: enough to say that it is too large.
 *
 * @param accept what the picker offers: '.csv,text/csv'
 */
export const pickBytes = (accept: string, mostBytes: number): Promise<PickedBytes | null> =>
  new Promise((resolve, reject) => {
    const input = document.createElement('input');
    input.type = 'file';
    input.accept = accept;
    input.addEventListener('cancel', () => resolve(null));
    input.addEventListener('change', () => {
      const file = input.files?.[0];
      if (!file) return resolve(null);
      const reader = new FileReader();
      reader.addEventListener('error', () => reject(reader.error ?? new Error('not read')));
      reader.addEventListener('load', () =>
        resolve({ name: file.name, bytes: new Uint8Array(reader.result as ArrayBuffer) }),
      );
      reader.readAsArrayBuffer(file.slice(0, mostBytes + 1));
    });
    input.click();
  });
