import { chargeThroughTerminals, type StepInput } from '@/calc/index';
import { fileURLToPath } from 'node:url';
import { LMO_BLEND, NMC } from '../calc/reference/curves';
import { lmoGroup, stepOf } from '../calc/reference/modules';
import { integrateAgain } from '../calc/reference/second-integrator';
import { fastest } from './fastest';

/** On the mark, through a taper: the dearest kind of step. */
const steps: { name: string; input: StepInput }[] = [
  {
    name: '2 equal groups on the mark to C/100',
    input: stepOf([lmoGroup(3.75), lmoGroup(3.75)], LMO_BLEND, { maxAmps: 10, setVolts: 7.84 }, { cutoffAmps: 0.66 }),
  },
  {
    name: '4 unequal groups, one held, to 3 A',
    input: stepOf(
      [3.62, 3.63, 3.69, 3.62].map((volts, i) => ({ ...lmoGroup(volts), capacityAh: 140 + 3 * i })),
      NMC,
      { maxAmps: 30, setVolts: 16.6, heldGroupVolts: 3.9 },
      { cutoffAmps: 3 },
    ),
  },
];

/** Closer than this share of charge nobody asks for; being there by luck is not to count for the step. */
const ENOUGH = 1e-6;

/** Ratio that the step is asked to be ahead by. */
const WANTED = 50;

/**
 * Times one step against mathjs's solveODE over the same equations, at the loosest of its tolerances that is no less
 * exact in charge at the end. The step finds its own end; solveODE is told it.
 *
 * @returns lines to print
 */
export function benchStep(): Promise<string[]> {
  return Promise.resolve(steps.map(benchOne));
}

function benchOne({ name, input }: (typeof steps)[number]): string {
  const result = chargeThroughTerminals(input);
  const chargeAtEnd = (tolerance: number) => integrateAgain(input, result.stopAtS, tolerance, 2000).state.at(-1)![0]!;
  const exact = chargeAtEnd(1e-10);
  const missed = Math.abs(result.groups[0]!.soc - exact);
  const tolerance = [1e-1, 1e-2, 1e-3, 1e-4, 1e-5, 1e-6, 1e-7, 1e-8].find(
    (one) => Math.abs(chargeAtEnd(one) - exact) <= Math.max(missed, ENOUGH),
  );
  const ours = fastest(() => chargeThroughTerminals(input), 200, 20);
  const theirs = fastest(() => chargeAtEnd(tolerance ?? 1e-8), 3, 3);
  const ratio = theirs / ours;
  const verdict = ratio >= WANTED ? '' : `  (wanted: ${WANTED})`;
  return (
    `one step, ${name}: ${(1000 * ours).toFixed(0)} µs, off by ${missed.toExponential(1)} of charge; ` +
    `solveODE at tolerance ${(tolerance ?? 1e-8).toExponential(0)}: ${theirs.toFixed(1)} ms; ${ratio.toFixed(0)} times faster${verdict}`
  );
}

if (process.argv[1] === fileURLToPath(import.meta.url)) for (const line of await benchStep()) console.log(line);
