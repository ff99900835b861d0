// Bounds of the stored workshops by a mixed integer program, offline: `npx tsx tests/bench/offline/bench-bounds.ts 120`
// gives each at most 120 s of HiGHS and writes what it proved into tests/calc/reference/bench-instances.json.
import { planBench } from '@/calc/index';
import { benchInstance } from '../../calc/reference/bench-instances';
import { benchMilp } from './bench-milp';
import { kept, keep } from './kept';
import { solveMilp } from './solve';

const most = Number(process.argv[2] ?? 600);
const seeds = process.argv.slice(3).map(Number);
for (const seed of seeds.length > 0 ? seeds : Array.from({ length: 20 }, (_, at) => at + 1)) {
  const problem = benchInstance(seed);
  const plan = planBench(problem, { maxNodes: 3_000_000 });
  const planHours = plan.weightedTardinessS / 3600;
  const { bound, seconds, finished, found } = await solveMilp(benchMilp(problem, plan), most, 0.002);
  const before = kept().bench.find((one) => one.seed === seed);
  const boundHours = Math.max(0, Math.floor(bound * 1e4) / 1e4);
  console.log(
    `${seed}: plan ${planHours.toFixed(2)} h, HiGHS ${found?.toFixed(2)} h, bound ${boundHours} h in ${seconds.toFixed(0)} s${finished ? ', done' : ''}`,
  );
  if (before && before.boundHours >= boundHours) continue;
  keep('bench', { seed, boundHours, seconds: Math.round(seconds), date: new Date().toISOString().slice(0, 10) });
}
