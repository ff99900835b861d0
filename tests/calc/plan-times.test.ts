import { describe, expect, it } from 'vitest';
import {
  CHEMISTRIES,
  chargeThroughTerminals,
  planCharge,
  splitLongResistance,
  type PlanInput,
  type PlanOption,
} from '@/calc/index';
import type { OcvTable } from '@/calc/types';
import { LFP, LMO_BLEND, NIMH, NMC } from './reference/curves';
import { channel, lmoModule, lmoSpare, planInput, sixChannels, target } from './plan-fixtures';

const current = (option: PlanOption): number => option.steps[0]!.stopS - option.steps[0]!.startS;
const find = (input: PlanInput, id: string): PlanOption => {
  const plan = planCharge(input);
  const option = plan.options.find((one) => one.id.startsWith(id));
  if (!option) throw new Error(`no ${id}: ${JSON.stringify([plan.refusals, plan.ruledOut])}`);
  return option;
};

/** One volt from empty to full in a straight line: 1 Ah of Q Ah is 1/Q V. */
const straight: OcvTable = { soc: [0, 1], volts: [3, 4] };

/**
 * Seconds until one group on a straight curve (1 V from empty to full) rests at `endVolts`: constant current in closed form, then the
 * two linear equations E' = k I, v' = (I R1 − v)/τ with I = (V − E − v)/R0 by their eigenvalues.
 */
function exactTaper(at: {
  fromVolts: number;
  setVolts: number;
  endVolts: number;
  amps: number;
  capacityAh: number;
  tauS: number;
}): number {
  const { ohmicResistanceOhm: r0, polarisationResistanceOhm: r1 } = splitLongResistance(0.002);
  const k = 1 / (3600 * at.capacityAh);
  const over = (s: number): number => at.amps * r1 * (1 - Math.exp(-s / at.tauS));
  const terminal = (s: number): number => at.fromVolts + k * at.amps * s + over(s) + at.amps * r0;
  const limitS = bisect((s) => terminal(s) - at.setVolts, 0, 1e5);
  // In w = V − E and v: w' = −k (w − v)/R0, v' = R1 (w − v)/(R0 τ) − v/τ.
  const a = [-k / r0, k / r0, r1 / (r0 * at.tauS), -r1 / (r0 * at.tauS) - 1 / at.tauS] as const;
  const trace = a[0] + a[3];
  const root = Math.sqrt(trace * trace - 4 * (a[0] * a[3] - a[1] * a[2]));
  const slow = (trace + root) / 2;
  const fast = (trace - root) / 2;
  const w0 = at.setVolts - at.fromVolts - k * at.amps * limitS;
  const v0 = over(limitS);
  const w = (s: number): number => {
    const rate = a[0] * w0 + a[1] * v0;
    const ofSlow = (rate - fast * w0) / (slow - fast);
    return ofSlow * Math.exp(slow * s) + (w0 - ofSlow) * Math.exp(fast * s);
  };
  return limitS + bisect((s) => at.setVolts - at.endVolts - w(s), 0, 1e5);
}

function bisect(rising: (x: number) => number, from: number, to: number): number {
  let [low, high] = [from, to];
  for (let pass = 0; pass < 100; pass += 1) {
    const middle = (low + high) / 2;
    if (rising(middle) > 0) high = middle;
    else low = middle;
  }
  return low;
}

