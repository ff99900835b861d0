import type { PaperPhoto } from './hand-over-content';
import { linesOf, put } from './page';
import { heading, small, strong, type Sheet } from './sheet-flow';

const COLUMNS = 2;
const GAP = 21;
/** Most height of a picture, pt: with it and two lines under it three rows stand on a page. */
const MOST_HEIGHT = 150;
const TITLE = 15;
const NOTE_LINE = 12;
const BELOW = 14;

/** The photos on pages of their own, two beside each other, each with what it shows and what was noted under it. */
export function drawPhotos(sheet: Sheet, photos: readonly PaperPhoto[]): void {
  if (photos.length === 0) return;
  sheet.addPage();
  put(sheet.pdf, 'Photos', sheet.left, sheet.y + 13, heading);
  sheet.y += 24;
  const width = (sheet.width - GAP * (COLUMNS - 1)) / COLUMNS;
  for (let from = 0; from < photos.length; from += COLUMNS) {
    const row = photos.slice(from, from + COLUMNS).map((photo) => measured(sheet, photo, width));
    const picture = Math.max(...row.map(({ height }) => height));
    const notes = Math.max(...row.map(({ notes: lines }) => lines.length));
    const height = picture + TITLE + notes * NOTE_LINE + 4;
    sheet.ensure(height);
    row.forEach((one, column) => one.draw(sheet.left + column * (width + GAP), sheet.y, picture));
    sheet.y += height + BELOW;
  }
}

function measured({ pdf }: Sheet, photo: PaperPhoto, width: number) {
  const { title, note, picture } = photo;
  const notes = linesOf(pdf, note, width, small);
  const scale = Math.min(width / photo.width, MOST_HEIGHT / photo.height);
  const [wide, height] = picture === null ? [width, 40] : [photo.width * scale, photo.height * scale];
  return {
    notes,
    height,
    /** @param room height that the pictures of a row share: they stand on one line */
    draw(x: number, y: number, room: number): void {
      const top = y + room - height;
      if (picture === null) put(pdf, 'The file of this photo is gone.', x + 8, top + 24, small);
      else pdf.image(picture, x, top, { width: wide, height });
      pdf.lineWidth(0.5).strokeColor('#999999').rect(x, top, wide, height).stroke();
      put(pdf, linesOf(pdf, title, width, strong)[0] ?? '', x, y + room + 12, strong);
      notes.forEach((line, place) => put(pdf, line, x, y + room + TITLE + (place + 1) * NOTE_LINE - 2, small));
    },
  };
}
