/** The process: reads the environment, starts the server, and ends it properly. */
import { isEveryAddress, readConfig } from './config';
import { makeLog } from './middleware/request-log';
import { startServer, type RunningServer } from './start-server';

function readConfigOrExit() {
  try {
    return readConfig(process.env);
  } catch (error) {
    process.stderr.write(`bidewell: ${error instanceof Error ? error.message : String(error)}\n`);
    process.exit(1);
  }
}

const config = readConfigOrExit();
const log = makeLog(config.logLevel);

const fail = (what: string) => (error: unknown) => {
  log.fatal({ err: error }, what);
  process.stderr.write(`bidewell: ${error instanceof Error ? error.message : String(error)}\n`);
  process.exit(1);
};
// Nobody knows what state is left after these: end, and let whoever watches start again.
process.on('unhandledRejection', fail('a promise failed and nobody listened'));
process.on('uncaughtException', fail('an error was caught by nobody'));

// What the server writes is for its owner: the database holds hashes of passwords.
process.umask(0o077);

let running: RunningServer | null = null;
let stopping = false;
for (const signal of ['SIGTERM', 'SIGINT'] as const) {
  process.on(signal, () => {
    // A second signal, or one before anything runs: nothing to wait for.
    if (stopping || !running) process.exit(stopping ? 1 : 0);
    stopping = true;
    log.info({ signal }, 'stopping');
    running.stop().then(() => process.exit(0), fail('the server did not stop properly'));
  });
}

try {
  running = await startServer(config, log);
  // `npm start` says it to whoever started it.
  const { address, port } = running;
  process.send?.({ ready: { address, port, demo: config.demo, everywhere: isEveryAddress(config.host) } });
  log.info({ address: running.address, demo: config.demo, dataDir: config.dataDir }, 'ready');
} catch (error) {
  fail('the server did not start')(error);
}
