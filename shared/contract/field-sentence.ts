/** Said at a field where nothing was chosen or typed and the schema has no words of its own. */
export const nothingGiven = 'Choose or type this.';

/**
 * The sentence shown at a wrong field. Where nothing was chosen the schema says no more than 'Invalid input'.
 * @param missing the field's own words for that
 */
export const fieldSentence = (message: string | undefined, missing: string = nothingGiven): string =>
  !message || /^Invalid (input|option)/.test(message) ? missing : message;
