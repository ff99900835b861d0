/** The hand-over sheet (look §12): the story on the first page, every group and the signatures on the next, then the photos. */
import { standingLine } from '@/shared/contract/standing-line';
import type { HandOverContent, NamedValue, PackPicture, ReadingRow } from './hand-over-content';
import { drawPackPicture, pictureHeight, pictureScale, type PictureScale } from './pack-picture';
import { bytesOf, linesOf, put } from './page';
import { drawPhotos } from './photo-pages';
import { beginSheet, body, columnHead, heading, LINE, number, small, strong, type Sheet } from './sheet-flow';
import { drawGroups } from './groups-table';

/** Draws the sheet. The same content gives the same bytes. */
export function drawHandOverSheet(content: HandOverContent, paper: 'a4' | 'letter'): Promise<Buffer> {
  const { title, workshop, date, at } = content;
  const sheet = beginSheet({ title, workshop, date, at, foot: standingLine }, paper);
  drawFacts(sheet, content);
  headline(sheet, 'What was found', 4);
  for (const sentence of content.found) sheet.paragraph(sentence);
  drawPictures(sheet, content);
  drawReadings(sheet, content.readings);
  drawColumns(sheet, content);
  drawCautions(sheet, content.cautions);
  sheet.addPage();
  drawGroups(sheet, content);
  drawPhotos(sheet, content.photos);
  sheet.finish();
  return bytesOf(sheet.pdf);
}

function headline(sheet: Sheet, text: string, above = 10): void {
  sheet.ensure(above + 2 * LINE + 4);
  sheet.y += above;
  put(sheet.pdf, text, sheet.left, sheet.y + 11, heading);
  sheet.y += 17;
}

/** Two columns of names and values; the left one has the room. */
function drawFacts(sheet: Sheet, { facts }: HandOverContent): void {
  const { pdf, left, right } = sheet;
  const middle = right - 165;
  const columns = [
    { rows: facts.left, x: left, value: left + 64, to: middle - 8 },
    { rows: facts.right, x: middle, value: middle + 52, to: right },
  ];
  const top = sheet.y;
  let end = top;
  for (const { rows, x, value, to } of columns) {
    let y = top;
    for (const one of rows) {
      put(pdf, one.name, x, y + 11, body);
      for (const line of linesOf(pdf, one.value, to - value, body)) {
        put(pdf, line, value, y + 11, body);
        y += LINE;
      }
      y += 3;
    }
    end = Math.max(end, y);
  }
  sheet.y = end;
}

function drawPictures(sheet: Sheet, content: HandOverContent): void {
  const pictures = [content.before, content.after].filter((one) => one !== null);
  if (pictures.length === 0) return;
  const scale = pictureScale(pictures.flatMap(({ groupVolts }) => groupVolts));
  for (const picture of pictures) drawPicture(sheet, content, picture, scale);
  const count = pictures[0]!.groupVolts.length;
  const both = pictures.length === 2 ? ', both pictures on one scale' : '';
  const cut = scale.foot > 0 ? ` The foot is cut at ${content.words.voltsNumber(scale.foot).replace(/0$/, '')} V.` : '';
  sheet.y += 2;
  sheet.paragraph(
    `Volts at rest, ${count === 1 ? 'one group' : `all ${count} groups`}${both}.${cut} Every value is in the table of all groups.`,
    small,
    12,
  );
}

function drawPicture(sheet: Sheet, { words }: HandOverContent, picture: PackPicture, scale: PictureScale): void {
  const { pdf, left, right, width } = sheet;
  const callRoom = picture.call ? 14 : 3;
  sheet.ensure(8 + 16 + callRoom + pictureHeight + 14);
  sheet.y += 8;
  put(pdf, picture.title, left, sheet.y + 11, heading);
  const spread = right - pdfWidth(sheet, picture.spread);
  put(pdf, 'spread', spread - 4, sheet.y + 11, { ...heading, align: 'right' });
  put(pdf, picture.spread, right, sheet.y + 11, { ...number, align: 'right' });
  sheet.y += 16 + callRoom;
  drawPackPicture(pdf, picture, { x: left, y: sheet.y, width }, scale, words);
  sheet.y += pictureHeight + 14;
}

const pdfWidth = ({ pdf }: Sheet, text: string): number =>
  pdf
    .font(number.face)
    .fontSize(number.size)
    .widthOfString(text, { features: ['tnum'] });

const ROW = 19;

