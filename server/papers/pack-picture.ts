import type { PackPicture } from './hand-over-content';
import { put, widthOf, type Pdf, type TextStyle } from './page';
import type { PaperWords } from './paper-words';

/** One scale for both pictures of a sheet, V. */
export interface PictureScale {
  foot: number;
  top: number;
  lines: number[];
}

const steps = [0.005, 0.01, 0.02, 0.05, 0.1, 0.2, 0.5, 1, 2];

/** The scale that holds all these volts, with a broken foot under the lowest and at most four lines. */
export function pictureScale(volts: readonly number[]): PictureScale {
  const low = Math.min(...volts);
  const high = Math.max(...volts);
  const span = Math.max(high - low, 0.02);
  const foot = Math.max(0, Math.floor((low - span * 0.25) * 100) / 100);
  const top = high + span * 0.1;
  const step = steps.find((one) => (top - foot) / one <= 4.5) ?? 5;
  const lines: number[] = [];
  for (let n = Math.ceil(foot / step + 0.2); n * step <= top; n += 1) lines.push(n * step);
  return { foot, top, lines };
}

export const pictureHeight = 70;
const axisWidth = 33;
const small: TextStyle = { face: 'text-400', size: 9 };
const grey = '#777777';

/** Places of the names under the bars: the first, the last and three between; of few groups every one. */
const named = (count: number): number[] =>
  count <= 5
    ? Array.from({ length: count }, (_, group) => group)
    : [0, 1, 2, 3, 4].map((part) => Math.max(0, Math.round((part * count) / 4) - 1));

function hatch(pdf: Pdf, x: number, y: number, width: number, height: number): void {
  pdf.save();
  pdf.rect(x, y, width, height).clip();
  pdf.lineWidth(0.9).strokeColor('black');
  for (let at = x - height; at < x + width; at += 2.4)
    pdf
      .moveTo(at, y + height)
      .lineTo(at + height, y)
      .stroke();
  pdf.restore();
  pdf.lineWidth(0.6).strokeColor('black').rect(x, y, width, height).stroke();
}

/**
 * A bar for each group from a broken foot, odd ones hatched, with the call-out of the worst module above.
 * @param y top of the bars' box; the call-out stands 11 pt above it, the names 11 pt under it
 */
export function drawPackPicture(
  pdf: Pdf,
  picture: PackPicture,
  box: { x: number; y: number; width: number },
  scale: PictureScale,
  words: PaperWords,
): void {
  const { groupVolts, odd, call } = picture;
  const count = groupVolts.length;
  const foot = box.y + pictureHeight;
  const left = box.x + axisWidth;
  const pitch = (box.width - axisWidth) / count;
  const gap = pitch > 3 ? 1 : pitch * 0.25;
  const at = (volts: number) => foot - ((volts - scale.foot) / (scale.top - scale.foot)) * pictureHeight;
  for (const line of scale.lines) {
    pdf
      .lineWidth(0.4)
      .strokeColor('#999999')
      .moveTo(left - 3, at(line))
      .lineTo(box.x + box.width, at(line))
      .stroke();
    pdf.fillColor('black');
    put(pdf, words.voltsNumber(line).replace(/0$/, ''), left - 7, at(line) + 3, { ...small, align: 'right' });
  }
  const wrong = new Set(odd);
  groupVolts.forEach((volts, group) => {
    const bar = { x: left + group * pitch, y: at(volts), width: pitch - gap, height: foot - at(volts) };
    if (!wrong.has(group)) pdf.fillColor(grey).rect(bar.x, bar.y, bar.width, bar.height).fill();
    // A bar too narrow to be hatched is told from the grey ones by being black.
    else if (bar.width < 2.5) pdf.fillColor('black').rect(bar.x, bar.y, bar.width, bar.height).fill();
    else hatch(pdf, bar.x, bar.y, bar.width, bar.height);
  });
  if (scale.foot > 0)
    pdf
      .lineWidth(2.6)
      .strokeColor('white')
      .moveTo(left - 1, foot - 6.5)
      .lineTo(box.x + box.width + 1, foot - 6.5)
      .stroke();
  pdf.fillColor('black');
  named(count).forEach((group) => {
    const text = `G${group + 1}`;
    const middle = left + (group + 0.5) * pitch;
    const width = widthOf(pdf, text, small);
    // Under its bar, but never out of the picture.
    const x = Math.min(Math.max(left, middle - width / 2), box.x + box.width - width);
    put(pdf, text, x, foot + 11, small);
  });
  if (call)
    drawCall(pdf, call, { left, right: box.x + box.width, top: box.y, pitch, gap }, (group) =>
      at(groupVolts[group] ?? scale.top),
    );
}

/** A line from the bars up and aside, to whichever side has room for the words. */
function drawCall(
  pdf: Pdf,
  call: NonNullable<PackPicture['call']>,
  { left, right, top, pitch, gap }: { left: number; right: number; top: number; pitch: number; gap: number },
  topOf: (group: number) => number,
): void {
  const style: TextStyle = { face: 'text-600', size: 9 };
  const first = Math.min(...call.groups);
  const last = Math.max(...call.groups);
  const x = left + ((first + last + 1) / 2) * pitch - gap / 2;
  const y = top - 8;
  const width = widthOf(pdf, call.text, style);
  const toRight = x + 20 + width <= right;
  const end = toRight ? x + 16 : x - 16;
  const down = Math.max(y + 4, Math.min(...call.groups.map(topOf)) - 3);
  pdf.lineWidth(0.9).strokeColor('black').moveTo(x, down).lineTo(x, y).lineTo(end, y).stroke();
  put(pdf, call.text, toRight ? end + 4 : end - 4, y + 3, { ...style, align: toRight ? 'left' : 'right' });
}
