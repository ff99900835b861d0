/** What stands in a PDF, by a reader that had no part in writing it. */
import { inflateSync } from 'node:zlib';
import { getDocument, OPS } from 'pdfjs-dist/legacy/build/pdf.mjs';
import type { PDFPageProxy } from 'pdfjs-dist';

export interface ReadPage {
  /** Points. */
  width: number;
  height: number;
  /** Every piece of text in the order in which it was drawn, one a line. */
  text: string;
  pieces: { text: string; x: number; y: number; height: number }[];
  /** Every picture, points from the top left of the page. */
  images: Box[];
}

/** The pages of a PDF. @throws where the bytes are none */
export async function readPdf(bytes: Buffer): Promise<ReadPage[]> {
  const file = await getDocument({ data: new Uint8Array(bytes), verbosity: 0 }).promise;
  const pages: ReadPage[] = [];
  for (let number = 1; number <= file.numPages; number += 1) {
    const page = await file.getPage(number);
    const [, , width = 0, height = 0] = page.view;
    const pieces = (await page.getTextContent()).items.flatMap((item) =>
      'str' in item && item.str !== ''
        ? [
            {
              text: item.str,
              x: item.transform[4] as number,
              y: height - (item.transform[5] as number),
              height: item.height,
            },
          ]
        : [],
    );
    pages.push({
      width,
      height,
      images: await imagesOf(page, height),
      pieces,
      text: pieces
        .map(({ text }) => text)
        .join('\n')
        .replace(/\u00a0/g, ' '),
    });
  }
  await file.destroy();
  return pages;
}

type Matrix = [number, number, number, number, number, number];
const times = ([a, b, c, d, e, f]: Matrix, [A, B, C, D, E, F]: Matrix): Matrix => [
  a * A + c * B,
  b * A + d * B,
  a * C + c * D,
  b * C + d * D,
  a * E + c * F + e,
  b * E + d * F + f,
];

/** Where the page's operators paint pictures: each fills the unit square of the matrix that stands then. */
async function imagesOf(page: PDFPageProxy, height: number): Promise<Box[]> {
  const { fnArray, argsArray } = await page.getOperatorList();
  const found: Box[] = [];
  const saved: Matrix[] = [];
  let matrix: Matrix = [1, 0, 0, 1, 0, 0];
  fnArray.forEach((operator, place) => {
    if (operator === OPS.save) saved.push(matrix);
    else if (operator === OPS.restore) matrix = saved.pop() ?? matrix;
    else if (operator === OPS.transform) matrix = times(matrix, argsArray[place] as Matrix);
    else if (operator === OPS.paintImageXObject) {
      const [a, b, c, d, e, f] = matrix;
      const [xs, ys] = [
        [e, e + a, e + c, e + a + c],
        [f, f + b, f + d, f + b + d],
      ];
      const [left, top] = [Math.min(...xs), Math.max(...ys)];
      found.push({ x: left, y: height - top, width: Math.max(...xs) - left, height: top - Math.min(...ys) });
    }
  });
  return found;
}

export interface Box {
  x: number;
  y: number;
  width: number;
  height: number;
}

/** Every box that the pages' own operators name, in points from the top left of the page. */
export function drawnBoxes(bytes: Buffer): Box[] {
  const file = bytes.toString('latin1');
  return [...file.matchAll(/stream\r?\n([\s\S]*?)\nendstream/g)].flatMap(([, stream = '']) => {
    let content: string;
    try {
      content = inflateSync(Buffer.from(stream, 'latin1')).toString('latin1');
    } catch {
      return [];
    }
    return [...content.matchAll(/(-?[\d.]+) (-?[\d.]+) (-?[\d.]+) (-?[\d.]+) re\b/g)].map(([, ...numbers]) => {
      const [x = 0, y = 0, width = 0, height = 0] = numbers.map(Number);
      return { x, y, width, height };
    });
  });
}
