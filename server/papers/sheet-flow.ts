/** Pages that text flows over: head and foot on each, and what does not fit any more begins the next. */
import { drawMark, linesOf, MM, newPdf, put, type Pdf, type TextStyle } from './page';

export const body: TextStyle = { face: 'text-400', size: 10.5 };
export const strong: TextStyle = { face: 'text-600', size: 10.5 };
export const small: TextStyle = { face: 'text-400', size: 9 };
export const heading: TextStyle = { face: 'text-600', size: 11.25 };
export const columnHead: TextStyle = { face: 'text-600', size: 9.75 };
export const number: TextStyle = { face: 'num-600', size: 12, tabular: true };
export const LINE = 15;

const margin = 18 * MM;
const headHeight = 40;
const footHeight = 18;

export interface SheetHead {
  title: string;
  workshop: string;
  date: string;
  at: number;
  foot: string;
}

export interface Sheet {
  pdf: Pdf;
  left: number;
  right: number;
  width: number;
  /** Where the next thing stands. */
  y: number;
  /** Nothing stands under it. */
  bottom: number;
  addPage: () => void;
  /** Begins the next page where so much does not fit on this one; true where it did. */
  ensure: (height: number) => boolean;
  /** Lines of text from `x` on, over pages where they must. */
  paragraph: (text: string, style?: TextStyle, line?: number) => void;
  rule: (y: number, weight?: number, from?: number, to?: number) => void;
  /** Draws head and foot of every page, now that they are counted. */
  finish: () => void;
}

/** A sheet with its first page begun. */
export function beginSheet(head: SheetHead, paper: 'a4' | 'letter'): Sheet {
  const pdf = newPdf(head.title, head.at);
  const [width, height] = paper === 'a4' ? [210 * MM, 297 * MM] : [8.5 * 72, 11 * 72];
  const [left, right, bottom] = [margin, width - margin, height - margin - footHeight];
  const sheet: Sheet = {
    ...{ pdf, left, right, width: right - left, y: 0, bottom },
    addPage() {
      pdf.addPage({ size: [width, height], margin: 0 });
      sheet.y = margin + headHeight + 10;
    },
    ensure(needed) {
      if (sheet.y + needed <= bottom) return false;
      sheet.addPage();
      return true;
    },
    paragraph(text, style = body, line = LINE) {
      for (const one of linesOf(pdf, text, right - left, style)) {
        sheet.ensure(line);
        put(pdf, one, left, sheet.y + line * 0.75, style);
        sheet.y += line;
      }
    },
    rule(y, weight = 0.75, from = left, to = right) {
      pdf
        .lineWidth(weight)
        .strokeColor(weight < 0.7 ? '#999999' : 'black')
        .moveTo(from, y)
        .lineTo(to, y)
        .stroke();
    },
    finish() {
      const { start, count } = pdf.bufferedPageRange();
      for (let page = 0; page < count; page += 1) {
        pdf.switchToPage(start + page);
        drawMark(pdf, left, margin, 30);
        pdf.fillColor('black');
        const [title = ''] = linesOf(pdf, head.title, right - left - 41 - 110, { face: 'num-600', size: 19.5 });
        put(pdf, title, left + 41, margin + 15, { face: 'num-600', size: 19.5 });
        put(pdf, head.workshop, left + 41, margin + 30, body);
        put(pdf, head.date, right, margin + 15, { ...body, align: 'right' });
        put(pdf, `page ${page + 1} of ${count}`, right, margin + 30, { ...body, align: 'right' });
        sheet.rule(margin + headHeight - 1, 1.5);
        sheet.rule(height - margin - 13);
        put(pdf, head.foot, left, height - margin - 2, small);
      }
    },
  };
  sheet.addPage();
  return sheet;
}
