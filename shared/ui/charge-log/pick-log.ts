/** A file that was chosen; it stays where it is and is sent from there. */
export interface PickedLog {
  name: string;
  file: Blob;
}

/** Only a browser has a picker for files. Its file stands beside this one. */
export const canPickLog = false;

export const pickLog = (): Promise<PickedLog | null> => Promise.resolve(null);

/** Hears of a file that is dropped onto the page; gives the way to stop hearing. */
export const onLogDropped =
  (_heard: (picked: PickedLog) => void): (() => void) =>
  () =>
    undefined;
