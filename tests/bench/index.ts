// `npm run bench`. Figures of this machine, to be read, not to pass or fail: that is what the tests are for.
import os from 'node:os';
import { benchAlarms } from './alarms';
import { benchBenchPlan } from './bench-plan';
import { benchCalibration } from './calibration';
import { benchCandidates } from './candidates';
import { benchFirstLoad } from './first-load';
import { benchLive } from './live';
import { benchPlan } from './plan';
import { benchReplay } from './replay';
import { benchStep } from './step';
import { benchWaits } from './waits';

/** Under a minute together. */
const quick = {
  step: benchStep,
  plan: benchPlan,
  live: benchLive,
  'bench-plan': benchBenchPlan,
  candidates: benchCandidates,
  replay: benchReplay,
  'first-load': benchFirstLoad,
};
/** Minutes each, and so only by name. */
const slow = { calibration: benchCalibration, alarms: benchAlarms, waits: benchWaits };
const benches: Record<string, () => AsyncIterable<string> | Promise<string[]>> = { ...quick, ...slow };

const asked = process.argv.slice(2);
const unknown = asked.filter((name) => !(name in benches));
if (unknown.length > 0) {
  console.error(`No bench is called ${unknown.join(', ')}. There are: ${Object.keys(benches).join(', ')}.`);
  process.exit(1);
}

console.log(`Node ${process.versions.node}, ${os.cpus().length} cores, ${os.cpus()[0]?.model ?? 'unknown processor'}`);
for (const name of asked.length > 0 ? asked : Object.keys(quick))
  for await (const line of await benches[name]!()) console.log(line);
