// `npm run typecheck`: each floor against its own tsconfig.json, two at a time. Floors that do not exist yet are skipped.
import { spawn } from 'node:child_process';
import fs from 'node:fs';
import { fromRoot } from './tools.mjs';

const floors = [
  'calc',
  'shared/contract',
  'shared/client',
  'shared/ui',
  'shared/screens',
  'app',
  'server',
  'tests',
  'tests/shared',
];
const only = process.argv.slice(2);
const waiting = floors.filter((floor) => (only.length === 0 || only.includes(floor)) && hasSource(floor));
const failed = [];

function hasSource(floor) {
  const folder = fromRoot(floor);
  return fs.existsSync(folder) && fs.readdirSync(folder, { recursive: true }).some((name) => /\.tsx?$/.test(name));
}

function check(floor) {
  return new Promise((resolve) => {
    const tsc = spawn(
      process.execPath,
      [fromRoot('node_modules/typescript/bin/tsc'), '-p', floor, '--pretty', 'false'],
      {
        cwd: fromRoot('.'),
        stdio: ['ignore', 'pipe', 'inherit'],
      },
    );
    let output = '';
    tsc.stdout.on('data', (chunk) => (output += chunk));
    tsc.on('close', (status) => {
      console.log(`${status === 0 ? 'ok  ' : 'FAIL'} types of ${floor}`);
      if (status !== 0) {
        failed.push(floor);
        process.stdout.write(output);
      }
      resolve();
    });
  });
}

async function worker() {
  for (let floor = waiting.shift(); floor; floor = waiting.shift()) await check(floor);
}
await Promise.all([worker(), worker()]);
process.exit(failed.length === 0 ? 0 : 1);
