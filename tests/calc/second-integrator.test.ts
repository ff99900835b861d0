import { chargeThroughTerminals, voltsAtSoc, type CellGroup, type StepInput } from '@/calc/index';
import { describe, expect, it } from 'vitest';
import { LFP, LMO_BLEND, NIMH, NMC } from './reference/curves';
import { currentOf, integrateAgain, terminalVoltsOf } from './reference/second-integrator';
import { SERIES_CASES } from './reference/worked-cases';

/*
 * Origin of the expected values: mathjs's solveODE (Runge–Kutta 5(4), tolerance 1e-7) over the equations of a step,
 * written a second time in reference/second-integrator.ts. The moments of the stops come out of the code under test;
 * what is checked is that the stop's condition holds there, did not hold before, and that the states agree.
 */

const group = (capacityAh: number, restVolts: number, more: Partial<CellGroup> = {}): CellGroup => ({
  capacityAh,
  restVolts,
  ohmicResistanceOhm: 0.053 / capacityAh,
  polarisationResistanceOhm: 0.079 / capacityAh,
  polarisationTimeConstantS: 300,
  ...more,
});

const step = (input: Partial<StepInput> & Pick<StepInput, 'groups' | 'curve'>): StepInput => ({
  linkResistanceOhm: 0,
  coulombicEfficiency: 1,
  direction: 'charge',
  source: { maxAmps: 10, setVolts: null, maxWatts: null, leadResistanceOhm: 0, heldGroupVolts: null, loadOhm: null },
  stop: { relaxedVolts: null, toleranceVolts: 0, cutoffAmps: null, groupVolts: null },
  settledVolts: 0.004,
  ...input,
});

const free = { setVolts: null, maxWatts: null, leadResistanceOhm: 0, heldGroupVolts: null, loadOhm: null };
const open = { relaxedVolts: null, toleranceVolts: 0, cutoffAmps: null, groupVolts: null };

const cases: { name: string; outcome: string; limitingGroup: number | null; input: StepInput }[] = [
  {
    name: 'leads of 20 mΩ and a supply that senses its own terminals, on the mark',
    outcome: 'target',
    limitingGroup: null,
    input: step({
      groups: [group(66, 3.75), group(66, 3.75)],
      curve: LMO_BLEND,
      source: { ...free, maxAmps: 10, setVolts: 7.84, leadResistanceOhm: 0.02 },
      stop: { ...open, relaxedVolts: 7.84, toleranceVolts: 0.004 },
    }),
  },
  {
    name: 'the third of four unequal groups held at 3.90 V under current, to an end current of 3 A',
    outcome: 'cutoff',
    limitingGroup: 2,
    input: step({
      groups: [group(150, 3.62), group(148, 3.63), group(139, 3.69), group(151, 3.62)],
      curve: NMC,
      linkResistanceOhm: 0.0004,
      source: { ...free, maxAmps: 30, setVolts: 16.6, heldGroupVolts: 3.9 },
      stop: { ...open, cutoffAmps: 3 },
    }),
  },
  {
    name: 'a held group whose over-voltage starts away from that of its neighbours',
    outcome: 'time-cap',
    limitingGroup: 1,
    input: step({
      groups: [
        group(66, 3.86, { polarisationVolts: -0.004 }),
        group(60, 3.895, { polarisationVolts: 0.02 }),
        group(66, 3.85, { polarisationTimeConstantS: 120 }),
      ],
      curve: LMO_BLEND,
      source: { ...free, maxAmps: 20, heldGroupVolts: 3.93 },
      stop: { ...open, maxSeconds: 400 },
    }),
  },
  {
    name: 'NiMH down, where the share that stays does not count',
    outcome: 'target',
    limitingGroup: null,
    input: step({
      groups: [1.29, 1.288].map((volts) => group(6.5, volts, { polarisationTimeConstantS: 60 })),
      curve: NIMH,
      coulombicEfficiency: 0.9,
      direction: 'discharge',
      source: { ...free, maxAmps: 2, setVolts: 2.5 },
      stop: { ...open, relaxedVolts: 2.52 },
    }),
  },
  {
    name: 'a discharge into 0.8 Ω with leads and links, down to 7.7 V relaxed',
    outcome: 'target',
    limitingGroup: null,
    input: step({
      groups: [group(66, 4.05), group(63, 4.04)],
      curve: LMO_BLEND,
      direction: 'discharge',
      linkResistanceOhm: 0.0005,
      source: { ...free, maxAmps: null, leadResistanceOhm: 0.01, loadOhm: 0.8 },
      stop: { ...open, relaxedVolts: 7.7 },
    }),
  },
  {
    name: 'a discharge into a resistor that the load holds to 9 A at first',
    outcome: 'target',
    limitingGroup: null,
    input: step({
      groups: [group(66, 4.05), group(66, 4.05)],
      curve: LMO_BLEND,
      direction: 'discharge',
      source: { ...free, maxAmps: 9, loadOhm: 0.85 },
      stop: { ...open, relaxedVolts: 7.6 },
    }),
  },
  {
    name: 'a discharge at 60 W with the lowest group held at 3.50 V',
    outcome: 'cutoff',
    limitingGroup: 0,
    input: step({
      groups: [group(50, 3.66), group(60, 3.7)],
      curve: NMC,
      direction: 'discharge',
      source: { ...free, maxAmps: 30, maxWatts: 60, heldGroupVolts: 3.5 },
      stop: { ...open, cutoffAmps: 2 },
    }),
  },
  {
    name: 'a charge limited by 70 W, then by the set voltage, of LFP up to its knee',
    outcome: 'cutoff',
    limitingGroup: null,
    input: step({
      groups: [group(20, 3.29), group(20, 3.285), group(20, 3.292), group(20, 3.29)],
      curve: LFP,
      source: { ...free, maxAmps: 8, maxWatts: 70, setVolts: 13.9, leadResistanceOhm: 0.01 },
      stop: { ...open, cutoffAmps: 0.5 },
    }),
  },
  {
    name: 'NiMH with a share of 0.9 that stays, until its first group rests at 1.30 V',
    outcome: 'target',
    limitingGroup: 3,
    input: step({
      groups: [1.25, 1.252, 1.249, 1.258, 1.25, 1.251].map((volts) =>
        group(6.5, volts, { polarisationTimeConstantS: 60 }),
      ),
      curve: NIMH,
      coulombicEfficiency: 0.9,
      source: { ...free, maxAmps: 3, setVolts: 7.83 },
      stop: { ...open, groupRelaxedVolts: 1.3, toleranceVolts: 0 },
    }),
  },
  {
    name: 'a resumed step whose old over-voltage keeps the current at nothing for a while',
    outcome: 'time-cap',
    limitingGroup: null,
    input: step({
      groups: [group(66, 3.905, { polarisationVolts: 0.03 }), group(66, 3.905, { polarisationVolts: 0.03 })],
      curve: LMO_BLEND,
      source: { ...free, maxAmps: 10, setVolts: 7.84 },
      stop: { ...open, relaxedVolts: 7.84, maxSeconds: 5000 },
    }),
  },
  { name: 'W05 of the worked cases', outcome: 'cutoff', limitingGroup: null, input: workedCase('W05') },
  { name: 'W19 of the worked cases', outcome: 'target', limitingGroup: null, input: workedCase('W19') },
];

