/** A text file that was chosen. */
export interface PickedText {
  name: string;
  text: string;
}

/** Only a browser has a picker for files; elsewhere the text is pasted. Its file stands beside this one. */
export const canPickFile = false;

export const pickTextFile = (_accept: string): Promise<PickedText | null> => Promise.resolve(null);
