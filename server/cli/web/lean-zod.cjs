// zod for the web build, with only what our schemas use.
//
// Metro keeps a whole package as soon as one name of it is used: zod/mini weighs 54 KiB gzip that way, of which our
// schemas use about a tenth. esbuild leaves the rest out. Nothing else in the page may import zod: a second copy of its
// core would not know the first one's errors (the forms use the resolver for any standard schema, which imports none).
const esbuild = require('esbuild');
const fs = require('node:fs');
const path = require('node:path');

const sourceFolders = ['app', 'shared'];

function sources(folder) {
  if (!fs.existsSync(folder)) return [];
  return fs
    .readdirSync(folder, { recursive: true })
    .filter((name) => /\.tsx?$/.test(name))
    .map((name) => fs.readFileSync(path.join(folder, name), 'utf8'));
}

/** The names of zod/mini that any source file uses; names of types fall out because the package does not export them. */
function usedNames(root) {
  const exported = new Set(Object.keys(require('zod/mini')));
  const used = new Set();
  for (const text of sourceFolders.flatMap((folder) => sources(path.join(root, folder)))) {
    const named = /import\s*\{([^}]*)\}\s*from\s*'zod\/mini'/.exec(text);
    for (const name of named?.[1].split(',') ?? []) used.add(name.replace(/\bas\b.*/, '').trim());
    const whole = /import\s*(?:type\s*)?\*\s*as\s+(\w+)\s+from\s*'zod\/mini'/.exec(text);
    if (whole) for (const [, name] of text.matchAll(new RegExp(`\\b${whole[1]}\\.(\\w+)`, 'g'))) used.add(name);
  }
  return [...used].filter((name) => exported.has(name)).sort();
}

/**
 * Writes the lean zod/mini.
 * @param root the repository
 * @returns the file that answers for `zod/mini`
 */
function leanZod(root) {
  const outfile = path.join(root, 'node_modules/.cache/bidewell-zod/mini.js');
  esbuild.buildSync({
    stdin: { contents: `export { ${usedNames(root).join(', ')} } from 'zod/mini';`, resolveDir: root },
    outfile,
    bundle: true,
    format: 'esm',
    target: 'es2022',
    logLevel: 'warning',
  });
  return outfile;
}

module.exports = { leanZod };