describe('a step agrees with a second integrator in charge to 2e-5, Ah and Wh to 0.01 %, volts to 0.05 mV', () => {
  it.each(cases)('$name', { timeout: 60_000 }, ({ input, outcome, limitingGroup }) => {
    const result = chargeThroughTerminals(input);
    expect(result.outcome).toBe(outcome);
    expect(result.limitingGroup).toBe(limitingGroup);
    const n = input.groups.length;
    const course = integrateAgain(input, result.stopAtS);
    const last = course.state.at(-1)!;
    result.groups.forEach((one, i) => {
      expect(Math.abs(one.soc - last[i]!), `charge of group ${i}`).toBeLessThan(2e-5);
      expect(Math.abs(one.polarisationVolts - last[n + i]!), `over-voltage of group ${i}`).toBeLessThan(5e-5);
    });
    expect(Math.abs(result.ampHours / last[2 * n]! - 1)).toBeLessThan(1e-4);
    expect(Math.abs(result.wattHours / last[2 * n + 1]! - 1)).toBeLessThan(1e-4);
    const soc = last.slice(0, n);
    const over = last.slice(n, 2 * n);
    expect(Math.abs(result.endTerminalVolts - terminalVoltsOf(input, soc, over))).toBeLessThan(5e-5 * n);
    expect(Math.abs(result.endAmps - currentOf(input, soc, over))).toBeLessThan(0.002 * input.groups[0]!.capacityAh);
    expectStopHolds(input, soc, over, result.stopAtS);
    for (const [k, state] of course.state.entries())
      if (course.s[k]! < result.stopAtS * 0.999)
        expect(stopMargin(input, state.slice(0, n), state.slice(n, 2 * n)), `at ${course.s[k]} s`).toBeLessThan(0);
  });
});

/** At least 0 where a stop other than the time cap is met; volts or amperes short of it otherwise. */
function stopMargin(input: StepInput, soc: number[], over: number[]): number {
  const { stop, direction } = input;
  const sign = direction === 'charge' ? 1 : -1;
  const rest = soc.map((z) => voltsAtSoc(input.curve, z));
  const margins = [-Infinity];
  if (stop.relaxedVolts !== null)
    margins.push(sign * (rest.reduce((a, b) => a + b, 0) - stop.relaxedVolts) + stop.toleranceVolts);
  const groupRelaxed = stop.groupRelaxedVolts ?? null;
  if (groupRelaxed !== null) margins.push(Math.max(...rest.map((volts) => sign * (volts - groupRelaxed))));
  const amps = Math.abs(currentOf(input, soc, over));
  const most = input.source.maxAmps ?? Infinity;
  if (stop.cutoffAmps !== null && amps < 0.999 * most) margins.push(stop.cutoffAmps - amps);
  return Math.max(...margins);
}

function expectStopHolds(input: StepInput, soc: number[], over: number[], stopAtS: number): void {
  const cap = input.stop.maxSeconds ?? null;
  if (cap !== null && stopAtS === cap) return;
  expect(Math.abs(stopMargin(input, soc, over)), 'at the stop').toBeLessThan(
    input.stop.cutoffAmps === null ? 5e-5 : 0.005,
  );
}

function workedCase(id: string): StepInput {
  return SERIES_CASES.find((one) => one.id === id)!.input;
}
