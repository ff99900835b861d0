/** Days of a busy workshop on a clock moved by hand; what must always be true is looked at after every single event. */
import { expect, test } from 'vitest';
import { liveWeek, type WeekTold } from './week';

/** A workshop in which nothing happens keeps every promise. */
function isBusy({ acts, charges, transitions, alerts }: WeekTold, days: number): void {
  expect(charges).toBeGreaterThanOrEqual(8 * days);
  expect(transitions).toBeGreaterThanOrEqual(35 * days);
  expect(alerts).toBeGreaterThanOrEqual(35 * days);
  const usual = [
    'start',
    'hold',
    'resume',
    'next-step',
    'current-off',
    'rest-check',
    'look-ins',
    'readings',
    'fit',
    'shelve',
  ];
  for (const act of usual) expect(acts[act] ?? 0, act).toBeGreaterThan(0);
}

test('a week that loses an hour to summer time: no channel has two charges, no cause two alerts, no sleep is too long, every look-in is asked for, and all times add up', async () => {
  const told = await liveWeek({ from: '2026-03-22T23:00:00.000Z', days: 7, seed: 1 });
  isBusy(told, 7);
  console.info(JSON.stringify(told));
}, 300_000);

test('two days around the hour that comes twice: the same holds', async () => {
  const told = await liveWeek({ from: '2026-10-23T22:00:00.000Z', days: 2, seed: 2 });
  isBusy(told, 2);
  console.info(JSON.stringify(told));
}, 200_000);

test('three days in which the clock of the server is set an hour ahead or back six times a day: the same holds', async () => {
  const told = await liveWeek({ from: '2026-06-07T22:00:00.000Z', days: 3, seed: 3, jumpsADay: 6 });
  isBusy(told, 3);
  expect(told.jumps).toBeGreaterThanOrEqual(15);
  console.info(JSON.stringify(told));
}, 200_000);
