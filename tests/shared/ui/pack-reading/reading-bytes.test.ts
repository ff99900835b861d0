// Bytes are made inside the tests: the runner would write 2 MB of them into the title.
import { describe, expect, it } from 'vitest';
import { textOfBytes } from '@/shared/ui/pack-reading/reading-bytes';

const table = 'group;mV\n1;3949\n2;3951\n';
const utf16 = (text: string, order: 'le' | 'be', mark: boolean): Uint8Array => {
  const le = Buffer.from((mark ? '\ufeff' : '') + text, 'utf16le');
  return new Uint8Array(order === 'le' ? le : le.swap16());
};

describe('the bytes of a file', () => {
  it.each([
    ['UTF-8', new TextEncoder().encode(table)],
    ['UTF-8 with a mark', new TextEncoder().encode(`\ufeff${table}`)],
    ['UTF-16, little end first, with a mark', utf16(table, 'le', true)],
    ['UTF-16, big end first, with a mark', utf16(table, 'be', true)],
    ['UTF-16, little end first, without', utf16(table, 'le', false)],
    ['UTF-16, big end first, without', utf16(table, 'be', false)],
  ])('are read as %s', (_, bytes) => expect(textOfBytes('pack.csv', bytes)).toEqual({ ok: true, text: table }));

  it('are read in the one-byte code where they are no UTF-8: the degree sign is 0xB0', () => {
    expect(textOfBytes('pack.csv', Uint8Array.from([0xb0, 0x43, 0x3b, 0x31]))).toEqual({ ok: true, text: '°C;1' });
  });

  it.each([
    ['empty', () => new Uint8Array(0), /pack\.csv is empty/],
    ['of blank lines', () => new TextEncoder().encode(' \n\n'), /is empty/],
    [
      'a picture',
      () => Uint8Array.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a, 0, 0, 0, 13]),
      /no plain text/,
    ],
    ['an archive', () => Uint8Array.from([0x50, 0x4b, 3, 4, 20, 0, 6, 0, 8, 0]), /no plain text/],
    ['over 2 MB', () => new Uint8Array(2 * 1024 * 1024 + 1).fill(0x31), /over 2 MB/],
    ['of 100 001 lines', () => new TextEncoder().encode('1\n'.repeat(100_001)), /100001 lines, over 100 000/],
  ])('are refused where the file is %s', (_, make, sentence) => {
    const read = textOfBytes('pack.csv', make());
    expect(read.ok ? '' : read.sentence).toMatch(sentence);
  });
});
