import type { PickedText } from './pick-text-file';

export const canPickFile = true;

/**
 * Opens the browser's picker and reads what was chosen; null where none was.
 *
 * @param accept what the picker offers: '.csv,text/csv'
 */
export const pickTextFile = (accept: string): Promise<PickedText | null> =>
  new Promise((resolve, reject) => {
    const input = document.createElement('input');
    input.type = 'file';
    input.accept = accept;
    input.addEventListener('cancel', () => resolve(null));
    input.addEventListener('change', () => {
      const file = input.files?.[0];
      if (!file) return resolve(null);
      file.text().then((text) => resolve({ name: file.name, text }), reject);
    });
    input.click();
  });
