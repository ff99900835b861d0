// zod for the web build, with only what our schemas use.
//
// Metro keeps a whole package as soon as one name of it is used: zod/mini weighs 54 KiB gzip that way, of which our
// schemas use about a tenth. esbuild leaves the rest out. Both ways in, the schemas' and the form resolver's, are built
// together, so that they share one copy of zod's core and its error class.
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
 * Writes the lean files and gives which import each of them answers.
 * @param root the repository
 * @returns import name → file
 */
function leanZod(root) {
  const folder = path.join(root, 'node_modules/.cache/bidewell-zod');
  fs.rmSync(folder, { recursive: true, force: true });
  fs.mkdirSync(path.join(folder, 'in'), { recursive: true });
  fs.writeFileSync(path.join(folder, 'in/mini.js'), `export { ${usedNames(root).join(', ')} } from 'zod/mini';\n`);
  // By its file, because esbuild takes `external` to mean the package's subpaths too.
  const resolver = path.join(root, 'node_modules/@hookform/resolvers/zod/dist/zod.mjs');
  fs.writeFileSync(path.join(folder, 'in/resolver.js'), `export { zodResolver } from ${JSON.stringify(resolver)};\n`);
  esbuild.buildSync({
    absWorkingDir: root,
    entryPoints: [path.join(folder, 'in/mini.js'), path.join(folder, 'in/resolver.js')],
    outdir: folder,
    bundle: true,
    splitting: true,
    format: 'esm',
    target: 'es2022',
    external: ['react-hook-form', '@hookform/resolvers'],
    chunkNames: 'core',
    logLevel: 'warning',
  });
  return new Map([
    ['zod/mini', path.join(folder, 'mini.js')],
    ['@hookform/resolvers/zod', path.join(folder, 'resolver.js')],
  ]);
}

module.exports = { leanZod };
