// `npm test`: installs what is missing, builds what is stale, runs every test and ends with one line of counts.
// Arguments go on to vitest: `npm test -- tests/calc`.
import fs from 'node:fs';
import path from 'node:path';
import { buildWhatIsStale } from './build.mjs';
import { ensureChromium, ensureInstalled } from './install.mjs';
import { fromRoot, run, say } from './tools.mjs';

const reports = fromRoot('node_modules/.cache/bidewell-tests');
const filters = process.argv.slice(2);

/** Runs some of the projects of vitest.config.ts; gives the counts out of vitest's own report. */
async function runProjects(name, projects, env) {
  const report = path.join(reports, `${name}.json`);
  fs.rmSync(report, { force: true });
  const status = await run(
    process.execPath,
    [
      fromRoot('node_modules/vitest/vitest.mjs'),
      'run',
      ...projects.map((project) => `--project=${project}`),
      '--reporter=default',
      '--reporter=json',
      `--outputFile.json=${report}`,
      '--passWithNoTests',
      ...filters,
    ],
    env,
  );
  const counts = { passed: 0, failed: 0, skipped: 0 };
  if (fs.existsSync(report)) {
    const result = JSON.parse(fs.readFileSync(report, 'utf8'));
    counts.passed = result.numPassedTests;
    counts.failed = result.numFailedTests;
    counts.skipped = result.numPendingTests + result.numTodoTests;
    // A file that does not even load has no tests of its own to fail, and must not pass unseen.
    counts.failed += result.testResults.filter(
      (file) => file.status === 'failed' && !file.assertionResults.some((test) => test.status === 'failed'),
    ).length;
  }
  if (status !== 0 && counts.failed === 0) counts.failed = 1; // an error outside of any test, or no report at all
  return counts;
}

function loud(lines) {
  const width = Math.max(...lines.map((line) => line.length));
  const bar = '!'.repeat(width + 6);
  console.log([bar, ...lines.map((line) => `!! ${line.padEnd(width)} !!`), bar].join('\n'));
}

await ensureInstalled();
fs.mkdirSync(reports, { recursive: true });
const chromium = await ensureChromium();
await buildWhatIsStale();

const parts = [await runProjects('unit', ['node', 'ui'], { CI: process.env.CI ?? '' })];
parts.push(await runProjects('e2e', ['e2e'], { BIDEWELL_CHROMIUM: chromium ?? 'none' }));

if (!chromium) {
  const missing = fs.existsSync(fromRoot('tests/e2e'))
    ? fs.readdirSync(fromRoot('tests/e2e'), { recursive: true })
    : [];
  loud([
    'NO BROWSER: these tests did not run',
    ...missing.filter((name) => name.endsWith('.e2e.ts')).map((name) => `  tests/e2e/${name}`),
    'Install Chromium (Debian: apt-get install chromium, as root) and run npm test again.',
  ]);
}
const sum = (key) => parts.reduce((total, part) => total + part[key], 0);
const [passed, failed, skipped] = [sum('passed'), sum('failed'), sum('skipped')];
if (filters.length > 0) say(`only what matches: ${filters.join(' ')}`);
process.exitCode = failed > 0 ? 1 : 0;
console.log(`${passed} passed, ${failed} failed${skipped > 0 ? `, ${skipped} skipped` : ''}`);
