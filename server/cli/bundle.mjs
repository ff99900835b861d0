// Bundles the server, as `npm run build` ships it and as the tests of the started process run it. esbuild is loaded
// late, because build.mjs is imported before the packages are installed.
import fs from 'node:fs';
import path from 'node:path';
import { fromRoot } from './tools.mjs';

/** The worker threads' entry points: each file of server/workers is one. */
const workers = () => fs.readdirSync(fromRoot('server/workers')).filter((name) => name.endsWith('.ts'));

/**
 * Writes main.js and its worker threads into a folder from which node_modules is found.
 * @param beside further entries by the name of their file
 */
export async function bundleServer(outdir, beside = {}) {
  const { build } = await import('esbuild');
  await build({
    absWorkingDir: fromRoot('.'),
    entryPoints: [
      { in: 'server/index.ts', out: 'main' },
      ...workers().map((name) => ({ in: `server/workers/${name}`, out: `workers/${path.basename(name, '.ts')}` })),
      ...Object.entries(beside).map(([out, entry]) => ({ in: entry, out })),
    ],
    outdir,
    bundle: true,
    platform: 'node',
    target: 'node20',
    format: 'esm',
    packages: 'external',
    // Entities and migrations are known to TypeORM by their class names.
    keepNames: true,
    sourcemap: true,
    tsconfig: 'server/tsconfig.json',
    logLevel: 'warning',
  });
}
