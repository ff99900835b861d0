import { planCharge, reckonCharge, type LiveReading, type PlanInput } from '@/calc/index';
import { fileURLToPath } from 'node:url';
import { reckonInput } from '../calc/live-fixtures';
import { lmoModule, lmoSpare, planInput } from '../calc/plan-fixtures';
import { spreadsOf } from '../calc/reference/world-spreads';
import { Chance, drawWorld } from '../calc/reference/worlds';
import { fastest } from './fastest';
import { ratioText, yardsticks } from './yardsticks';

/** A plan of one way, its band of 256 samples, and one live update with few and with many readings. */
export function benchLive(): Promise<string[]> {
  const measured = yardsticks();
  const lines = [measured.text];
  const ratio = (ms: number): string => ratioText(ms, measured);
  for (const [name, input] of plans) {
    for (const finish of ['over-and-settle', 'on-the-mark'] as const) {
      const option = planCharge(input).options.find((one) => one.way === 'terminals' && one.finish === finish)!;
      // Only the way through the terminals: its own step, its band and its sentences, less the same without the band.
      const whole = fastest(() => reckonCharge(reckonInput({ ...input, samples: 256 }, option)), 1, 30);
      const bare = fastest(() => reckonCharge(reckonInput({ ...input, samples: 1 }, option)), 1, 30);
      lines.push(
        `band of one way with 256 samples, ${name}, ${finish}: ${(whole - bare).toFixed(2)} ms; ${ratio(whole - bare)}`,
      );
      for (const count of [8, 100, 1000]) {
        const readings = readingsOf(input, option, count);
        const live = reckonInput(input, option, { nowS: 5400, readings });
        const ms = fastest(() => reckonCharge(live), 1, 30);
        lines.push(`a live update with ${count} readings, ${name}, ${finish}: ${ms.toFixed(2)} ms; ${ratio(ms)}`);
      }
    }
  }
  return Promise.resolve(lines);
}

const plans: [string, PlanInput][] = [
  ['2 groups', planInput()],
  [
    '12 groups, all different',
    planInput({
      module: { ...lmoModule, groupsInSeries: 12 },
      spare: { ...lmoSpare, groupVolts: Array.from({ length: 12 }, (_, at) => 3.75 + 0.0003 * at) },
    }),
  ],
];

function readingsOf(input: PlanInput, option: Parameters<typeof drawWorld>[1], count: number): LiveReading[] {
  const world = drawWorld(input, option, spreadsOf(input), new Chance(3))!;
  return world.readAt(
    Array.from({ length: count }, (_, k) => (5400 * (k + 1)) / count),
    new Chance(4),
  );
}

if (process.argv[1] === fileURLToPath(import.meta.url)) for (const line of await benchLive()) console.log(line);
