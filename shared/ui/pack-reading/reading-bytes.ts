/** A file that somebody chose, as text, or the sentence why it is no table. Pure. */

export const MOST_BYTES = 2 * 1024 * 1024;
export const MOST_LINES = 100_000;

export type ReadText = { ok: true; text: string } | { ok: false; sentence: string };

const no = (sentence: string): ReadText => ({ ok: false, sentence });
const noText = (name: string): ReadText =>
  no(`${name} is no plain text. Save the table as CSV, then choose that file.`);

/** Which of the two bytes of a character is the empty one, where the file does not say it itself. */
function utf16Of(bytes: Uint8Array): 'utf-16le' | 'utf-16be' | null {
  if (bytes[0] === 0xff && bytes[1] === 0xfe) return 'utf-16le';
  if (bytes[0] === 0xfe && bytes[1] === 0xff) return 'utf-16be';
  const head = bytes.subarray(0, 200);
  const empty = [0, 0];
  head.forEach((byte, at) => {
    if (byte === 0) empty[at % 2]! += 1;
  });
  const half = head.length / 2;
  if (half < 2) return null;
  if (empty[1]! > half * 0.9 && empty[0] === 0) return 'utf-16le';
  return empty[0]! > half * 0.9 && empty[1] === 0 ? 'utf-16be' : null;
}

function decoded(bytes: Uint8Array): string {
  const wide = utf16Of(bytes);
  if (wide) return new TextDecoder(wide).decode(bytes);
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    // Spreadsheets of the older kind write one byte a sign; only the degree sign and accents differ.
    return new TextDecoder('windows-1252').decode(bytes);
  }
}

/** Signs that no table holds; a picture, an archive and a spreadsheet's own file are full of them. */
const binary = /[\u0000-\u0008\u000e-\u001f]/;

/** Lines of a text, an end of line at the end not counted as one more. */
export const lineCount = (text: string): number => {
  const ends = text.match(/\r\n|\n|\r/g)?.length ?? 0;
  return /[\r\n]$/.test(text) ? ends : ends + 1;
};

/** Refuses what is no table or too much of one; gives the text without its byte order mark. */
export function checkedText(name: string, raw: string): ReadText {
  const text = raw.replace(/^\ufeff/, '');
  if (text.trim() === '') return no(`${name} is empty. Choose another file, or type the groups.`);
  if (binary.test(text) || text.startsWith('%PDF') || text.startsWith('PK\u0003')) return noText(name);
  if (text.length > MOST_BYTES) return no(`${name} is over 2 MB. Keep the lines of one reading and choose it again.`);
  const lines = lineCount(text);
  if (lines > MOST_LINES)
    return no(`${name} has ${lines} lines, over 100 000. Keep the lines of one reading and choose it again.`);
  return { ok: true, text };
}

/** Text of a file's bytes: UTF-8, UTF-16 with or without its mark, else the one-byte code of older spreadsheets. */
export function textOfBytes(name: string, bytes: Uint8Array): ReadText {
  if (bytes.length === 0) return no(`${name} is empty. Choose another file, or type the groups.`);
  if (bytes.length > MOST_BYTES) return no(`${name} is over 2 MB. Keep the lines of one reading and choose it again.`);
  return checkedText(name, decoded(bytes));
}
