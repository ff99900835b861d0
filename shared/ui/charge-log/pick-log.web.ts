import type { PickedLog } from './pick-log';

export const canPickLog = true;

/** Under one type, whatever the browser makes of its name: the server reads it by what is in it. */
const asLog = (file: File): PickedLog => ({ name: file.name, file: file.slice(0, file.size, 'text/csv') });

/** Opens the browser's picker; null where nothing was chosen. */
export const pickLog = (): Promise<PickedLog | null> =>
  new Promise((resolve) => {
    const input = document.createElement('input');
    input.type = 'file';
    input.accept = '.csv,.tsv,.txt,.log,text/csv,text/plain,text/tab-separated-values';
    input.addEventListener('cancel', () => resolve(null));
    input.addEventListener('change', () => {
      const file = input.files?.[0];
      resolve(file ? asLog(file) : null);
    });
    input.click();
  });

/** Hears of a file that is dropped onto the page; gives the way to stop hearing. */
export function onLogDropped(heard: (picked: PickedLog) => void): () => void {
  // Without this the browser would leave the page and show the file.
  const over = (event: DragEvent) => event.preventDefault();
  const drop = (event: DragEvent) => {
    event.preventDefault();
    const file = event.dataTransfer?.files[0];
    if (file) heard(asLog(file));
  };
  document.addEventListener('dragover', over);
  document.addEventListener('drop', drop);
  return () => {
    document.removeEventListener('dragover', over);
    document.removeEventListener('drop', drop);
  };
}
