// Gives the service worker its build: which files make the app, and a name for exactly these.
import { createHash } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';

/** What the app needs to be drawn. Pictures of the framework and licences are fetched where somebody looks at them. */
const wanted = /^(_expo\/static\/(js|css)\/.*\.(js|css)|fonts\/.*\.woff2|[^/]*\.(png|ico|webmanifest))$/;

/**
 * The shell of an exported web app.
 * @param {string} folder the export
 * @returns {{ build: string, scripts: string[], files: string[] }} `scripts`: those that the page itself names; `build`
 *   changes with any byte of any file
 */
export function shellOf(folder) {
  const page = fs.readFileSync(path.join(folder, 'index.html'), 'utf8');
  const scripts = [...page.matchAll(/<script[^>]+src="([^"]+)"/g)].map(([, address]) => address ?? '');
  const names = fs
    .readdirSync(folder, { recursive: true })
    .map((name) => String(name).split(path.sep).join('/'))
    .filter((name) => wanted.test(name))
    .sort();
  const hash = createHash('sha256').update(page);
  for (const name of names) hash.update(name).update(fs.readFileSync(path.join(folder, name)));
  return {
    build: hash.digest('hex').slice(0, 16),
    scripts,
    files: ['/', ...names.map((name) => `/${name}`)],
  };
}

/** Joins the parts of the service worker into one file that changes with every build, so that a browser notices it. */
export function writeServiceWorker(folder) {
  const part = path.join(folder, 'sw-shell.js');
  const worker = path.join(folder, 'sw.js');
  const shell = `self.bidewellShell = ${JSON.stringify(shellOf(folder))};`;
  const text = [shell, fs.readFileSync(part, 'utf8'), fs.readFileSync(worker, 'utf8')].join('\n');
  fs.writeFileSync(worker, text);
  fs.rmSync(part);
}
