// Installing what is missing: packages and, for the tests, a browser. Plain JavaScript: nothing is installed yet.
import fs from 'node:fs';
import { chromiumPath, fromRoot, onPath, run, say } from './tools.mjs';

const leastNode = [20, 19, 4];
export const compilerLine = 'apt-get install -y build-essential python3';

/** Ends with a sentence where this Node is older than the packages take. */
function requireNode() {
  const have = process.versions.node.split('.').map(Number);
  const differing = leastNode.findIndex((part, i) => have[i] !== part);
  if (differing >= 0 && have[differing] < leastNode[differing]) {
    console.error(`bidewell: this is Node ${process.versions.node}; ${leastNode.join('.')} or newer is needed.`);
    process.exit(1);
  }
}

/** What npm leaves out by itself: packages for other systems, and leftovers of an earlier tree. */
const mayBeMissing = (entry) => entry.optional || entry.devOptional || entry.extraneous;

/** Whether node_modules holds exactly what package-lock.json names (npm keeps its own list of what it installed). */
function installedAsLocked() {
  const list = fromRoot('node_modules/.package-lock.json');
  if (!fs.existsSync(list)) return false;
  const wanted = JSON.parse(fs.readFileSync(fromRoot('package-lock.json'), 'utf8')).packages;
  const have = JSON.parse(fs.readFileSync(list, 'utf8')).packages;
  return Object.entries(wanted).every(
    ([folder, entry]) => folder === '' || mayBeMissing(entry) || have[folder]?.version === entry.version,
  );
}

/** Installs the packages when node_modules is missing or differs from package-lock.json; ends the process when that fails. */
export async function ensureInstalled() {
  requireNode();
  if (installedAsLocked()) return;
  const compiler = (onPath('g++') || onPath('c++')) && onPath('make') && onPath('python3');
  if (!compiler) say(`SQLite may have to be compiled here, and a compiler is missing. Where it stops: ${compilerLine}`);
  say('installing packages (some minutes the first time)');
  // --include=dev: the build tools stand under devDependencies, and NODE_ENV=production would leave them out.
  const status = await run('npm', ['ci', '--include=dev', '--no-audit', '--no-fund']);
  if (status === 0) return;
  console.error(
    compiler
      ? 'bidewell: the packages could not be installed; npm says above why.'
      : `bidewell: the packages could not be installed. The compiler for SQLite is missing. Run, as root:\n  ${compilerLine}`,
  );
  process.exit(status);
}

/**
 * The path of a Chromium for the tests that need a browser; installs Debian's where this is Debian and we are root.
 * Null where there is none: the caller says which tests did not run.
 */
export async function ensureChromium() {
  const there = chromiumPath();
  if (there || process.env.BIDEWELL_CHROMIUM) return there;
  const mayInstall = process.getuid?.() === 0 && fs.existsSync('/etc/debian_version') && onPath('apt-get');
  if (!mayInstall) return null;
  say('installing Debian’s Chromium for the tests in a browser');
  const quiet = { DEBIAN_FRONTEND: 'noninteractive' };
  await run('apt-get', ['update', '-qq'], quiet);
  await run('apt-get', ['install', '-y', '-qq', '--no-install-recommends', 'chromium'], quiet);
  return chromiumPath();
}
