/** What stands in a PDF, by a reader that had no part in writing it. */
import { inflateSync } from 'node:zlib';
import { getDocument } from 'pdfjs-dist/legacy/build/pdf.mjs';

export interface ReadPage {
  /** Points. */
  width: number;
  height: number;
  /** Every piece of text in the order in which it was drawn, one a line. */
  text: string;
  pieces: { text: string; x: number; y: number; height: number }[];
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
