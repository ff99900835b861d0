import { describe, expect, it } from 'vitest';
import { planCharge, quantile, voltsAtSoc, type PlanInput, type PlanOption, type Spreads } from '@/calc/index';
import type { OcvTable } from '@/calc/types';
import { LFP, LMO_BLEND, NMC } from './reference/curves';
import { channel, lmoModule, lmoSpare, planInput, sixChannels, target } from './plan-fixtures';

/** Standard deviations of the worked cases, the table's where it is given. */
const spreads = (tableVolts: number): Spreads => ({
  capacityRelative: 0.05,
  resistanceRelative: 0.2,
  currentRelative: 0.01,
  meterVolts: 0.003,
  readingVolts: 0,
  targetVolts: 0,
  chargerVolts: 0,
  curveVolts: tableVolts,
  hysteresisVolts: 0,
  temperatureCelsius: 0,
  selfDischargeRelative: 0,
});

interface Case {
  name: string;
  chemistry: 'lmo-blend' | 'nmc' | 'lfp';
  curve: OcvTable;
  groups: number;
  ah: number;
  from: number;
  to: number;
  amps: number;
  table: number;
  /** 5, 50 and 95 % of 20 000 runs of the independent reference, s. */
  percentiles: [number, number, number];
}
const CASES: Case[] = [
  {
    name: 'W01, LMO 66 Ah 7.50 to 7.84 V at 10 A',
    chemistry: 'lmo-blend',
    curve: LMO_BLEND,
    groups: 2,
    ah: 66,
    from: 3.75,
    to: 3.92,
    amps: 10,
    table: 0.004,
    percentiles: [6669.88, 7385.396, 8148.168],
  },
  {
    name: 'W07, NMC 52 Ah 3.62 to 3.80 V at 20 A',
    chemistry: 'nmc',
    curve: NMC,
    groups: 1,
    ah: 52,
    from: 3.62,
    to: 3.8,
    amps: 20,
    table: 0.004,
    percentiles: [2477.693, 2766.479, 3073.679],
  },
  {
    name: 'W17, LFP 100 Ah 25.92 to 26.64 V at 25 A',
    chemistry: 'lfp',
    curve: LFP,
    groups: 8,
    ah: 100,
    from: 3.24,
    to: 3.33,
    amps: 25,
    table: 0,
    percentiles: [6672.072, 7569.183, 9130.345],
  },
];

const inputOf = (row: Case, samples: number, seed = 5): PlanInput =>
  planInput({
    module: {
      ...lmoModule,
      chemistry: row.chemistry,
      groupsInSeries: row.groups,
      ratedAh: row.ah,
      curve: row.curve,
      chargeLimitVolts: row.curve.volts.at(-1)!,
      dischargeLimitVolts: 2.6,
      floorVolts: 2.5,
    },
    spare: { ...lmoSpare, groupVolts: Array<number>(row.groups).fill(row.from), capacityAh: row.ah, meterId: 'm1' },
    target: { ...target, volts: row.to, meterId: 'm2' },
    channels: [channel('A1', { maxAmps: row.amps })],
    samples,
    seed,
    spreads: spreads(row.table),
  });

const over = (input: PlanInput): PlanOption =>
  planCharge(input).options.find((one) => one.id === 'terminals/over-and-settle/id-A1')!;
/** Seconds of the band that are current: all but clip-on, rest and check. */
const currentBand = (option: PlanOption): number[] => {
  const fixed = 300 + option.restS + 300;
  return [option.totalS.p10, option.totalS.p50, option.totalS.p90].map((seconds) => seconds - fixed);
};

/** The same doubt by a second path: plain random draws, the curve turned round by halving, Ah over A. */
function plainMonteCarlo(row: Case, count: number): number[] {
  let word = 12345;
  const uniform = (): number => {
    word = (Math.imul(word, 1664525) + 1013904223) >>> 0;
    return (word + 0.5) / 2 ** 32;
  };
  const normal = (): number => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform());
  const socOf = (volts: number): number => {
    let [low, high] = [-0.5, 1.5];
    for (let pass = 0; pass < 50; pass += 1) {
      const middle = (low + high) / 2;
      if (voltsAtSoc(row.curve, middle) > volts) high = middle;
      else low = middle;
    }
    return low;
  };
  return Array.from({ length: count }, () => {
    const curve = row.table * normal();
    const from = socOf(row.from + 0.003 * normal() - curve);
    const to = socOf(row.to + 0.003 * normal() - curve);
    return (3600 * row.ah * (1 + 0.05 * normal()) * Math.max(0, to - from)) / (row.amps * (1 + 0.01 * normal()));
  });
}

