/** What stands in a PDF, by a reader that had no part in writing it. */
import { getDocument, OPS } from 'pdfjs-dist/legacy/build/pdf.mjs';

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

/** Every rectangle that was filled with the paths of a page's own operators: x, y from the top, width, height, in points. */
export async function pdfOperators(bytes: Buffer) {
  const file = await getDocument({ data: new Uint8Array(bytes), verbosity: 0 }).promise;
  const list = await (await file.getPage(1)).getOperatorList();
  await file.destroy();
  return { list, OPS };
}
