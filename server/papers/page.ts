/** A PDF to draw on: our faces, and nothing in it that differs from one drawing to the next. */
import PDFDocument from 'pdfkit';
import { faces, fontFiles, type Face } from './fonts';

/** A paper as it is sent. */
export interface Paper {
  name: string;
  bytes: Buffer;
}

export type Pdf = InstanceType<typeof PDFDocument>;

/** PostScript points to a millimetre. */
export const MM = 72 / 25.4;

/**
 * A new PDF without any page.
 * @param at when what stands in it came about, epoch ms: its date, out of which its id is made too
 */
export function newPdf(title: string, at: number): Pdf {
  const pdf = new PDFDocument({
    autoFirstPage: false,
    bufferPages: true,
    margin: 0,
    lang: 'en',
    displayTitle: true,
    info: { Title: title, Producer: 'Bidewell', Creator: 'Bidewell', CreationDate: new Date(at) },
  });
  const files = fontFiles();
  for (const face of faces) pdf.registerFont(face, files[face]);
  return pdf;
}

/** Ends a PDF and gives its bytes. */
export function bytesOf(pdf: Pdf): Promise<Buffer> {
  return new Promise((resolve, reject) => {
    const parts: Buffer[] = [];
    pdf.on('data', (part: Buffer) => parts.push(part));
    pdf.on('end', () => resolve(Buffer.concat(parts)));
    pdf.on('error', reject);
    pdf.end();
  });
}

export interface TextStyle {
  face: Face;
  /** Points. */
  size: number;
  align?: 'left' | 'right';
  /** Digits of one width, so that columns stand. */
  tabular?: boolean;
}

const featuresOf = ({ tabular }: TextStyle) => (tabular ? { features: ['tnum' as const] } : {});

export const widthOf = (pdf: Pdf, text: string, style: TextStyle): number =>
  pdf.font(style.face).fontSize(style.size).widthOfString(text, featuresOf(style));

/** One line with its baseline at `y`; at the right its end stands at `x`. */
export function put(pdf: Pdf, text: string, x: number, y: number, style: TextStyle): void {
  const left = style.align === 'right' ? x - widthOf(pdf, text, style) : x;
  pdf
    .font(style.face)
    .fontSize(style.size)
    .text(text, left, y, { lineBreak: false, baseline: 'alphabetic', ...featuresOf(style) });
}

/** A text in lines that fit a width; a word that is wider than a line is broken. Never none. */
export function linesOf(pdf: Pdf, text: string, width: number, style: TextStyle): string[] {
  const lines: string[] = [];
  const fits = (line: string) => widthOf(pdf, line, style) <= width;
  for (const paragraph of text.split(/\r?\n/)) {
    let line = '';
    // Only at plain spaces and tabs: a number keeps its unit.
    for (const word of paragraph.split(/[ \t]+/).filter(Boolean)) {
      const longer = line === '' ? word : `${line} ${word}`;
      if (fits(longer)) {
        line = longer;
        continue;
      }
      if (line !== '') lines.push(line);
      line = '';
      for (const letter of word) {
        if (line !== '' && !fits(line + letter)) {
          lines.push(line);
          line = '';
        }
        line += letter;
      }
    }
    lines.push(line);
  }
  return lines;
}

/** The brand mark: two vessels, one at the notch and one below it; `size` is its side in the units of the page. */
export function drawMark(pdf: Pdf, x: number, y: number, size: number): void {
  pdf
    .save()
    .translate(x, y)
    .scale(size / 48);
  pdf.lineWidth(3.5).strokeColor('black').path('M8 4v40h13V4M27 4v40h13V4').stroke();
  pdf.fillColor('black').path('M9.5 20h10v22.5h-10zM28.5 27h10v15.5h-10z').fill();
  pdf.lineWidth(3.6).path('M2 18.2h44').stroke();
  pdf.restore();
}
