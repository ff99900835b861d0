// `npm run dev`: Metro with reload behind the server, on one address. The server restarts when its sources change,
// screens reload in place. Both processes end together.
import { spawn } from 'node:child_process';
import { ensureInstalled } from './install.mjs';
import { fromRoot, say } from './tools.mjs';

const metroPort = '8099';
await ensureInstalled();

const env = {
  ...process.env,
  METRO_PORT: metroPort,
  EXPO_PUBLIC_FOLDER: 'assets/web',
  EXPO_OFFLINE: '1',
  EXPO_NO_TELEMETRY: '1',
  // The page is opened at the server's address, not at Metro's.
  BROWSER: 'none',
};
delete env.CI; // Expo would switch reload off.

const start = (args) =>
  spawn(process.execPath, args, { cwd: fromRoot('.'), stdio: ['ignore', 'inherit', 'inherit'], env });
const children = [
  start([fromRoot('node_modules/expo/bin/cli'), 'start', '--web', '--port', metroPort]),
  start(['--watch', '--watch-preserve-output', '--import', 'tsx', fromRoot('server/index.ts')]),
];

let stopping = false;
function stop(status) {
  if (stopping) return;
  stopping = true;
  for (const child of children) child.kill('SIGTERM');
  process.exitCode = status;
}
for (const signal of ['SIGINT', 'SIGTERM']) process.on(signal, () => stop(0));
for (const child of children) child.on('exit', (status) => stop(status ?? 0));
say(`open http://127.0.0.1:${env.PORT || '4300'}`);
