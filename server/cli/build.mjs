// `npm run build`: the web app into dist/, the server into dist-server/, each only when its sources changed.
// `npm start`, `npm test` and `npm run bench` call the same function. The packages are loaded late, inside the
// functions, because this file is imported before they are installed.
import fs from 'node:fs';
import path from 'node:path';
import { pathToFileURL } from 'node:url';
import { promisify } from 'node:util';
import zlib from 'node:zlib';
import { bundleServer } from './bundle.mjs';
import { ensureInstalled } from './install.mjs';
import { writeServiceWorker } from './web/app-shell.mjs';
import { fromRoot, runOrExit, say, stampOf } from './tools.mjs';

const webInputs = [
  'app',
  'calc',
  'shared',
  'assets/fonts',
  'assets/images',
  'assets/sounds',
  'assets/web',
  'app.json',
  'package-lock.json',
  'tsconfig.json',
  'metro.config.cjs',
  'server/cli/build.mjs',
  'server/cli/web',
];
const serverInputs = ['server', 'calc', 'shared/contract', 'package-lock.json', 'tsconfig.json'];

/** Production switches of the web build; the two EXPO_UNSTABLE_* ones leave unused exports out (about 60 KiB gzip). */
const webEnv = {
  NODE_ENV: 'production',
  CI: '1',
  EXPO_OFFLINE: '1',
  EXPO_NO_TELEMETRY: '1',
  EXPO_PUBLIC_FOLDER: 'assets/web',
  EXPO_UNSTABLE_METRO_OPTIMIZE_GRAPH: '1',
  EXPO_UNSTABLE_TREE_SHAKING: '1',
};

const readOr = (file, otherwise) => (fs.existsSync(file) ? fs.readFileSync(file, 'utf8') : otherwise);

/** Writes a .br and a .gz beside every text file worth it: the server sends them as they are and compresses nothing itself. */
async function precompress(folder) {
  const brotli = promisify(zlib.brotliCompress);
  const gzip = promisify(zlib.gzip);
  const names = fs.readdirSync(folder, { recursive: true });
  await Promise.all(
    names
      .filter((name) => /\.(html|js|css|json|svg|txt|webmanifest)$/.test(name))
      .map(async (name) => {
        const file = path.join(folder, name);
        const content = fs.readFileSync(file);
        if (content.length < 1024) return;
        const params = { [zlib.constants.BROTLI_PARAM_SIZE_HINT]: content.length };
        const [small, smallGzip] = await Promise.all([brotli(content, { params }), gzip(content, { level: 9 })]);
        if (small.length < content.length) fs.writeFileSync(`${file}.br`, small);
        if (smallGzip.length < content.length) fs.writeFileSync(`${file}.gz`, smallGzip);
      }),
  );
}

async function buildWeb() {
  const stamp = stampOf(webInputs);
  const stampFile = fromRoot('dist/.stamp');
  if (readOr(stampFile, '') === stamp) return;
  say('building the web app (two to four minutes)');
  // Built aside and swapped in, so that a build that fails or is stopped leaves the running one whole.
  const fresh = fromRoot('dist-fresh');
  fs.rmSync(fresh, { recursive: true, force: true });
  const chunkList = fromRoot('node_modules/.cache/bidewell-chunks.json');
  fs.rmSync(chunkList, { force: true });
  await runOrExit(
    process.execPath,
    [fromRoot('node_modules/expo/bin/cli'), 'export', '-p', 'web', '--output-dir', 'dist-fresh'],
    { ...webEnv, BIDEWELL_CHUNK_LIST: chunkList },
  );
  writeServiceWorker(fresh);
  await precompress(fresh);
  fs.copyFileSync(chunkList, path.join(fresh, '.chunks.json')); // the server serves no dot files
  fs.writeFileSync(path.join(fresh, '.stamp'), stamp);
  fs.rmSync(fromRoot('dist'), { recursive: true, force: true });
  fs.renameSync(fresh, fromRoot('dist'));
}

async function buildServer() {
  const stamp = stampOf(serverInputs);
  const stampFile = fromRoot('dist-server/.stamp');
  if (readOr(stampFile, '') === stamp) return;
  say('bundling the server');
  fs.rmSync(fromRoot('dist-server'), { recursive: true, force: true });
  await bundleServer('dist-server');
  fs.writeFileSync(stampFile, stamp);
}

/** One build at a time: a second one waits for the first instead of writing into the same folders. */
async function alone(work) {
  const lock = fromRoot('node_modules/.cache/bidewell-build.lock');
  fs.mkdirSync(path.dirname(lock), { recursive: true });
  for (;;) {
    try {
      fs.writeFileSync(lock, String(process.pid), { flag: 'wx' });
      break;
    } catch (error) {
      if (error.code !== 'EEXIST') throw error;
      if (!isRunning(Number(readOr(lock, '0')))) fs.rmSync(lock, { force: true });
      else await new Promise((resolve) => setTimeout(resolve, 500));
    }
  }
  const release = () => fs.rmSync(lock, { force: true });
  process.once('exit', release);
  try {
    await work();
  } finally {
    process.removeListener('exit', release);
    release();
  }
}

function isRunning(pid) {
  if (!pid) return false;
  try {
    process.kill(pid, 0);
    return true;
  } catch {
    return false;
  }
}

/** Brings dist/ and dist-server/ up to date; ends the process where a build fails. */
export async function buildWhatIsStale() {
  await alone(async () => {
    await buildServer();
    await buildWeb();
  });
}

if (import.meta.url === pathToFileURL(process.argv[1]).href) {
  await ensureInstalled();
  await buildWhatIsStale();
}
