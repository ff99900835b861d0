import { chargeThroughTerminals, planCharge, reckonCharge, type LiveReading, type PlanInput } from '@/calc/index';
import { fileURLToPath } from 'node:url';
import { reckonInput } from '../calc/live-fixtures';
import { lmoModule, lmoSpare, planInput } from '../calc/plan-fixtures';
import { calibrate, heldText, pooled, TWISTS } from '../calc/reference/calibration';
import { watchClean } from '../calc/reference/clean-charges';
import { LMO_BLEND } from '../calc/reference/curves';
import { lmoGroup, stepOf } from '../calc/reference/modules';
import { currentOf, integrateAgain } from '../calc/reference/second-integrator';
import { spreadsOf } from '../calc/reference/world-spreads';
import { Chance, drawWorld } from '../calc/reference/worlds';

/** The two yardsticks: one step through a taper by mathjs's solveODE, and by Runge–Kutta of order 4 in steps of 10 s. */
const yardstick = stepOf(
  [lmoGroup(3.75), lmoGroup(3.75)],
  LMO_BLEND,
  { maxAmps: 10, setVolts: 7.84 },
  { cutoffAmps: 0.66 },
);
const stopAtS = chargeThroughTerminals(yardstick).stopAtS;

/** State of charge and over-voltage of each group after `seconds`, by the classic method in fixed steps. */
export function rungeKutta4(seconds: number, dt: number): number[] {
  const { groups } = yardstick;
  const n = groups.length;
  const rates = (y: number[]): number[] => {
    const amps = currentOf(yardstick, y.slice(0, n), y.slice(n));
    return [
      ...groups.map((group) => amps / (3600 * group.capacityAh)),
      ...groups.map(
        (group, at) => (amps * group.polarisationResistanceOhm - y[n + at]!) / group.polarisationTimeConstantS,
      ),
    ];
  };
  const along = (y: number[], by: number[], h: number): number[] => y.map((one, at) => one + h * by[at]!);
  let y = [...integrateAgain(yardstick, 1).state[0]!.slice(0, 2 * n)];
  for (let s = 0; s < seconds; s += dt) {
    const h = Math.min(dt, seconds - s);
    const a = rates(y);
    const b = rates(along(y, a, h / 2));
    const c = rates(along(y, b, h / 2));
    const d = rates(along(y, c, h));
    y = y.map((one, at) => one + (h / 6) * (a[at]! + 2 * b[at]! + 2 * c[at]! + d[at]!));
  }
  return y;
}

/** A plan of one way, its band of 256 samples, and one live update with few and with many readings. */
export function benchLive(): Promise<string[]> {
  const ode = fastest(() => integrateAgain(yardstick, stopAtS, 1e-4, 2000), 1, 5);
  const rk4 = fastest(() => rungeKutta4(stopAtS, 10), 1, 5);
  const ratio = (ms: number): string =>
    `${(ode / ms).toFixed(2)} times solveODE's one run, ${(rk4 / ms).toFixed(2)} times RK4's`;
  const lines = [
    `yardsticks: one step by solveODE at 1e-4 ${ode.toFixed(1)} ms, by fixed-step RK4 at 10 s ${rk4.toFixed(1)} ms`,
  ];
  for (const [name, input] of plans) {
    for (const finish of ['over-and-settle', 'on-the-mark'] as const) {
      const option = planCharge(input).options.find((one) => one.way === 'terminals' && one.finish === finish)!;
      // Only the way through the terminals: its own step, its band and its sentences, less the same without the band.
      const whole = fastest(() => reckonCharge(reckonInput({ ...input, samples: 256 }, option)), 5, 12);
      const bare = fastest(() => reckonCharge(reckonInput({ ...input, samples: 1 }, option)), 5, 12);
      lines.push(
        `band of one way with 256 samples, ${name}, ${finish}: ${(whole - bare).toFixed(2)} ms; ${ratio(whole - bare)}`,
      );
      for (const count of [8, 100, 1000]) {
        const readings = readingsOf(input, option, count);
        const live = reckonInput(input, option, { nowS: 5400, readings });
        const ms = fastest(() => reckonCharge(live), 5, 12);
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

/**
 * The 4,000 charges of the calibration, 1,000 each in worlds the code was not told of, and 100 h of clean charges either way.
 * Some minutes.
 */
export function benchCalibration(): Promise<string[]> {
  const lines = ['the 80 % band against charges of the integrator with a random source of its own'];
  for (const twist of Object.keys(TWISTS)) {
    const each = twist === 'as stated' ? 1000 : 250;
    lines.push(...heldText(twist, pooled([1, 2, 3, 4].map((seed) => calibrate(seed, each, twist)))));
  }
  for (const [name, everyS, lookEvery] of [
    ['by hand every 15 min', 900, 1],
    ['by a logger at 10 s', 10, 8],
  ] as const) {
    const { hours, alarms } = watchClean(everyS, lookEvery, 40);
    lines.push(`clean charges read ${name}: ${alarms} false alarms in ${hours.toFixed(0)} h`);
  }
  return Promise.resolve(lines);
}

/** Milliseconds of one run: the least mean of several batches, which other work on the machine disturbs least. */
function fastest(run: () => unknown, runs: number, batches: number): number {
  let best = Infinity;
  for (let batch = 0; batch < batches; batch += 1) {
    const start = performance.now();
    for (let at = 0; at < runs; at += 1) run();
    best = Math.min(best, (performance.now() - start) / runs);
  }
  return best;
}

if (process.argv[1] === fileURLToPath(import.meta.url)) for (const line of await benchLive()) console.log(line);
