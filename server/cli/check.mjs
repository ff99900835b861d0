// `npm run check`: types of every floor, lint, formatting, then all tests. Exactly what .ci/run runs.
import { ensureInstalled } from './install.mjs';
import { fromRoot, run, say } from './tools.mjs';

await ensureInstalled();
const steps = [
  ['types', [fromRoot('server/cli/typecheck.mjs')]],
  ['lint', [fromRoot('node_modules/eslint/bin/eslint.js'), '.', '--max-warnings', '0']],
  ['formatting', [fromRoot('node_modules/prettier/bin/prettier.cjs'), '--check', '--log-level', 'warn', '.']],
];
const failed = [];
for (const [name, args] of steps) {
  say(`checking ${name}`);
  if ((await run(process.execPath, args)) !== 0) failed.push(name);
}
// The tests run in any case: their closing line is the last thing said.
if (failed.length > 0) say(`FAILED before the tests: ${failed.join(', ')}`);
const tests = await run(process.execPath, [fromRoot('server/cli/test.mjs')]);
process.exit(failed.length > 0 ? 1 : tests);
