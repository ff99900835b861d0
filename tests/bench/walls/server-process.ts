/** The server as it is started, in a process of its own, on a clock that the bench moves on: node … <data folder> <port>. */
import 'reflect-metadata';
import { systemClock } from '@/server/clock';
import { readConfig } from '@/server/config';
import type { SleeperLoop } from '@/server/live/sleeper-loop';
import type { SocketHub } from '@/server/live/socket-hub';
import { makeLog } from '@/server/middleware/request-log';
import { signAccessToken } from '@/server/services/access-token';
import { startServer } from '@/server/start-server';
import { answerQuestions, preciseNow } from './processes';
import { technician } from './world';

const [folder, port] = process.argv.slice(2);
let ahead = 0;
const clock = { now: () => systemClock.now() + ahead };
const config = readConfig({
  ...{ PORT: port, BIDEWELL_HOST: '127.0.0.1', BIDEWELL_DATA: folder, BIDEWELL_WEB: 'none' },
  ...{ BIDEWELL_DEMO: 'off', BIDEWELL_BACKUP_HOURS: '0', BIDEWELL_LOG: 'info' },
});
const running = await startServer(config, makeLog('error'), clock);
const hub = running.deps.hub as SocketHub;
const sleeper = running.deps.sleeper as SleeperLoop;

/** When each board revision was committed and told to the hub, epoch ms. */
const told: [rev: number, at: number][] = [];
const { toWorkshop } = hub;
hub.toWorkshop = (workshopId, event, payload) => {
  if (event === 'board:changed') told.push([(payload as { rev: number }).rev, preciseNow()]);
  toWorkshop(workshopId, event, payload);
};

answerQuestions({
  cookie: () => `bidewell_access=${signAccessToken(running.deps.secrets, technician, clock.now())}`,
  told: () => told.splice(0),
  /** A step of fast clock: time goes on, the heartbeat beats, what fell due is done. */
  advance: async (ms: number) => {
    ahead += ms;
    await hub.beat();
    await sleeper.runDue();
  },
  heapBytes: () => {
    globalThis.gc?.();
    globalThis.gc?.();
    return process.memoryUsage().heapUsed;
  },
  cpuMs: () => {
    const { user, system } = process.cpuUsage();
    return (user + system) / 1000;
  },
});
