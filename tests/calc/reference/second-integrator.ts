import { socAtVolts, voltsAtSoc, type StepInput } from '@/calc/index';
import * as mathjs from 'mathjs';

/** Not in the library's own type declarations. */
const { solveODE } = mathjs as unknown as {
  solveODE: (
    rates: (t: number, y: number[]) => number[],
    span: [number, number],
    start: number[],
    options: Record<string, unknown>,
  ) => { t: number[]; y: number[][] };
};

/** The course of a step as an explicit Runge–Kutta method of order 5 gives it, straight from the equations. */
export interface Course {
  s: number[];
  /** At each moment: state of charge and over-voltage of every group, ampere-hours, watt-hours. */
  state: number[][];
}

/**
 * The current of calc.md §2 written down once more, apart from the code under test: the least of all limits, never of
 * the other sign. Charging positive.
 */
export function currentOf(input: StepInput, soc: number[], over: number[]): number {
  const { groups, source, direction } = input;
  const sign = direction === 'charge' ? 1 : -1;
  const rest = soc.map((z) => voltsAtSoc(input.curve, z));
  const emf = sum(rest) + sum(over);
  const ohm = sum(groups.map((group) => group.ohmicResistanceOhm)) + input.linkResistanceOhm + source.leadResistanceOhm;
  const limits: number[] = [];
  if (source.maxAmps !== null) limits.push(source.maxAmps);
  if (source.maxWatts !== null)
    limits.push((2 * source.maxWatts) / (emf + Math.sqrt(emf * emf + 4 * sign * ohm * source.maxWatts)));
  if (source.setVolts !== null) limits.push((sign * (source.setVolts - emf)) / ohm);
  if (source.loadOhm !== null) limits.push(emf / (ohm + source.loadOhm));
  if (source.heldGroupVolts !== null)
    groups.forEach((group, i) =>
      limits.push((sign * (source.heldGroupVolts! - rest[i]! - over[i]!)) / group.ohmicResistanceOhm),
    );
  return sign * Math.max(0, Math.min(...limits));
}

/** Voltage at the module's terminals, V. */
export function terminalVoltsOf(input: StepInput, soc: number[], over: number[]): number {
  const ohm = sum(input.groups.map((group) => group.ohmicResistanceOhm)) + input.linkResistanceOhm;
  return sum(soc.map((z) => voltsAtSoc(input.curve, z))) + sum(over) + currentOf(input, soc, over) * ohm;
}

/** Integrates a step for `seconds` with mathjs's solveODE, whatever its stops. */
export function integrateAgain(input: StepInput, seconds: number, tolerance = 1e-7, maxStep = 120): Course {
  const { groups, direction } = input;
  const n = groups.length;
  const efficiency = direction === 'charge' ? input.coulombicEfficiency : 1;
  const rates = (_: number, y: number[]): number[] => {
    const soc = y.slice(0, n);
    const over = y.slice(n, 2 * n);
    const amps = currentOf(input, soc, over);
    return [
      ...groups.map((group) => (efficiency * amps) / (3600 * group.capacityAh)),
      ...groups.map((g, i) => (amps * g.polarisationResistanceOhm - over[i]!) / g.polarisationTimeConstantS),
      Math.abs(amps) / 3600,
      (Math.abs(amps) * terminalVoltsOf(input, soc, over)) / 3600,
    ];
  };
  const start = [
    ...groups.map((group) => socAtVolts(input.curve, group.restVolts)),
    ...groups.map((group) => group.polarisationVolts ?? 0),
    0,
    0,
  ];
  const options = { method: 'RK45', tol: tolerance, firstStep: 1, maxStep, minStep: 1e-4, maxIter: 1e6 };
  const { t, y } = solveODE(rates, [0, seconds], start, options);
  return { s: t, state: y };
}

function sum(values: number[]): number {
  return values.reduce((total, value) => total + value, 0);
}
