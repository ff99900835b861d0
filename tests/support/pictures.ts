/** Pictures made in the test, and what a JPEG carries beside its picture, read without the library that writes it. */
import sharp, { type Sharp } from 'sharp';

/** A picture whose left half is red and whose right half is blue, so that it is seen which way up it is. */
export const twoHalves = (width = 400, height = 200): Sharp =>
  sharp({ create: { width, height, channels: 3, background: '#0000ff' } }).composite([
    {
      input: { create: { width: width / 2, height, channels: 3, background: '#ff0000' } },
      left: 0,
      top: 0,
    },
  ]);

/** A photo as a phone makes it: lying on its side, with the place it was taken at. */
export const placedPhoto = (): Promise<Buffer> =>
  twoHalves()
    .withExif({
      IFD0: { Make: 'Invented', Copyright: 'Quay Bakery' },
      IFD3: { GPSLatitudeRef: 'N', GPSLatitude: '54/1 19/1 30/1', GPSLongitudeRef: 'E', GPSLongitude: '10/1 8/1 0/1' },
    })
    .withXmp('<x:xmpmeta xmlns:x="adobe:ns:meta/"><note>harbour lane 3</note></x:xmpmeta>')
    .withMetadata({ orientation: 6 })
    .jpeg({ quality: 90 })
    .toBuffer();

/** The markers of a JPEG up to its picture: 'e1' is EXIF or XMP, 'e2' a colour profile, 'ed' IPTC, 'fe' a comment. */
export function jpegMarkers(bytes: Buffer): string[] {
  const markers: string[] = [];
  let at = 2;
  while (bytes[at] === 0xff && bytes[at + 1] !== 0xda) {
    markers.push(bytes[at + 1]!.toString(16));
    at += 2 + bytes.readUInt16BE(at + 2);
  }
  return markers;
}