describe('the nominal run of a plan', () => {
  it('is exactly Ah over A on a straight curve: 0.2 V of a 66 Ah volt at 10 A are 13.2 Ah and 4752 s', () => {
    const input = planInput({
      module: { ...lmoModule, curve: straight, chargeLimitVolts: 4, dischargeLimitVolts: 3, floorVolts: 3 },
      spare: { ...lmoSpare, groupVolts: [3.5, 3.5] },
      target: { ...target, volts: 3.7 },
      samples: 1,
    });
    const option = find(input, 'terminals/over-and-settle');
    expect(option.ampHours).toBeCloseTo(13.2, 9);
    expect(current(option)).toBeCloseTo(4752, 6);
    // Clip-on 300 s, current, an hour's rest, check 300 s; one sample alone has no band.
    expect(option.totalS.p50).toBeCloseTo(300 + 4752 + 3600 + 300, 6);
    expect(option.totalS.p10).toBe(option.totalS.p90);
    expect(option.segments.map((one) => one.kind)).toEqual(['hands', 'cc', 'rest', 'check']);
    expect(option.handsOnS).toBe(900);
  });

  it('tapers on the mark as the exact solution of the two linear equations says, to 0.01 %', () => {
    const input = planInput({
      module: { ...lmoModule, curve: straight, chargeLimitVolts: 4, dischargeLimitVolts: 3, floorVolts: 3 },
      spare: { ...lmoSpare, groupVolts: [3.5, 3.5] },
      target: { ...target, volts: 3.7, toleranceVolts: 0.006 },
      samples: 1,
    });
    const option = find(input, 'terminals/on-the-mark');
    const exactS = exactTaper({ fromVolts: 3.5, setVolts: 3.7, endVolts: 3.698, amps: 10, capacityAh: 66, tauS: 300 });
    expect(Math.abs(current(option) / exactS - 1)).toBeLessThan(1e-4);
    expect(option.setVolts).toBeCloseTo(7.4, 9);
    expect(option.endGroupVolts[0]).toBeCloseTo(3.698, 6);
    // One resistance in place of the RC pair is known to come out some per cent short.
    const one = (3600 * 66 * (0.2 - 0.02)) / 10 + 3600 * 0.002 * 66 * Math.log(0.02 / 0.002);
    expect(current(option) / one).toBeGreaterThan(1.02);
    expect(current(option) / one).toBeLessThan(1.1);
  });

  it('is the core’s own run of the same numbers, to a millisecond and a milliampere-hour', () => {
    const input = planInput({ channels: sixChannels, samples: 1 });
    const { curve } = CHEMISTRIES['lmo-blend'];
    const group = { capacityAh: 66, ...splitLongResistance(0.002), polarisationTimeConstantS: 300, restVolts: 3.75 };
    for (const [id, name, setVolts, toleranceVolts] of [
      ['terminals/over-and-settle/id-B1', 'B1', null, 0],
      ['terminals/on-the-mark/id-B1', 'B1', 7.84, 0.01 / 3],
      ['terminals/on-the-mark/id-A1', 'A1', 7.84, 0.01 / 3],
    ] as const) {
      const option = find(input, id);
      const own = sixChannels.find((one) => one.name === name)!;
      const result = chargeThroughTerminals({
        groups: [group, group],
        curve,
        linkResistanceOhm: 0,
        coulombicEfficiency: 1,
        direction: 'charge',
        source: {
          maxAmps: own.maxAmps,
          setVolts: setVolts ?? option.setVolts,
          maxWatts: null,
          leadResistanceOhm: own.leadResistanceOhm,
          heldGroupVolts: null,
          loadOhm: null,
        },
        stop: { relaxedVolts: 7.84, toleranceVolts, cutoffAmps: null, groupVolts: null },
        settledVolts: 0.01 / 3,
      });
      expect(current(option)).toBeCloseTo(result.stopAtS, 3);
      expect(option.ampHours).toBeCloseTo(result.ampHours, 3);
      expect(option.wattHours).toBeCloseTo(result.wattHours, 2);
    }
  });
});

/**
 * Minutes of one group by an independent reference model (the project's estimating figures): over and settle, and on the mark to
 * 5, 2 and 1 mV below the target.
 */
