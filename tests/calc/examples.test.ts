import * as calc from '@/calc/index';
import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';

const root = path.resolve(import.meta.dirname, '../../calc');

/** Every `@example` line of calc/: one expression that is true. */
const examples = readdirSync(root, { recursive: true, encoding: 'utf8' })
  .filter((file) => file.endsWith('.ts'))
  .flatMap((file) =>
    [...readFileSync(path.join(root, file), 'utf8').matchAll(/^\s*\*\s*@example\s+(.+)$/gm)].map((match) => ({
      file,
      line: match[1]!.trim(),
    })),
  );

describe('the examples in the docstrings of calc/', () => {
  it('are nine or more', () => expect(examples.length).toBeGreaterThanOrEqual(9));

  it.each(examples)('$file: $line', ({ line }) => {
    const names = Object.keys(calc);
    const evaluate = new Function(...names, `return (${line});`) as (...values: unknown[]) => unknown;
    expect(evaluate(...names.map((name) => calc[name as keyof typeof calc]))).toBe(true);
  });
});
