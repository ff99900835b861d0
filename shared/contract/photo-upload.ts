/** How a picture is sent. */

/** Most bytes of an uploaded picture: what the largest phone cameras make of one. */
export const MOST_PHOTO_BYTES = 16 * 1024 * 1024;

/** Name of the one part of the upload. */
export const photoField = 'photo';
