// `npm run bench`. Figures of this machine, to be read, not to pass or fail: that is what the tests are for.
import os from 'node:os';
import { benchFirstLoad } from './first-load';
import { benchCalibration, benchLive } from './live';
import { benchPlan } from './plan';
import { benchStep } from './step';

const benches = {
  step: benchStep,
  plan: benchPlan,
  live: benchLive,
  calibration: benchCalibration,
  'first-load': benchFirstLoad,
};
const wanted = process.argv.slice(2);

console.log(`Node ${process.versions.node}, ${os.cpus().length} cores, ${os.cpus()[0]?.model ?? 'unknown processor'}`);
for (const [name, bench] of Object.entries(benches)) {
  if (wanted.length > 0 && !wanted.includes(name)) continue;
  for (const line of await bench()) console.log(line);
}
