import { chargeThroughTerminals } from '@/calc/index';
import { LMO_BLEND } from '../calc/reference/curves';
import { lmoGroup, stepOf } from '../calc/reference/modules';
import { currentOf, integrateAgain } from '../calc/reference/second-integrator';
import { fastest } from './fastest';

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

export interface Yardsticks {
  odeMs: number;
  rk4Ms: number;
  text: string;
}

let known: Yardsticks | null = null;

/** Milliseconds of the two, measured once a run. */
export function yardsticks(): Yardsticks {
  if (known) return known;
  const odeMs = fastest(() => integrateAgain(yardstick, stopAtS, 1e-4, 2000), 1, 5);
  const rk4Ms = fastest(() => rungeKutta4(stopAtS, 10), 1, 5);
  const text = `yardsticks: one step by solveODE at 1e-4 ${odeMs.toFixed(1)} ms, by fixed-step RK4 at 10 s ${rk4Ms.toFixed(1)} ms`;
  return (known = { odeMs, rk4Ms, text });
}

/** One run of each yardstick as a multiple of so many milliseconds. */
export const ratioText = (ms: number, { odeMs, rk4Ms }: Yardsticks): string =>
  `solveODE's one run takes ${(odeMs / ms).toFixed(2)} times as long, RK4's ${(rk4Ms / ms).toFixed(2)} times`;
