import { describe, expect, it } from 'vitest';
import { CalcInputError, learnedFactor, planCharge, seededRandom, type PlanInput, type TimeFactor } from '@/calc/index';
import { channel, planInput } from './plan-fixtures';

const charges = (...ratios: number[]) => ratios.map((ratio) => ({ predictedS: 6000, actualS: 6000 * ratio }));

describe('the factor learned from closed charges', () => {
  it('is 1 without one, stays within 5 % after one charge of 20 % more, and is within 1 % of 1.06 after 40', () => {
    expect(learnedFactor([])).toMatchObject({ mean: 1, charges: 0, leftOut: 0 });
    const one = learnedFactor(charges(1.2));
    expect(one.mean).toBeGreaterThan(1);
    // Half way by the logarithm: ln 1.2 / 2.
    expect(Math.abs(one.mean - Math.sqrt(1.2))).toBeLessThan(0.02);
    const many = learnedFactor(charges(...Array.from({ length: 40 }, (_, at) => 1.06 + (at % 2 === 0 ? 0.02 : -0.02))));
    expect(Math.abs(many.mean - 1.06)).toBeLessThan(0.01);
    expect(many.charges).toBe(40);
    expect(many.sd).toBeLessThan(one.sd);
  });

  it('is worked out the same by brute force: the posterior over 4000 factors from 0.7 to 1.4', () => {
    const ratios = [1.05, 1.1, 0.98, 1.07, 1.12];
    const logs = ratios.map(Math.log);
    const mean = logs.reduce((sum, log) => sum + log, 0) / logs.length;
    // Scatter as stated: 0.06 worth four charges, and what these five show about their own mean.
    const scatter = (4 * 0.06 ** 2 + logs.reduce((sum, log) => sum + (log - mean) ** 2, 0)) / (4 + 4);
    let [weight, first] = [0, 0];
    for (let at = 0; at < 4000; at += 1) {
      const factor = Math.log(0.7) + (at / 4000) * Math.log(2);
      const misfit = logs.reduce((sum, log) => sum + (log - factor) ** 2 / scatter, (factor / 0.06) ** 2);
      weight += Math.exp(-misfit / 2);
      first += factor * Math.exp(-misfit / 2);
    }
    expect(learnedFactor(charges(...ratios)).mean).toBeCloseTo(Math.exp(first / weight), 4);
  });

  it('its 80 % range holds 77 to 83 % of next charges, over 3000 types with 1 to 20 closed ones', () => {
    const random = seededRandom(31);
    const normal = () => Math.sqrt(-2 * Math.log(random() + 1e-12)) * Math.cos(2 * Math.PI * random());
    const types = 3000;
    let inside = 0;
    for (let at = 0; at < types; at += 1) {
      const own = 0.06 * normal();
      const draw = () => Math.exp(own + 0.06 * normal());
      const learned = learnedFactor(charges(...Array.from({ length: 1 + (at % 20) }, draw)));
      if (Math.abs(Math.log(draw() / learned.mean)) < 1.2816 * (learned.sd / learned.mean)) inside += 1;
    }
    expect(inside / types).toBeGreaterThan(0.77);
    expect(inside / types).toBeLessThan(0.83);
  });

  it('leaves out what took over twice as long and says how many, and refuses seconds that are none', () => {
    const learned = learnedFactor(charges(1.02, 3, 0.98, 0.3));
    expect(learned).toMatchObject({ charges: 2, leftOut: 2 });
    expect(() => learnedFactor([{ predictedS: 0, actualS: 100 }])).toThrow(CalcInputError);
  });
});

describe('a plan with a learned factor', () => {
  const input = (over: Partial<PlanInput> = {}): PlanInput => planInput({ samples: 256, ...over });
  const current = (over: Partial<PlanInput>): { p10: number; p50: number; p90: number } => {
    const option = planCharge(input(over)).options.find((one) => one.id === 'terminals/over-and-settle/id-A1')!;
    const fixed = 300 + option.restS + 300;
    return { p10: option.totalS.p10 - fixed, p50: option.totalS.p50 - fixed, p90: option.totalS.p90 - fixed };
  };
  const factor = (mean: number, sd: number, count: number): TimeFactor => ({ mean, sd, charges: count });

  it('of 1.1 from 14 charges has a tenth more of current in the middle, in its segments and its latest start', () => {
    const plain = current({});
    const learned = current({ timeFactor: factor(1.1, 0.05, 14) });
    expect(learned.p50 / plain.p50).toBeCloseTo(1.1, 6);
    const option = planCharge(input({ timeFactor: factor(1.1, 0.05, 14), readyByS: 40_000 })).options[0]!;
    const flowing = option.segments.filter(({ kind }) => kind === 'cc' || kind === 'taper');
    expect(flowing.reduce((sum, { fromS, toS }) => sum + toS - fromS, 0)).toBeCloseTo(learned.p50, 0);
    expect(option.latestStartS).toBeCloseTo(40_000 - option.totalS.p90, 6);
    expect(option.timeFactorText).toBe('Learned from 14 charges: 10\u00a0% longer than reckoned.');
  });

  it('widens the band where charges scattered more, and narrows it where they scattered less', () => {
    const width = (over: Partial<PlanInput>): number => {
      const { p10, p50, p90 } = current(over);
      return (p90 - p10) / p50;
    };
    const plain = width({});
    expect(width({ timeFactor: factor(1, 0.15, 30) })).toBeGreaterThan(1.5 * plain);
    expect(width({ timeFactor: factor(1, 0.005, 30) })).toBeLessThan(0.7 * plain);
    // A 15 % scatter of very many charges is the band: 2·1.2816·0.15.
    expect(Math.abs(width({ timeFactor: factor(1, 0.15, 1e6) }) / (2 * 1.2816 * 0.15) - 1)).toBeLessThan(0.08);
  });

  it('is the plan without it to the last digit where none was learned, or it was taken off for the channel', () => {
    const plain = JSON.stringify(planCharge(input()));
    expect(JSON.stringify(planCharge(input({ timeFactor: null })))).toBe(plain);
    expect(JSON.stringify(planCharge(input({ timeFactor: factor(1, 0.08, 0) })))).toBe(plain);
    const off = input({ timeFactor: factor(1.2, 0.05, 9), channels: [channel('A1', { timeFactor: null })] });
    expect(planCharge(off).options[0]!.totalS).toEqual(planCharge(input()).options[0]!.totalS);
  });

  it('takes the channel’s own before the plan’s', () => {
    const own = current({
      timeFactor: factor(1.2, 0.05, 9),
      channels: [channel('A1', { timeFactor: factor(0.9, 0.05, 9) })],
    });
    expect(own.p50 / current({}).p50).toBeCloseTo(0.9, 6);
  });
});
