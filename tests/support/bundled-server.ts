import { build } from 'esbuild';

/**
 * The process itself, bundled as `npm run build` does it: so its worker threads are found there, too.
 * @param outdir within node_modules, where the packages are found from
 * @param beside further entries by the name of their file
 */
export async function bundleServer(outdir: string, beside: Record<string, string> = {}): Promise<void> {
  await build({
    entryPoints: [
      { in: 'server/index.ts', out: 'main' },
      { in: 'server/workers/bcrypt.ts', out: 'workers/bcrypt' },
      { in: 'server/workers/bench.ts', out: 'workers/bench' },
      { in: 'server/workers/back-up.ts', out: 'workers/back-up' },
      ...Object.entries(beside).map(([out, entry]) => ({ in: entry, out })),
    ],
    outdir,
    bundle: true,
    platform: 'node',
    target: 'node20',
    format: 'esm',
    packages: 'external',
    keepNames: true,
    tsconfig: 'server/tsconfig.json',
    logLevel: 'error',
  });
}
