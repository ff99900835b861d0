import type http from 'node:http';
import type { AddressInfo } from 'node:net';
import type { Logger } from 'pino';
import type { DataSource } from 'typeorm';
import { makeDispatcher } from './alerts/dispatcher';
import { makeWays } from './alerts/ways/all';
import { systemClock, type Clock } from './clock';
import { isEveryAddress, type Config } from './config';
import { createApp } from './create-app';
import { assertDurable, makeDataSource } from './data-source';
import { databaseFile, prepareDataFolder } from './data-files';
import { startOutside, type Outside } from './demo/outside/outside';
import { seedDemo } from './demo/seed';
import type { Deps } from './deps';
import { lockFolder, type FolderLock } from './folder-lock';
import type { Lifecycle } from './lifecycle';
import { makeHttpServer } from './http-server';
import { makeSleeper } from './live/sleeper-loop';
import { makeSocketHub } from './live/socket-hub';
import { proxyMetroUpgrades } from './middleware/metro-proxy';
import { queryLog } from './middleware/query-log';
import { migrate } from './migrate';
import { earliestDueAt } from './repositories/charges.repository';
import { makeBackups } from './services/backups';
import { makeBenchSolver } from './services/bench-plan/bench-solver';
import { makeLimits } from './services/limits';
import { makeMetrics } from './services/metrics';
import { makePasswords } from './services/passwords';
import { loadSecrets } from './services/secrets';
import { inTransaction } from './services/unit-of-work';
import { version } from './services/version';
import { fillWaits } from './services/waits/fill-waits';
import { makeWaitsSolver } from './services/waits/waits-solver';
import { makeWeeklyDigests } from './services/waits/weekly-digests';
import { wallBoard } from './services/board.service';
import { makeWallBoards } from './services/wall-boards';
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
  const lock = lockFolder(config.dataDir);
  try {
    return await startLocked(config, log, clock, lock);
  } catch (error) {
    lock.release();
    throw error;
  }
}

/** What is read whenever the figures of the process are asked for. */
function watchProcess({ metrics, hub, backups, clock, dataSource }: Deps): void {
  const secondsSince = (at: number): number => Math.max(0, (clock.now() - at) / 1000);
  metrics.watch('sockets', () => hub.connected(null));
  metrics.watch('backup_age_seconds', () => {
    const [newest] = backups.state().copies;
    return newest ? secondsSince(newest.at) : -1;
  });
  metrics.watch('sleeper_behind_seconds', async () => {
    const dueAt = await earliestDueAt(dataSource.manager, []);
    return dueAt === null ? 0 : secondsSince(dueAt);
  });
}

async function startLocked(config: Config, log: Logger, clock: Clock, lock: FolderLock): Promise<RunningServer> {
  const secrets = loadSecrets(config.dataDir);
  const metrics = makeMetrics(version);
  const dataSource = await makeDataSource(databaseFile(config.dataDir), queryLog(log, metrics)).initialize();
  const lifecycle: Lifecycle = { ready: false, startedAt: clock.now() };
  const passwords = makePasswords();
  const bench = makeBenchSolver();
  const waits = makeWaitsSolver();
  let outside: Outside | null = null;
  try {
    await assertDurable(dataSource);
    const migrations = await migrate(dataSource, config.dataDir, clock.now(), log);
    if (migrations.length > 0) log.info({ migrations }, 'database migrated');
    const wallBoards = makeWallBoards((workshopId, now) => wallBoard({ dataSource }, workshopId, now));
    const hub = makeSocketHub({ config, dataSource, secrets, clock, log, wallBoards });
    if (config.demo && config.mail) log.warn('the demo keeps its letters: BIDEWELL_SMTP_URL is not used');
    outside = config.demo ? await startOutside(secrets.demoKey, clock) : null;
    const ways = outside === null ? makeWays(config) : makeWays({ ...config, mail: outside.mail }, outside);
    const dispatcher = makeDispatcher({ dataSource, clock, log, hub, ways, random: Math.random });
    const digests = makeWeeklyDigests({ dataSource, clock, log, config, secrets, ways, random: Math.random });
    const outbox = { poke: dispatcher.poke, pushKey: ways.pushKey, eMail: ways.eMail !== null };
    const sleeper = makeSleeper({ dataSource, clock, log, hub, outbox });
    const limits = makeLimits();
    const { dataDir, backupHours: everyHours } = config;
    const backups = makeBackups({ dataDir, everyHours, clock, log });
    const deps: Deps = {
      dataSource,
      clock,
      config,
      log,
      hub,
      wallBoards,
      sleeper,
      outbox,
      lifecycle,
      passwords,
      bench,
      waits,
      secrets,
      limits,
      backups,
      metrics,
      outside,
    };
    if (config.demo) await seedDemo(deps);
    const filled = await inTransaction(deps, fillWaits);
    if (filled > 0) log.info({ charges: filled }, 'waits of finished charges written down');
    const app = createApp(deps);
    const server = makeHttpServer(config, app);
    hub.attach(server);
    if (config.metroPort !== null) proxyMetroUpgrades(server, config.metroPort);
    await quietly(sweptPhotos(dataSource, config, clock.now(), log), log, 'the photos were not swept');
    await sleeper.start();
    const port = await listenOn(server, config);
    // What waits goes out beside the start: a mail server that does not answer must not keep the workshop waiting.
    const sending = quietly(dispatcher.start(), log, 'the dispatcher did not start');
    const telling = quietly(digests.start(), log, 'the weekly digest did not start');
    lifecycle.ready = true;
    watchProcess(deps);
    backups.start();
    const stop = async () => {
      lifecycle.ready = false;
      const drained = setTimeout(() => server.closeAllConnections(), drainMs);
      await quietly(backups.stop(), log, 'the copying did not stop');
      await quietly(sleeper.stop(), log, 'the sleeper did not stop');
      await quietly(dispatcher.stop(), log, 'the dispatcher did not stop');
      await quietly(digests.stop(), log, 'the weekly digest did not stop');
      await Promise.all([sending, telling]);
      ways.close();
      await quietly(outside?.close() ?? Promise.resolve(), log, 'the services of the demo did not close');
      // Closes the sockets and the server's port; resolves when the last request under way has ended.
      await quietly(hub.close(), log, 'the sockets did not close');
      clearTimeout(drained);
      await quietly(passwords.close(), log, 'the hashing threads did not end');
      await quietly(bench.close(), log, 'the thread of the bench plan did not end');
      await quietly(waits.close(), log, 'the thread of the waits did not end');
      await quietly(dataSource.query('PRAGMA wal_checkpoint(TRUNCATE)'), log, 'the write-ahead log was not emptied');
      await quietly(dataSource.destroy(), log, 'the database did not close');
      metrics.close();
      lock.release();
    };
    return { address: addressOf(config, port), port, deps, stop };
  } catch (error) {
    await outside?.close();
    await passwords.close();
    await bench.close();
    await waits.close();
    await dataSource.destroy();
    throw error;
  }
}
