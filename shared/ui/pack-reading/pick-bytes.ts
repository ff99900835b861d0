/** A file that was chosen, as its bytes. */
export interface PickedBytes {
  name: string;
  bytes: Uint8Array;
}

/** Only a browser has a picker for files; elsewhere the table is pasted. Its file stands beside this one. */
export const canPickBytes = false;

export const pickBytes = (_accept: string, _mostBytes: number): Promise<PickedBytes | null> => Promise.resolve(null);
