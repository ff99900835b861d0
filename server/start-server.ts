import http from 'node:http';
import https from 'node:https';
import type { AddressInfo } from 'node:net';
import type { Logger } from 'pino';
import type { DataSource } from 'typeorm';
import { systemClock, type Clock } from './clock';
import { isEveryAddress, type Config } from './config';
import { createApp } from './create-app';
import { assertDurable, makeDataSource } from './data-source';
import { databaseFile, prepareDataFolder } from './data-files';
import { seedDemo } from './demo/seed';
import type { Deps } from './deps';
import type { Lifecycle } from './lifecycle';
import { makeSleeper } from './live/sleeper-loop';
import { makeSocketHub } from './live/socket-hub';
import { proxyMetroUpgrades } from './middleware/metro-proxy';
import { migrate } from './migrate';
import { makeBenchSolver } from './services/bench-plan/bench-solver';
import { makeLimits } from './services/limits';
import { makePasswords } from './services/passwords';
import { loadSecrets } from './services/secrets';
import { sweepPhotos } from './sweep-photos';

/** Requests under way get this long to end when the server stops, ms. */
const drainMs = 10_000;

export interface RunningServer {
  /** Address to open on this machine, or the one the operator has set. */
  address: string;
  port: number;
  deps: Deps;
  /** Stops taking requests, ends sockets, lets requests under way end, and closes the database cleanly. */
  stop(): Promise<void>;
}

function listenOn(server: http.Server, config: Config): Promise<number> {
  return new Promise((resolve, reject) => {
    server.once('error', (error: NodeJS.ErrnoException) => {
      if (error.code === 'EADDRINUSE')
        reject(new Error(`Port ${config.port} is taken. Stop what uses it, or set PORT to another one.`));
      else if (error.code === 'EACCES') reject(new Error(`Port ${config.port} is not allowed. Set PORT above 1024.`));
      else if (error.code === 'EADDRNOTAVAIL')
        reject(new Error(`${config.host} is no address of this machine. Set BIDEWELL_HOST to one that is.`));
      else reject(error);
    });
    server.listen(config.port, config.host, () => resolve((server.address() as AddressInfo).port));
  });
}

function addressOf(config: Config, port: number): string {
  if (config.publicUrl) return config.publicUrl;
  const host = isEveryAddress(config.host) ? 'localhost' : config.host;
  return `${config.tls ? 'https' : 'http'}://${host.includes(':') ? `[${host}]` : host}:${port}`;
}

const quietly = (work: Promise<unknown>, log: Logger, what: string): Promise<void> =>
  work.then(
    () => undefined,
    (error: unknown) => log.error({ err: error }, what),
  );

async function sweptPhotos(dataSource: DataSource, config: Config, now: number, log: Logger): Promise<void> {
  const { removed, strange } = await sweepPhotos(dataSource, config.dataDir, now);
  if (removed.length > 0) log.info({ files: removed }, 'photos that nothing names were removed');
  if (strange) log.warn('the database names none of the photos in the data folder: they were left alone');
}

/**
 * Starts everything, in an order in which nothing is lost: database and its migrations, sockets, then what fell due
 * while the server was off, then the port, and ready only at the end.
 */
export async function startServer(config: Config, log: Logger, clock: Clock = systemClock): Promise<RunningServer> {
  prepareDataFolder(config.dataDir);
  const secrets = loadSecrets(config.dataDir);
  const dataSource = await makeDataSource(databaseFile(config.dataDir)).initialize();
  const lifecycle: Lifecycle = { ready: false };
  const passwords = makePasswords();
  const bench = makeBenchSolver();
  try {
    await assertDurable(dataSource);
    const migrations = await migrate(dataSource, config.dataDir, clock.now(), log);
    if (migrations.length > 0) log.info({ migrations }, 'database migrated');
    const hub = makeSocketHub({ config, dataSource, secrets, clock, log });
    const sleeper = makeSleeper({ dataSource, clock, log, hub });
    const limits = makeLimits();
    const deps: Deps = { dataSource, clock, config, log, hub, sleeper, lifecycle, passwords, bench, secrets, limits };
    if (config.demo) await seedDemo(deps);
    const app = createApp(deps);
    const server = config.tls ? https.createServer(config.tls, app) : http.createServer(app);
    hub.attach(server);
    if (config.metroPort !== null) proxyMetroUpgrades(server, config.metroPort);
    await quietly(sweptPhotos(dataSource, config, clock.now(), log), log, 'the photos were not swept');
    await sleeper.start();
    const port = await listenOn(server, config);
    lifecycle.ready = true;
    const stop = async () => {
      lifecycle.ready = false;
      const drained = setTimeout(() => server.closeAllConnections(), drainMs);
      await quietly(sleeper.stop(), log, 'the sleeper did not stop');
      // Closes the sockets and the server's port; resolves when the last request under way has ended.
      await quietly(hub.close(), log, 'the sockets did not close');
      clearTimeout(drained);
      await quietly(passwords.close(), log, 'the hashing threads did not end');
      await quietly(bench.close(), log, 'the thread of the bench plan did not end');
      await quietly(dataSource.query('PRAGMA wal_checkpoint(TRUNCATE)'), log, 'the write-ahead log was not emptied');
      await quietly(dataSource.destroy(), log, 'the database did not close');
    };
    return { address: addressOf(config, port), port, deps, stop };
  } catch (error) {
    await passwords.close();
    await bench.close();
    await dataSource.destroy();
    throw error;
  }
}
