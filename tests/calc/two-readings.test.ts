import { describe, expect, it } from 'vitest';
import {
  CalcInputError,
  capacityFromTwoReadings,
  chargeThroughTerminals,
  CHEMISTRIES,
  combineFigures,
  resistanceFromReadings,
  seededRandom,
  voltsAtSoc,
  type TwoReadings,
} from '@/calc/index';
import { LFP_MEASURED_MEAN } from '@/calc/parameters/lfp-measured';
import { lmoGroup, stepOf } from './reference/modules';

const { curve } = CHEMISTRIES['lmo-blend'];
const spreads = { meterVolts: 0.002, readingVolts: 0.001, curveVolts: 0.002, hysteresisVolts: 0, countRelative: 0.01 };
const readings = (over: Partial<TwoReadings> = {}): TwoReadings => ({
  curve,
  beforeVolts: [3.75, 3.75],
  afterVolts: [3.92, 3.92],
  countedAh: 20,
  coulombicEfficiency: 1,
  sameMeter: true,
  spreads,
  ...over,
});

/** Charges groups of these capacities by the core, as the truth that is to be found again. */
function charged(capacities: number[], ampHours: number, from: number, efficiency = 1) {
  const groups = capacities.map((capacityAh) => lmoGroup(from, { capacityAh }));
  const result = chargeThroughTerminals(
    stepOf(groups, curve, { maxAmps: 10 }, { maxSeconds: (3600 * ampHours) / 10 }, { coulombicEfficiency: efficiency }),
  );
  return { afterVolts: result.groups.map(({ soc }) => voltsAtSoc(curve, soc)), result };
}

describe('capacity from two readings', () => {
  it('of groups charged by the core comes back to 0.01 %: 66, 60 and 48 Ah from 20 Ah counted', () => {
    const { afterVolts } = charged([66, 60, 48], 20, 3.75);
    const found = capacityFromTwoReadings(readings({ beforeVolts: [3.75, 3.75, 3.75], afterVolts }));
    [66, 60, 48].forEach((ampHours, group) =>
      expect(Math.abs(found.groups[group]!.capacityAh!.mean / ampHours - 1)).toBeLessThan(1e-4),
    );
  });

  it('counts what stays while charging and all of it while discharging', () => {
    const { afterVolts } = charged([60], 20, 3.75, 0.9);
    const up = capacityFromTwoReadings(readings({ beforeVolts: [3.75], afterVolts, coulombicEfficiency: 0.9 }));
    expect(up.capacityAh!.mean).toBeCloseTo(60, 3);
    const down = capacityFromTwoReadings(
      readings({ beforeVolts: [3.92], afterVolts: [3.75], countedAh: -20, coulombicEfficiency: 0.9 }),
    );
    const same = capacityFromTwoReadings(readings({ beforeVolts: [3.75], afterVolts: [3.92] }));
    expect(down.capacityAh!.mean).toBeCloseTo(same.capacityAh!.mean, 9);
  });

  it.each([true, false])(
    'its standard deviation is the scatter of 4000 noisy pairs to 10 % (one meter: %s)',
    (sameMeter) => {
      const random = seededRandom(23);
      const normal = () => Math.sqrt(-2 * Math.log(random() + 1e-12)) * Math.cos(2 * Math.PI * random());
      const { afterVolts } = charged([60], 20, 3.7);
      const truth = capacityFromTwoReadings(readings({ beforeVolts: [3.7], afterVolts, sameMeter })).capacityAh!;
      let square = 0;
      let inside = 0;
      const draws = 4000;
      for (let at = 0; at < draws; at += 1) {
        const meter = spreads.meterVolts * normal();
        const noise = () => spreads.readingVolts * normal() + spreads.curveVolts * normal();
        const seen = capacityFromTwoReadings(
          readings({
            beforeVolts: [3.7 + meter + noise()],
            afterVolts: [afterVolts[0]! + (sameMeter ? meter : spreads.meterVolts * normal()) + noise()],
            countedAh: 20 * (1 + spreads.countRelative * normal()),
            sameMeter,
          }),
        ).capacityAh!;
        square += (seen.mean - 60) ** 2;
        if (Math.abs(seen.mean - 60) < 1.2816 * seen.sd) inside += 1;
      }
      expect(Math.abs(truth.sd / Math.sqrt(square / draws) - 1)).toBeLessThan(0.1);
      expect(Math.abs(inside / draws - 0.8)).toBeLessThan(0.03);
    },
  );

  it('of several groups narrows by what is each one’s own only: never under the shared doubt', () => {
    const one = capacityFromTwoReadings(readings({ beforeVolts: [3.75], afterVolts: [3.92] })).capacityAh!;
    const eight = capacityFromTwoReadings(
      readings({ beforeVolts: Array<number>(8).fill(3.75), afterVolts: Array<number>(8).fill(3.92) }),
    ).capacityAh!;
    const shared = capacityFromTwoReadings(
      readings({ beforeVolts: [3.75], afterVolts: [3.92], spreads: { ...spreads, readingVolts: 0 } }),
    ).capacityAh!;
    expect(eight.mean).toBeCloseTo(one.mean, 9);
    expect(eight.sd).toBeLessThan(one.sd);
    expect(eight.sd).toBeGreaterThan(shared.sd);
  });

  it('claims nothing on the LFP plateau, from 3.29 to 3.33 V, and says why', () => {
    const found = capacityFromTwoReadings(
      readings({
        curve: LFP_MEASURED_MEAN,
        beforeVolts: [3.29],
        afterVolts: [3.33],
        spreads: { ...spreads, hysteresisVolts: 0.025 },
      }),
    );
    expect(found.capacityAh).toBeNull();
    expect(found.groups[0]!.reason).toMatch(/too flat/);
  });

  it('claims nothing of 2 % moved, of a reading beyond the curve, or of charge that went the other way', () => {
    const reasonOf = (over: Partial<TwoReadings>) =>
      capacityFromTwoReadings(readings({ beforeVolts: [3.75], afterVolts: [3.92], ...over })).groups[0]!.reason;
    expect(reasonOf({ afterVolts: [3.758] })).toMatch(/of charge only/);
    expect(reasonOf({ beforeVolts: [3.2] })).toMatch(/beyond the ends/);
    expect(reasonOf({ countedAh: -20 })).toMatch(/opposite/);
  });

  // batterysim/equiv-circ-model: 30.50 Ah found; 27.0 % and 89.6 % rest at 3.802 and 4.086 V.
  it('gives the 30.5 Ah of the measured cell from two of its own rest voltages, to 1 %', () => {
    const found = capacityFromTwoReadings(
      readings({ beforeVolts: [3.802], afterVolts: [4.086], countedAh: 0.626 * 30.5 }),
    );
    expect(Math.abs(found.capacityAh!.mean / 30.5 - 1)).toBeLessThan(0.01);
  });

  it('refuses lists of different length and volts that are none', () => {
    expect(() => capacityFromTwoReadings(readings({ afterVolts: [3.92] }))).toThrow(CalcInputError);
    expect(() => capacityFromTwoReadings(readings({ countedAh: [20] }))).toThrow(CalcInputError);
    expect(() => capacityFromTwoReadings(readings({ beforeVolts: [3.75, Number.NaN] }))).toThrow(CalcInputError);
  });
});

