// `npm start`: installs what is missing, builds what is stale and runs the server, which makes the data folder and
// the secrets, migrates, and seeds the demo workshop into an empty database. Plain JavaScript: it runs before anything is
// installed. PORT, BIDEWELL_HOST, BIDEWELL_DATA, BIDEWELL_DEMO and the rest (README) go to the server as they are.
import http from 'node:http';
import https from 'node:https';
import { buildWhatIsStale } from './build.mjs';
import { ensureInstalled } from './install.mjs';
import { fromRoot, runAndFollow, say } from './tools.mjs';

const defaultPort = '4300'; // as in server/config.ts
const { env } = process;

await ensureInstalled();
await buildWhatIsStale();

const port = env.PORT || defaultPort;
const host = env.BIDEWELL_HOST ?? (env.BIDEWELL_DEMO === 'off' ? '0.0.0.0' : '127.0.0.1');
const reachable = host === '0.0.0.0' || host === '::' ? '127.0.0.1' : host;
const scheme = env.BIDEWELL_TLS_CERT ? 'https' : 'http';
const server = runAndFollow(process.execPath, ['--enable-source-maps', fromRoot('dist-server/main.js')], {
  NODE_ENV: 'production',
  PORT: port,
});

/** Whether the server answers that it is ready. The local certificate is our own, so it is not checked here. */
function ready() {
  return new Promise((resolve) => {
    const request = (scheme === 'https' ? https : http).get(
      { host: reachable, port, path: '/readyz', rejectUnauthorized: false, timeout: 2000 },
      (answer) => {
        answer.resume();
        resolve(answer.statusCode === 200);
      },
    );
    request.on('error', () => resolve(false));
    request.on('timeout', () => request.destroy());
  });
}

while (server.exitCode === null && !(await ready())) await new Promise((resolve) => setTimeout(resolve, 200));
if (server.exitCode === null) {
  const address = env.BIDEWELL_URL ?? `${scheme}://${reachable.includes(':') ? `[${reachable}]` : reachable}:${port}`;
  say(`ready at ${address}`);
  if (env.BIDEWELL_DEMO === 'off') say('no demo: the first person to open it creates the workshop');
  else say('the sign-in page offers each role of the demo workshop by one tap');
  if (reachable !== host) say(`listening on every address of this machine, port ${port}`);
}
