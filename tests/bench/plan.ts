import { chargeThroughTerminals, planCharge, reckonCharge, type PlanInput } from '@/calc/index';
import { DEFAULT_SAMPLES } from '@/calc/plan/plan-model';
import { fileURLToPath } from 'node:url';
import { reckonInput } from '../calc/live-fixtures';
import { lmoModule, lmoSpare, planInput, sixChannels } from '../calc/plan-fixtures';
import { LMO_BLEND } from '../calc/reference/curves';
import { lmoGroup, stepOf } from '../calc/reference/modules';
import { fastest } from './fastest';
import { ratioText, yardsticks } from './yardsticks';

const plans: { name: string; input: PlanInput }[] = [
  { name: '2 groups', input: planInput({ channels: sixChannels }) },
  {
    name: '12 groups, one low',
    input: planInput({
      channels: sixChannels,
      module: { ...lmoModule, groupsInSeries: 12 },
      spare: { ...lmoSpare, groupVolts: [3.71, ...Array.from({ length: 11 }, (_, at) => 3.75 + 0.0002 * at)] },
    }),
  },
];

/**
 * Times a whole plan, all ways, finishes and six channels with their bands, against the same plan's nominal run alone
 * (one sample), and against one single step of the core through a taper; then one reckoning of a running charge.
 *
 * @returns lines to print
 */
export function benchPlan(): Promise<string[]> {
  const step = stepOf(
    [lmoGroup(3.75), lmoGroup(3.75)],
    LMO_BLEND,
    { maxAmps: 10, setVolts: 7.84 },
    { cutoffAmps: 0.66 },
  );
  const stepMs = fastest(() => chargeThroughTerminals(step), 200, 20);
  return Promise.resolve([...plans.map((plan) => benchOne(plan, stepMs)), benchReckoning()]);
}

function benchOne({ name, input }: (typeof plans)[number], stepMs: number): string {
  const { options } = planCharge(input);
  const whole = fastest(() => planCharge(input), 3, 10);
  const nominal = fastest(() => planCharge({ ...input, samples: 1 }), 3, 10);
  return (
    `a plan, ${name}, six channels: ${whole.toFixed(1)} ms for ${options.length} ways with bands of ${DEFAULT_SAMPLES} samples; ` +
    `${(whole / nominal).toFixed(2)} times its nominal run alone (${nominal.toFixed(1)} ms), ` +
    `${(whole / stepMs).toFixed(0)} times one on-the-mark step of the core (${(1000 * stepMs).toFixed(0)} µs); ` +
    ratioText(whole, yardsticks())
  );
}

function benchReckoning(): string {
  const input = planInput({ channels: sixChannels });
  const option = planCharge(input).options.find((one) => one.id === 'terminals/on-the-mark/id-B1')!;
  const readings = Array.from({ length: 20 }, (_, at) => ({
    s: 120 * (at + 1),
    terminalVolts: 7.6 + 0.01 * at,
    amps: 20,
    celsius: 25,
    groupVolts: null,
  }));
  const live = reckonInput(input, option, { nowS: 2500, readings });
  const ms = fastest(() => reckonCharge(live), 10, 10);
  return `a reckoning of a running charge with 20 readings: ${ms.toFixed(2)} ms; ${ratioText(ms, yardsticks())}`;
}

if (process.argv[1] === fileURLToPath(import.meta.url)) for (const line of await benchPlan()) console.log(line);