function drawReadings(sheet: Sheet, rows: readonly ReadingRow[]): void {
  if (rows.length === 0) return;
  const { pdf, left, right, width } = sheet;
  const at = {
    when: left + width * 0.18,
    lowest: left + width * 0.565,
    highest: left + width * 0.667,
    spread: left + width * 0.76,
    ampHours: left + width * 0.86,
    by: left + width * 0.885,
  };
  const heads = () => {
    const y = sheet.y + 11;
    put(pdf, 'Reading', left, y, columnHead);
    put(pdf, 'When', at.when, y, columnHead);
    put(pdf, 'Lowest', at.lowest, y, { ...columnHead, align: 'right' });
    put(pdf, 'Highest', at.highest, y, { ...columnHead, align: 'right' });
    put(pdf, 'Spread', at.spread, y, { ...columnHead, align: 'right' });
    put(pdf, 'in Ah', at.ampHours, y, { ...columnHead, align: 'right' });
    put(pdf, 'By', at.by, y, columnHead);
    sheet.y += 15;
  };
  sheet.ensure(5 + 15 + ROW);
  sheet.y += 5;
  heads();
  for (const row of rows) {
    if (sheet.ensure(ROW)) heads();
    sheet.rule(sheet.y, 0.5);
    const y = sheet.y + 13.5;
    put(pdf, row.name, left, y, body);
    put(pdf, row.when, at.when, y, body);
    put(pdf, row.lowest, at.lowest, y, { ...number, align: 'right' });
    put(pdf, row.highest, at.highest, y, { ...number, align: 'right' });
    put(pdf, row.spread, at.spread, y, { ...number, align: 'right' });
    put(pdf, row.ampHours, at.ampHours, y, { ...number, align: 'right' });
    put(pdf, linesOf(pdf, row.by, right - at.by, body)[0] ?? '', at.by, y, body);
    sheet.y += ROW;
  }
}

/** What was changed beside what was advised, row by row. */
function drawColumns(sheet: Sheet, { changed, advised }: HandOverContent): void {
  const { pdf, left, right, width } = sheet;
  const half = (width - 21) / 2;
  const columns = [
    { title: 'What was changed', rows: changed, x: left, to: left + half, share: 0.36 },
    { title: 'Advised, and what became of it', rows: advised, x: right - half, to: right, share: 0.5 },
  ];
  sheet.ensure(8 + 17 + 2 * ROW);
  sheet.y += 8;
  for (const { title, x } of columns) put(pdf, title, x, sheet.y + 11, heading);
  sheet.y += 16;
  for (let row = 0; row < Math.max(changed.length, advised.length); row += 1) {
    const cells = columns.map(({ rows, x, to, share }) => cell(sheet, rows[row], x, to, share));
    const height = Math.max(...cells.map((one) => one.height));
    sheet.ensure(height);
    for (const one of cells) one.draw();
    sheet.y += height;
  }
}

function cell(sheet: Sheet, row: NamedValue | undefined, x: number, to: number, share: number) {
  if (!row) return { height: 0, draw: () => {} };
  const { pdf } = sheet;
  const value = x + (to - x) * share;
  const names = linesOf(pdf, row.name, value - x - 6, body);
  const values = linesOf(pdf, row.value, to - value, body);
  return {
    height: Math.max(names.length, values.length) * LINE + 4,
    draw: () => {
      sheet.rule(sheet.y, 0.5, x, to);
      names.forEach((line, index) => put(pdf, line, x, sheet.y + 13 + index * LINE, body));
      values.forEach((line, index) => put(pdf, line, value, sheet.y + 13 + index * LINE, body));
    },
  };
}

/** In a frame, and never parted by the end of a page where a page can hold them. */
function drawCautions(sheet: Sheet, cautions: readonly string[]): void {
  const { pdf, left, width } = sheet;
  const pad = 10;
  const lead = 'Cautions.';
  const lines = linesOf(pdf, `${lead} ${cautions.join(' ')}`, width - 2 * pad - 6, body);
  const height = lines.length * LINE + 12;
  sheet.ensure(height + 9);
  sheet.y += 9;
  pdf.lineWidth(1.1).strokeColor('black').rect(left, sheet.y, width, height).stroke();
  lines.forEach((line, index) => {
    const y = sheet.y + 16 + index * LINE;
    if (index > 0) return put(pdf, line, left + pad, y, body);
    put(pdf, lead, left + pad, y, strong);
    const after = pdf.font(strong.face).fontSize(strong.size).widthOfString(`${lead} `);
    return put(pdf, line.slice(lead.length + 1), left + pad + after, y, body);
  });
  sheet.y += height;
}
