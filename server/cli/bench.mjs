// `npm run bench`: the figures the house promises, measured on this machine. Only the first loads need the built server.
import { buildWhatIsStale } from './build.mjs';
import { ensureChromium, ensureInstalled } from './install.mjs';
import { fromRoot, runOrExit } from './tools.mjs';

await ensureInstalled();
const asked = process.argv.slice(2);
const loads = asked.length === 0 || asked.includes('first-load');
const chromium = loads ? await ensureChromium() : null;
if (loads) await buildWhatIsStale();
await runOrExit(process.execPath, ['--import', 'tsx', fromRoot('tests/bench/index.ts'), ...asked], {
  BIDEWELL_CHROMIUM: chromium ?? 'none',
});
