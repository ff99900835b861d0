// `npm run bench`: the figures the house promises, measured on this machine against the built server.
import { buildWhatIsStale } from './build.mjs';
import { ensureChromium, ensureInstalled } from './install.mjs';
import { fromRoot, runOrExit } from './tools.mjs';

await ensureInstalled();
const chromium = await ensureChromium();
await buildWhatIsStale();
await runOrExit(process.execPath, ['--import', 'tsx', fromRoot('tests/bench/index.ts'), ...process.argv.slice(2)], {
  BIDEWELL_CHROMIUM: chromium ?? 'none',
});
