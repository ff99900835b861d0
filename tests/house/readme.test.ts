import fs from 'node:fs';
import { describe, expect, test } from 'vitest';
import { fromRoot } from '@/server/cli/tools.mjs';

const pages = ['README.md', 'DEVELOPERS.md'];
const pictures = pages.flatMap((page) =>
  [...fs.readFileSync(fromRoot(page), 'utf8').matchAll(/!\[([^\]]*)\]\(([^)]+)\)/g)].map(([, words, file]) => ({
    page,
    words: words ?? '',
    file: file ?? '',
  })),
);

describe('the pictures of the README', () => {
  test('are seven or more', () => expect(pictures.length).toBeGreaterThanOrEqual(7));

  test.each(pictures)('$page: $file is there as a PNG, with words for who does not see it', ({ words, file }) => {
    const start = fs.readFileSync(fromRoot(file)).subarray(1, 4).toString('latin1');
    expect(start).toBe('PNG');
    expect(words.split(' ').length).toBeGreaterThan(2);
  });
});
