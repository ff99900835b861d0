/** Run by the kill test as a process of its own: the sleeper over a database file, on a clock that runs fast. */
import 'reflect-metadata';
import { makeDataSource } from '@/server/data-source';
import { makeSleeper } from '@/server/live/sleeper-loop';
import { makeLog } from '@/server/middleware/request-log';

const [file, startAt, begunAt, speed, endAt] = process.argv.slice(2);
const end = Number(endAt);
// One clock over all processes: it goes on while nobody runs.
const now = (): number => Math.min(end, Number(startAt) + (Date.now() - Number(begunAt)) * Number(speed));

const dataSource = await makeDataSource(file!).initialize();
const sleeper = makeSleeper({
  dataSource,
  clock: { now },
  log: makeLog('silent'),
  hub: {
    toWorkshop: (_, event, payload) => {
      if (event === 'alert:raised') process.stdout.write(`told ${(payload as { id: string }).id}\n`);
    },
    toPerson: () => {},
    connected: () => 0,
    end: () => {},
  },
  outbox: { poke: () => {}, pushKey: '', eMail: false },
});
process.stdout.write('up\n');
while (now() < end) {
  await sleeper.runDue();
  await new Promise((resolve) => setTimeout(resolve, 5));
}
await sleeper.runDue();
await dataSource.destroy();
process.stdout.write('done\n');
