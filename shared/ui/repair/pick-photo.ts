/** A picture that was taken or chosen. */
export interface PickedPhoto {
  name: string;
  bytes: number;
  file: Blob;
  /** Tells two of them apart. */
  mark: string;
}

/** Only a browser has a picker for files; its file stands beside this one. */
export const canPickPhoto = false;

export const pickPhoto = (_from: 'camera' | 'files'): Promise<PickedPhoto | null> => Promise.resolve(null);