const TABLE = [
  {
    name: '66 Ah LMO 3.75 to 3.92 V at 10 A',
    chemistry: 'lmo-blend',
    curve: LMO_BLEND,
    ah: 66,
    ohm: 0.002,
    from: 3.75,
    to: 3.92,
    amps: 10,
    over: 123,
    mark: [136, 158, 175],
  },
  {
    name: '52 Ah NMC 3.62 to 3.80 V at 10 A',
    chemistry: 'nmc',
    curve: NMC,
    ah: 52,
    ohm: 0.0018,
    from: 3.62,
    to: 3.8,
    amps: 10,
    over: 92,
    mark: [96, 103, 109],
  },
  {
    name: '100 Ah LFP 3.24 to 3.33 V at 20 A',
    chemistry: 'lfp',
    curve: LFP,
    ah: 100,
    ohm: 0.0014,
    from: 3.24,
    to: 3.33,
    amps: 20,
    over: 157,
    mark: [178, 224, 286],
  },
  {
    name: '100 Ah LFP 3.290 to 3.300 V at 20 A',
    chemistry: 'lfp',
    curve: LFP,
    ah: 100,
    ohm: 0.0014,
    from: 3.29,
    to: 3.3,
    amps: 20,
    over: 46,
    mark: [null, 219, 318],
  },
] as const;

describe('minutes of the independent estimating table, within 3 % or 1 min', () => {
  const close = (actual: number, expected: number): void =>
    expect(Math.abs(actual / 60 - expected), `${actual / 60} min against ${expected}`).toBeLessThanOrEqual(
      Math.max(1, 0.03 * expected),
    );
  const input = (row: (typeof TABLE)[number], toleranceVolts: number): PlanInput =>
    planInput({
      module: {
        ...lmoModule,
        chemistry: row.chemistry,
        groupsInSeries: 1,
        ratedAh: row.ah,
        curve: { soc: [...row.curve.soc], volts: [...row.curve.volts] },
        resistanceOhm: row.ohm,
        chargeLimitVolts: row.curve.volts.at(-1)!,
        dischargeLimitVolts: 2.6,
        floorVolts: 2.5,
      },
      spare: { ...lmoSpare, groupVolts: [row.from], capacityAh: row.ah },
      target: { ...target, volts: row.to, toleranceVolts },
      channels: [channel('A1', { maxAmps: row.amps, displayStepVolts: 0 })],
      samples: 1,
    });

  it.each(TABLE)('$name, over and settle: $over min', (row) => {
    close(current(find(input(row, 0.005), 'terminals/over-and-settle')), row.over);
  });
  it.each(TABLE)('$name, on the mark to 5, 2, 1 mV below: $mark min', (row) => {
    [0.015, 0.006, 0.003].forEach((toleranceVolts, at) => {
      // Ten millivolts are within a tolerance of fifteen: nothing to charge.
      if (row.mark[at] === null) expect(planCharge(input(row, toleranceVolts)).alreadyWithin).toBe(true);
      else close(current(find(input(row, toleranceVolts), 'terminals/on-the-mark')), row.mark[at]!);
    });
  });
  it('6.5 Ah NiMH 1.255 to 1.295 V at 3 A: 64 min before the charge that does not stay', () => {
    const option = find(
      planInput({
        module: {
          ...lmoModule,
          chemistry: 'nimh',
          groupsInSeries: 1,
          ratedAh: 6.5,
          curve: { soc: [...NIMH.soc], volts: [...NIMH.volts] },
          resistanceOhm: 0.0035,
          chargeLimitVolts: 1.5,
          dischargeLimitVolts: 1,
          floorVolts: 0.9,
        },
        spare: { ...lmoSpare, groupVolts: [1.255], capacityAh: 6.5 },
        target: { ...target, volts: 1.295 },
        channels: [channel('A1', { maxAmps: 3 })],
        samples: 1,
      }),
      'terminals/over-and-settle',
    );
    // Measured charge efficiency 0.905 (NREL, five cycles of a 6.5 Ah module).
    close(current(option) * 0.905, 64);
  });
});
