/** Reads a QR code out of a picture. Import it late: the decoder is 45 KiB. */
import jsQR from 'jsqr';

/** A picture as a canvas gives it. */
export interface Frame {
  /** Red, green, blue, opacity of each point. */
  data: Uint8ClampedArray;
  width: number;
  height: number;
}

// Labels are black on white: looking for white on black too would take twice as long.
const found = ({ data, width, height }: Frame): string | null =>
  jsQR(data, width, height, { inversionAttempts: 'dontInvert' })?.data.trim() || null;

/** What the code in a picture says; null: none was found in it. */
export const readCode = (frame: Frame): string | null => found(frame) ?? found(softened(frame));

/** Each point as the mean of the nine around it, in grey: the noise of a dim light goes, the modules of a code stay. */
function softened({ data, width, height }: Frame): Frame {
  const grey = new Float32Array(width * height);
  for (let at = 0; at < grey.length; at += 1) grey[at] = (data[4 * at]! + data[4 * at + 1]! + data[4 * at + 2]!) / 3;
  const rows = new Float32Array(grey.length);
  for (let y = 0; y < height; y += 1)
    for (let x = 0; x < width; x += 1) {
      const at = y * width + x;
      rows[at] = grey[at]! + grey[x > 0 ? at - 1 : at]! + grey[x < width - 1 ? at + 1 : at]!;
    }
  const soft = new Uint8ClampedArray(data.length);
  for (let y = 0; y < height; y += 1)
    for (let x = 0; x < width; x += 1) {
      const at = y * width + x;
      const mean = (rows[at]! + rows[y > 0 ? at - width : at]! + rows[y < height - 1 ? at + width : at]!) / 9;
      soft.fill(mean, 4 * at, 4 * at + 3);
      soft[4 * at + 3] = 255;
    }
  return { data: soft, width, height };
}
