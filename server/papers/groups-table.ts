import type { HandOverContent } from './hand-over-content';
import { put } from './page';
import { body, columnHead, heading, LINE, number, small, strong, type Sheet } from './sheet-flow';

const COLUMNS = 4;
const GAP = 19.5;
const ROW = { most: 18, least: 14 } as const;
const HEAD = 16;

/** All groups before and after, the sums of both readings, and the lines to sign on; over more pages where it must. */
export function drawGroups(sheet: Sheet, content: HandOverContent): void {
  const { groups, sums, footnotes } = content;
  put(sheet.pdf, 'All groups, volts at rest', sheet.left, sheet.y + 13, heading);
  sheet.y += 18;
  sheet.paragraph(content.groupsNote, small, 12);
  sheet.y += 5;
  const tail = (sums.length === 0 ? 0 : 14 + HEAD + sums.length * 19) + footnotes.length * 12 + 6 + SIGN;
  let from = 0;
  while (from < groups.length) {
    const left = groups.length - from;
    const rows = Math.ceil(left / COLUMNS);
    const room = sheet.bottom - sheet.y - HEAD;
    // All that is left on this page with what comes after it, else as much of it as a page holds.
    const wish = (room - tail) / rows;
    const row = wish >= ROW.least ? Math.min(ROW.most, wish) : ROW.least;
    const held = Math.min(rows, Math.floor(room / row));
    const part = groups.slice(from, from + held * COLUMNS);
    drawPart(sheet, part, held, row);
    from += part.length;
    if (from < groups.length) sheet.addPage();
  }
  drawSums(sheet, content);
  sheet.y += 6;
  for (const one of footnotes) sheet.paragraph(one, small, 12);
  drawSignatures(sheet, content.signatures);
}

function drawPart(sheet: Sheet, groups: HandOverContent['groups'], rows: number, row: number): void {
  const { pdf, left, width } = sheet;
  const wide = (width - GAP * (COLUMNS - 1)) / COLUMNS;
  const size = row < 16 ? { size: 10.5 } : {};
  for (let column = 0; column * rows < groups.length; column += 1) {
    const x = left + column * (wide + GAP);
    const end = x + wide;
    const after = (text: string, y: number, style: typeof number) =>
      put(pdf, text, end, y, { ...style, align: 'right' });
    const before = (text: string, y: number, style: typeof number) =>
      put(pdf, text, end - 38, y, { ...style, align: 'right' });
    put(pdf, 'Group', x, sheet.y + 10, columnHead);
    before('Before', sheet.y + 10, columnHead);
    after('After', sheet.y + 10, columnHead);
    groups.slice(column * rows, (column + 1) * rows).forEach((group, place) => {
      const top = sheet.y + HEAD + place * row;
      const y = top + row * 0.74;
      const style = { ...number, ...size, face: group.marked ? ('num-600' as const) : ('num-500' as const) };
      sheet.rule(top, 0.5, x, end);
      put(pdf, `${group.name}${group.marked ? ' *' : ''}`, x, y, {
        ...(group.marked ? strong : body),
        ...(row < 16 ? { size: 9.5 } : {}),
      });
      before(group.before, y, style);
      after(group.after, y, style);
    });
  }
  sheet.y += HEAD + Math.min(rows, groups.length) * row;
}

function drawSums(sheet: Sheet, { sums }: HandOverContent): void {
  if (sums.length === 0) return;
  const { pdf, left, width } = sheet;
  const ends = [0.5, 0.67, 0.84, 1].map((share) => left + width * share);
  sheet.ensure(14 + HEAD + sums.length * 19);
  sheet.y += 14;
  ['Median', 'Lowest', 'Highest', 'Spread'].forEach((name, place) =>
    put(pdf, name, ends[place]!, sheet.y + 10, { ...columnHead, align: 'right' }),
  );
  sheet.y += HEAD;
  for (const { name, values } of sums) {
    sheet.rule(sheet.y, 0.5);
    put(pdf, name, left, sheet.y + 13.5, body);
    values.forEach((value, place) => put(pdf, value, ends[place]!, sheet.y + 13.5, { ...number, align: 'right' }));
    sheet.y += 19;
  }
}

/** Room to write in, the line and the name under it. */
const SIGN = 36 + LINE + 6;

function drawSignatures(sheet: Sheet, [one, other]: [string, string]): void {
  const { pdf, left, right, width } = sheet;
  sheet.ensure(SIGN);
  sheet.y += 36;
  const half = (width - 30) / 2;
  sheet.rule(sheet.y, 0.75, left, left + half);
  sheet.rule(sheet.y, 0.75, right - half, right);
  put(pdf, one, left, sheet.y + 15, body);
  put(pdf, other, right - half, sheet.y + 15, body);
  sheet.y += LINE + 6;
}
