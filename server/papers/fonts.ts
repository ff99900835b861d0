import fs from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

/** The faces of everything that is printed (look §12): words and numbers, each in two weights. */
export const faces = ['text-400', 'text-600', 'num-500', 'num-600'] as const;
export type Face = (typeof faces)[number];

/** The folder of the fonts: up from this file, which lies in server/papers or, bundled, in dist-server. */
function folder(): string {
  for (let at = path.dirname(fileURLToPath(import.meta.url)); ; at = path.dirname(at)) {
    const found = path.join(at, 'assets', 'paper', 'fonts');
    if (fs.existsSync(found)) return found;
    if (path.dirname(at) === at) throw new Error('The fonts of the papers are missing: assets/paper/fonts.');
  }
}

let read: Record<Face, Buffer> | null = null;

/** The font files, read once. @throws Error where the folder is missing */
export function fontFiles(): Record<Face, Buffer> {
  if (read === null) {
    const from = folder();
    const file = (face: Face) => fs.readFileSync(path.join(from, `${face}.ttf`));
    read = {
      'text-400': file('text-400'),
      'text-600': file('text-600'),
      'num-500': file('num-500'),
      'num-600': file('num-600'),
    };
  }
  return read;
}