describe('two figures of one thing', () => {
  it('66 ± 4 and 60 ± 3 make 62.16 ± 2.4, and agree', () => {
    const both = combineFigures({ mean: 66, sd: 4 }, { mean: 60, sd: 3 });
    expect(both.mean).toBeCloseTo(62.16, 9);
    expect(both.sd).toBeCloseTo(2.4, 9);
    expect(both.apart).toBeCloseTo(1.2, 9);
    expect(both.agree).toBe(true);
  });

  it('says where they disagree, and refuses a figure without a doubt', () => {
    expect(combineFigures({ mean: 66, sd: 1 }, { mean: 60, sd: 1 }).agree).toBe(false);
    expect(() => combineFigures({ mean: 66, sd: 0 }, { mean: 60, sd: 1 })).toThrow(CalcInputError);
  });
});

describe('resistance from readings', () => {
  const base = { firstRestVolts: null, timeConstantS: 300, readingVolts: 0.0005, currentRelative: 0.01 };

  it.each([600, 3600, 7200])(
    'after %d s of 10 A through the core it is the 2.0 mΩ put in, with R0 of it 0.8',
    (flowedS) => {
      const group = lmoGroup(3.75);
      const run = chargeThroughTerminals(stepOf([group], curve, { maxAmps: 10 }, { maxSeconds: flowedS }));
      const [end] = run.groups;
      const rest = voltsAtSoc(curve, end!.soc);
      const found = resistanceFromReadings({
        ...base,
        voltsUnderCurrent: end!.volts,
        firstRestVolts: rest + end!.polarisationVolts,
        restVolts: { mean: rest, sd: 0.001 },
        amps: 10,
        flowedS,
      })!;
      expect(found.longOhm.mean).toBeCloseTo(0.002, 7);
      expect(found.ohmicOhm!.mean).toBeCloseTo(0.0008, 7);
      // 0.5 mV and 1 mV on 10 A are 0.11 mΩ.
      expect(found.longOhm.sd).toBeGreaterThan(0.00011);
      expect(found.longOhm.sd).toBeLessThan(0.00014);
    },
  );

  it('works the same way down: a discharge gives the same', () => {
    const up = resistanceFromReadings({
      ...base,
      voltsUnderCurrent: 3.77,
      restVolts: { mean: 3.75, sd: 0 },
      amps: 10,
      flowedS: 3600,
    })!;
    const down = resistanceFromReadings({
      ...base,
      voltsUnderCurrent: 3.73,
      restVolts: { mean: 3.75, sd: 0 },
      amps: -10,
      flowedS: 3600,
    })!;
    expect(down.longOhm.mean).toBeCloseTo(up.longOhm.mean, 12);
  });

  it('tells nothing of one minute of current, nor of a voltage on the wrong side, and refuses no current', () => {
    const one = { ...base, voltsUnderCurrent: 3.77, restVolts: { mean: 3.75, sd: 0 }, amps: 10, flowedS: 60 };
    expect(resistanceFromReadings(one)).toBeNull();
    expect(resistanceFromReadings({ ...one, flowedS: 3600, voltsUnderCurrent: 3.74 })).toBeNull();
    expect(() => resistanceFromReadings({ ...one, amps: 0 })).toThrow(CalcInputError);
  });
});
