// Bounds of the stored days' fills, offline: `npx tsx tests/bench/offline/fill-bounds.ts 120` gives each at most 120 s of
// HiGHS and writes what it proved into tests/calc/reference/bench-instances.json.
import { planFills } from '@/calc/index';
import { fillInstance } from '../../calc/reference/bench-instances';
import { fillMilp } from './fill-milp';
import { kept, keep } from './kept';
import { solveMilp } from './solve';

const most = Number(process.argv[2] ?? 600);
const seeds = process.argv.slice(3).map(Number);
for (const seed of seeds.length > 0 ? seeds : [1, 2, 3, 4, 5, 6]) {
  const problem = fillInstance(seed);
  const plan = planFills(problem);
  const { bound, seconds, finished, found } = await solveMilp(fillMilp(problem), most, 0.0005);
  const boundMinutes = Math.ceil(bound * 100) / 100;
  console.log(
    `${seed}: plan ${plan.weightedMinutes.toFixed(1)}, own bound ${plan.bound.toFixed(1)}, HiGHS ${found?.toFixed(1)}, bound ${boundMinutes} in ${seconds.toFixed(0)} s${finished ? ', done' : ''}`,
  );
  const before = kept().fills.find((one) => one.seed === seed);
  if (before && before.boundMinutes <= boundMinutes) continue;
  keep('fills', { seed, boundMinutes, seconds: Math.round(seconds), date: new Date().toISOString().slice(0, 10) });
}