describe('the band', () => {
  it.each(CASES)(
    'of $name has the percentiles of 20 000 plain draws within 3 %, with 64 samples and with 2000',
    (row) => {
      const plain = plainMonteCarlo(row, 20_000);
      // First that the second path is itself right: the reference's own 5, 50 and 95 %.
      row.percentiles.forEach((expected, at) =>
        expect(Math.abs(quantile(plain, [0.05, 0.5, 0.95][at]!) / expected - 1)).toBeLessThan(0.015),
      );
      for (const [samples, within] of [
        [2000, 0.015],
        [64, 0.03],
      ] as const)
        currentBand(over(inputOf(row, samples))).forEach((seconds, at) =>
          expect(Math.abs(seconds / quantile(plain, [0.1, 0.5, 0.9][at]!) - 1), `${samples} samples`).toBeLessThan(
            within,
          ),
        );
    },
  );

  it('of the worked LMO charge lies inside the published 111 to 136 min around 123', () => {
    const [p10, p50, p90] = currentBand(over(inputOf(CASES[0]!, 64))).map((seconds) => seconds / 60);
    expect(p10).toBeGreaterThan(111);
    expect(p90).toBeLessThan(136);
    expect(Math.abs(p50! - 123)).toBeLessThan(2);
  });

  it('of LFP is skew: the late side is over 1.3 times the early one', () => {
    const [p10, p50, p90] = currentBand(over(inputOf(CASES[2]!, 256)));
    expect((p90! - p50!) / (p50! - p10!)).toBeGreaterThan(1.3);
  });

  it('widens by itself on the plateau: 7 mV take LFP over three times as far as LMO, as a share', () => {
    const width = (row: Case): number => {
      const [p10, p50, p90] = currentBand(
        over({ ...inputOf(row, 256), spreads: { ...spreads(0), capacityRelative: 0 } }),
      );
      return (p90! - p10!) / p50!;
    };
    const plateau: Case = { ...CASES[2]!, from: 3.29, to: 3.31 };
    expect(width(plateau)).toBeGreaterThan(3 * width(CASES[0]!));
  });

  it('narrows where one meter has read both: the offset cancels but for the slopes', () => {
    const two = inputOf(CASES[0]!, 256);
    const only: Partial<Spreads> = { ...spreads(0), capacityRelative: 0, currentRelative: 0 };
    const one = { ...two, target: { ...two.target, meterId: 'm1' } };
    const width = (input: PlanInput): number => {
      const [p10, , p90] = currentBand(over({ ...input, spreads: only }));
      return p90! - p10!;
    };
    expect(width(one)).toBeLessThan(0.65 * width(two));
    expect(width(one)).toBeGreaterThan(0);
    expect(width({ ...one, spare: { ...one.spare, meterId: null }, target: { ...one.target, meterId: null } })).toBe(
      width(two),
    );
  });

  it('names what makes most of it and how much is gained: LMO with 5 % capacity, LFP on the plateau with its voltages', () => {
    const lmo = over(inputOf(CASES[0]!, 256));
    expect(lmo.dominant).toBe('capacity');
    const [p10, , p90] = currentBand(lmo);
    const without = over({ ...inputOf(CASES[0]!, 256), spreads: { ...spreads(0.004), capacityRelative: 0 } });
    const [q10, , q90] = currentBand(without);
    // Worked out a second way: the same plan with that doubt taken away.
    expect(Math.abs(lmo.narrowsByS - (p90! - p10! - (q90! - q10!))) / (p90! - p10!)).toBeLessThan(0.08);
    expect(over(inputOf({ ...CASES[2]!, from: 3.29, to: 3.31 }, 256)).dominant).toMatch(/reading/);
  });

  it('takes on the hysteresis of LFP: a plateau charge has a band over twice as wide with it', () => {
    const bare = inputOf(CASES[2]!, 256);
    const width = (hysteresisVolts: number): number => {
      const [p10, , p90] = currentBand(over({ ...bare, spreads: { ...spreads(0), hysteresisVolts } }));
      return p90! - p10!;
    };
    expect(width(0.025)).toBeGreaterThan(2 * width(0));
    const { spreads: _, ...asShipped } = bare;
    const plan = planCharge(asShipped);
    expect(plan.cautions.map((one) => one.code)).toContain('hysteresis');
    expect(plan.cautions.find((one) => one.code === 'hysteresis')!.text).toContain(
      'count the ampere-hours from full or empty',
    );
  });

  it('is the same to the last digit for the same seed, and not for another', () => {
    const input = planInput({ channels: sixChannels });
    expect(JSON.stringify(planCharge(input))).toBe(JSON.stringify(planCharge(structuredClone(input))));
    expect(planCharge({ ...input, seed: 12 }).options[0]!.totalS.p90).not.toBe(
      planCharge(input).options[0]!.totalS.p90,
    );
  });

  it('counts the days on the shelf: a spare read a month ago starts lower by the type’s self-discharge and takes longer', () => {
    const fresh = over(inputOf(CASES[0]!, 1));
    const old = inputOf(CASES[0]!, 1);
    const aged = over({
      ...old,
      module: { ...old.module, selfDischargePerMonth: 0.03 },
      spare: { ...old.spare, readingAgeS: 30.44 * 86_400 },
    });
    // Three per cent of 66 Ah at 10 A are 713 s.
    expect(currentBand(aged)[1]! - currentBand(fresh)[1]!).toBeCloseTo(0.03 * 66 * 360, 3);
  });
});
