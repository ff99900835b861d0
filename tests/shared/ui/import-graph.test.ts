import fs from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';

const root = path.resolve(import.meta.dirname, '../../..');
const ui = path.join(root, 'shared/ui');

const sources = (folder: string): string[] =>
  fs
    .readdirSync(path.join(ui, folder), { recursive: true, encoding: 'utf8' })
    .filter((name) => /\.tsx?$/.test(name) && !name.endsWith('.d.ts'))
    .map((name) => path.join(ui, folder, name));

/** What a file imports at once; types and `import()` are not loaded with it. */
function staticImports(file: string): string[] {
  const text = fs.readFileSync(file, 'utf8');
  const clauses = [...text.matchAll(/^(?:import|export)\s+(?!type\b)([^;]*?)from\s+'([^']+)'/gm)];
  const bare = [...text.matchAll(/^import\s+'([^']+)'/gm)].map(([, from]) => from ?? '');
  return [...clauses.map(([, , from]) => from ?? ''), ...bare];
}

function resolveOwn(from: string, file: string): string | null {
  const base = from.startsWith('@/')
    ? path.join(root, from.slice(2))
    : from.startsWith('.')
      ? path.resolve(path.dirname(file), from)
      : null;
  if (base === null) return null;
  return (
    ['.web.tsx', '.web.ts', '.tsx', '.ts', '/index.ts'].map((end) => base + end).find((each) => fs.existsSync(each)) ??
    null
  );
}

/** Every package reached from these files by static imports, each with the chain that leads there. */
function packagesFrom(starts: string[]): Map<string, string> {
  const found = new Map<string, string>();
  const seen = new Set<string>();
  const queue = starts.map((file) => ({ file, chain: path.relative(root, file) }));
  for (let next = queue.pop(); next; next = queue.pop()) {
    if (seen.has(next.file)) continue;
    seen.add(next.file);
    for (const from of staticImports(next.file)) {
      const own = resolveOwn(from, next.file);
      if (own) queue.push({ file: own, chain: `${next.chain} → ${path.relative(root, own)}` });
      else if (!found.has(from)) found.set(from, next.chain);
    }
  }
  return found;
}

describe('what the foundation of the interface loads', () => {
  const foundation = [
    'theme',
    'format',
    'primitives',
    'icons',
    'stage',
    'states',
    'screen',
    'level-column',
    'wait-ribbon',
  ];
  const reached = packagesFrom(foundation.flatMap(sources));

  it('follows imports: React Native and its drawing part are found', () => {
    expect(reached.has('react-native')).toBe(true);
    expect(reached.has('react-native-svg')).toBe(true);
  });

  it('never reaches Reanimated (176 KiB) or the scales of the charts at once', () => {
    const heavy = [...reached].filter(([name]) =>
      /^(react-native-reanimated|react-native-worklets|d3-|mathjs|luxon)/.test(name),
    );
    expect(heavy).toEqual([]);
  });

  it('imports Reanimated in one file only, and that file only late', () => {
    const all = sources('.');
    const users = all.filter((file) => staticImports(file).some((from) => from.startsWith('react-native-reanimated')));
    expect(users.map((file) => path.relative(ui, file))).toEqual(['motion/moving-fill.tsx']);
    const early = all.filter((file) =>
      staticImports(file).some((from) => resolveOwn(from, file)?.endsWith('motion/moving-fill.tsx')),
    );
    expect(early).toEqual([]);
  });
});
