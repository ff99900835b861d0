import { TextDecoder } from 'node:util';
import { MOST_LOG_BYTES, MOST_LOG_LINES } from '@/shared/contract/charge-log-words';
import { DomainError, invalid } from '../../errors/domain-error';

/** No line of a log is as long, in characters. */
const MOST_IN_LINE = 4_000;

export const tooLargeLog = (): DomainError =>
  new DomainError(
    413,
    'too_large',
    `This file is larger than ${MOST_LOG_BYTES / 1024 / 1024} MB. Leave columns out of it, or send it in parts.`,
  );

/**
 * The lines of a file in the batches in which it comes, whatever ends them; never more than a batch and a line are held.
 * UTF-8 with or without its mark, or UTF-16 with one. A line break within quotes ends the line: in a log a line is a reading.
 * @throws DomainError 413 beyond 64 MB, 400 beyond a million lines or 4,000 characters in one
 */
export async function* logLines(source: AsyncIterable<Uint8Array>): AsyncGenerator<string[]> {
  let bytes = 0;
  let lines = 0;
  let rest = '';
  let head: Uint8Array = new Uint8Array();
  let decoder: TextDecoder | null = null;
  const counted = (batch: string[]): string[] => {
    for (const [at, line] of batch.entries())
      if (line.length > MOST_IN_LINE)
        throw invalid({
          file: `Line ${lines + at + 1} is longer than ${MOST_IN_LINE} characters. This is no log of readings: choose another file.`,
        });
    lines += batch.length;
    if (lines > MOST_LOG_LINES) throw invalid({ file: 'More than 1,000,000 lines. Send the log in parts.' });
    return batch;
  };
  const split = (text: string): string[] => {
    rest += text;
    // A carriage return at the very end may be half of a line end.
    const held = rest.endsWith('\r') ? '\r' : '';
    const parts = (held ? rest.slice(0, -1) : rest).split(/\r\n|\n|\r/);
    rest = parts.pop()! + held;
    return parts;
  };
  for await (const chunk of source) {
    bytes += chunk.length;
    if (bytes > MOST_LOG_BYTES) throw tooLargeLog();
    let fresh = chunk;
    if (decoder === null) {
      head = joined(head, chunk);
      if (head.length < 2) continue;
      decoder = decoderFor(head);
      fresh = head;
    }
    const batch = split(decoder.decode(fresh, { stream: true }));
    if (rest.length > MOST_IN_LINE + 1) counted([rest]);
    if (batch.length > 0) yield counted(batch);
  }
  decoder ??= decoderFor(head);
  const last = split((bytes < 2 ? decoder.decode(head) : '') + decoder.decode());
  const end = rest.replace(/\r$/, '');
  if (end !== '') last.push(end);
  if (last.length > 0) yield counted(last);
}

function joined(one: Uint8Array, other: Uint8Array): Uint8Array {
  if (one.length === 0) return other;
  const both = new Uint8Array(one.length + other.length);
  both.set(one);
  both.set(other, one.length);
  return both;
}

/** By the mark at the begin; the decoder takes it off. */
function decoderFor(head: Uint8Array): TextDecoder {
  if (head[0] === 0xff && head[1] === 0xfe) return new TextDecoder('utf-16le');
  if (head[0] === 0xfe && head[1] === 0xff) return new TextDecoder('utf-16be');
  return new TextDecoder('utf-8');
}
