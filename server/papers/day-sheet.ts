/** The day sheet: who does what when, then the charges of each channel. For the wall of a workshop without screens. */
import { standingLine } from '@/shared/contract/standing-line';
import type { ChannelCharge, DayChannel, DayPerson, DaySheetContent } from './day-sheet-content';
import { bytesOf, linesOf, put } from './page';
import { beginSheet, body, columnHead, heading, LINE, small, strong, type Sheet } from './sheet-flow';

/** Draws the sheet. The same content gives the same bytes. */
export function drawDaySheet(content: DaySheetContent, paper: 'a4' | 'letter'): Promise<Buffer> {
  const { title, workshop, date, at } = content;
  const sheet = beginSheet({ title, workshop, date, at, foot: standingLine }, paper);
  sheet.paragraph(content.stand, small, 12);
  for (const person of content.people) drawPerson(sheet, person);
  drawChannels(sheet, content.channels);
  drawCautions(sheet, content.cautions);
  sheet.finish();
  return bytesOf(sheet.pdf);
}

const WHEN = 78;
const WHERE = 92;

function drawPerson(sheet: Sheet, person: DayPerson): void {
  const { pdf, left, right } = sheet;
  const what = left + WHEN;
  const where = right - WHERE;
  const head = (more: string) => {
    put(pdf, `${person.name}${more}`, left, sheet.y + 11, heading);
    put(pdf, person.hours, right, sheet.y + 11, { ...small, align: 'right' });
    sheet.y += 17;
  };
  sheet.ensure(8 + 17 + 2 * LINE);
  sheet.y += 8;
  head('');
  if (person.rows.length === 0) {
    sheet.rule(sheet.y, 0.5);
    put(pdf, 'Nothing is planned.', what, sheet.y + 13, body);
    sheet.y += LINE + 4;
  }
  for (const row of person.rows) {
    const lines = linesOf(pdf, row.what, where - what - 8, body);
    const places = linesOf(pdf, row.where, WHERE, body);
    const height = Math.max(lines.length, places.length) * LINE + 3;
    if (sheet.ensure(height)) head(', continued');
    sheet.rule(sheet.y, 0.5);
    put(pdf, row.when, left, sheet.y + 13, { ...strong, tabular: true });
    lines.forEach((line, index) => put(pdf, line, what, sheet.y + 13 + index * LINE, body));
    places.forEach((line, index) => put(pdf, line, where, sheet.y + 13 + index * LINE, body));
    sheet.y += height;
  }
}

function drawChannels(sheet: Sheet, channels: readonly DayChannel[]): void {
  const { pdf, left, right, width } = sheet;
  const at = { title: left + 78, state: left + width * 0.3, ready: left + width * 0.47, due: left + width * 0.68 };
  const heads = () => {
    const y = sheet.y + 11;
    put(pdf, 'Channel', left, y, columnHead);
    put(pdf, 'Charge', at.title, y, columnHead);
    put(pdf, 'Current', at.state, y, columnHead);
    put(pdf, 'Ready', at.ready, y, columnHead);
    put(pdf, 'Due', at.due, y, columnHead);
    sheet.y += 15;
  };
  sheet.ensure(12 + 17 + 15 + 2 * LINE);
  sheet.y += 12;
  put(pdf, 'Charges', left, sheet.y + 11, heading);
  sheet.y += 17;
  heads();
  for (const channel of channels) {
    const charges: (ChannelCharge | null)[] = channel.charges.length > 0 ? channel.charges : [null];
    charges.forEach((charge, place) => {
      const looks = charge?.lookIns ? linesOf(pdf, `Look-ins: ${charge.lookIns}`, right - at.title, body) : [];
      const height = (1 + looks.length) * LINE + 3;
      const begun = sheet.ensure(height);
      if (begun) heads();
      sheet.rule(sheet.y, 0.5, place === 0 || begun ? left : at.title, right);
      const y = sheet.y + 13;
      if (place === 0 || begun) {
        put(pdf, channel.name, left, y, strong);
        const after = pdf.font(strong.face).fontSize(strong.size).widthOfString(`${channel.name} `);
        put(pdf, linesOf(pdf, channel.kind, 78 - after - 4, small)[0] ?? '', left + after, y, small);
      }
      put(pdf, charge?.title ?? 'Free all day', at.title, y, charge ? strong : body);
      put(pdf, charge?.state ?? '', at.state, y, body);
      put(pdf, charge?.ready ?? '', at.ready, y, body);
      put(pdf, charge?.due ?? '', at.due, y, body);
      looks.forEach((line, index) => put(pdf, line, at.title, y + (index + 1) * LINE, body));
      sheet.y += height;
    });
  }
}

function drawCautions(sheet: Sheet, cautions: readonly string[]): void {
  if (cautions.length === 0) return;
  sheet.ensure(10 + 17 + 2 * LINE);
  sheet.y += 10;
  put(sheet.pdf, 'Cautions', sheet.left, sheet.y + 11, heading);
  sheet.y += 17;
  for (const caution of cautions) sheet.paragraph(caution);
}
