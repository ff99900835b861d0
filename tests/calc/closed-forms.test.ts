import { chargeThroughTerminals, equaliseThroughResistor, type CellGroup } from '@/calc/index';
import { describe, expect, it } from 'vitest';
import { stepOf } from './reference/modules';

/** A curve that is a straight line, so that the equations have solutions on paper: U = 3 V + z · 1 V. */
const line = { soc: [0, 0.5, 1], volts: [3, 3.5, 4] };
const cell = (restVolts: number, more: Partial<CellGroup> = {}): CellGroup => ({
  capacityAh: 10,
  ohmicResistanceOhm: 0.01,
  polarisationResistanceOhm: 0,
  polarisationTimeConstantS: 100,
  restVolts,
  ...more,
});

describe('solutions on paper', () => {
  // Modelica Standard Library, Electrical.Batteries.Examples.CCCVcharging: 0.9 · 3600 s / 5 = 648 s.
  it('charge from 0.1 to 1.0 at five times the one-hour current takes 648 s', () => {
    const ideal = cell(3.1, { ohmicResistanceOhm: 0 });
    const result = chargeThroughTerminals(stepOf([ideal], line, { maxAmps: 50 }, { relaxedVolts: 4 }));
    expect(result.outcome).toBe('target');
    expect(result.stopAtS).toBeCloseTo(648, 6);
    expect(result.ampHours).toBeCloseTo(9, 9);
    // ∫U dQ of the line: 9 Ah at 3.55 V on the mean.
    expect(result.wattHours).toBeCloseTo(9 * 3.55, 7);
  });

  // Taper without RC: I = I0·e^(−t/T), T = 3600·R·Q/(dU/dz).
  it.each([{ coulombicEfficiency: 1 }, { coulombicEfficiency: 0.9 }])(
    'a taper with R alone falls with T = 360 s / η for η = $coulombicEfficiency, to 0.01 %',
    ({ coulombicEfficiency }) => {
      const start = cell(3.6);
      const result = chargeThroughTerminals(
        stepOf([start], line, { setVolts: 3.7 }, { cutoffAmps: 0.5 }, { coulombicEfficiency }),
      );
      const constant = (3600 * 0.01 * 10) / coulombicEfficiency;
      expect(result.voltageLimitAtS).toBe(0);
      expect(Math.abs(result.stopAtS / (constant * Math.log(10 / 0.5)) - 1)).toBeLessThan(1e-4);
      expect(Math.abs((3600 * result.ampHours) / (constant * 9.5) - 1)).toBeLessThan(1e-4);
      expect(result.relaxedVolts).toBeCloseTo(3.695, 5);
      expect(Math.abs(result.wattHours / (3.7 * result.ampHours) - 1)).toBeLessThan(1e-6);
    },
  );

  it('constant current until the set voltage, then the taper: both lengths on paper', () => {
    const result = chargeThroughTerminals(stepOf([cell(3.5)], line, { maxAmps: 5, setVolts: 3.7 }, { cutoffAmps: 1 }));
    // U reaches 3.7 V − 5 A · 10 mΩ = 3.65 V after 0.15 · 10 Ah at 5 A.
    expect(result.voltageLimitAtS).toBeCloseTo(1080, 6);
    expect(Math.abs(result.stopAtS - (1080 + 360 * Math.log(5)))).toBeLessThan(0.05);
  });

  // v1(t) = I·R1·(1 − e^(−t/τ)), and after the stop v1·e^(−t/τ).
  it('the over-voltage builds up and settles exponentially', () => {
    const lossy = cell(3.2, { polarisationResistanceOhm: 0.02, polarisationTimeConstantS: 200 });
    const result = chargeThroughTerminals(
      stepOf([lossy, lossy], line, { maxAmps: 4 }, { maxSeconds: 300 }, { settledVolts: 0.004 }),
    );
    const over = 4 * 0.02 * (1 - Math.exp(-1.5));
    expect(result.outcome).toBe('time-cap');
    expect(result.groups[0]!.polarisationVolts).toBeCloseTo(over, 12);
    expect(result.settleS).toBeCloseTo(200 * Math.log((2 * over) / 0.004), 8);
    expect(result.endTerminalVolts).toBeCloseTo(2 * (3.2 + 300 / 9000 + over + 4 * 0.01), 10);
  });

  it('groups with time constants of 50 s and 400 s settle when the sum of both is within 4 mV', () => {
    const quick = cell(3.2, { polarisationResistanceOhm: 0.02, polarisationTimeConstantS: 50 });
    const slow = cell(3.2, { polarisationResistanceOhm: 0.01, polarisationTimeConstantS: 400 });
    const result = chargeThroughTerminals(
      stepOf([quick, slow], line, { maxAmps: 4 }, { maxSeconds: 3000 }, { settledVolts: 0.004 }),
    );
    const [a, b] = result.groups.map((group) => group.polarisationVolts) as [number, number];
    expect(a).toBeCloseTo(0.08, 8);
    expect(b).toBeCloseTo(0.04 * (1 - Math.exp(-7.5)), 8);
    const left = a * Math.exp(-result.settleS / 50) + b * Math.exp(-result.settleS / 400);
    expect(left).toBeCloseTo(0.004, 9);
  });

  it('over-voltages of opposite signs do not hide each other: both must settle', () => {
    const groups = [cell(3.5, { polarisationVolts: 0.02 }), cell(3.5, { polarisationVolts: -0.02 })];
    const result = chargeThroughTerminals(
      stepOf(groups, line, { maxAmps: 4 }, { relaxedVolts: 7 }, { settledVolts: 0.004 }),
    );
    expect(result.stopAtS).toBe(0);
    expect(result.settleS).toBeCloseTo(100 * Math.log(10), 9);
  });

  // P = V·I with V = E + I·R.
  it('a power limit of 100 W at 3.5 V and 10 mΩ lets 26.6 A through at first, and 100 W all the way', () => {
    const result = chargeThroughTerminals(stepOf([cell(3.5)], line, { maxWatts: 100 }, { relaxedVolts: 3.8 }), {
      trace: true,
    });
    const first = result.trace![0]!;
    expect(first.amps).toBeCloseTo(200 / (3.5 + Math.sqrt(3.5 ** 2 + 4)), 9);
    for (const point of result.trace!) expect(point.amps * point.terminalVolts).toBeCloseTo(100, 6);
    expect(result.wattHours).toBeCloseTo((100 * result.stopAtS) / 3600, 5);
    expect(result.voltageLimitAtS).toBeNull();
  });

  // dE/dt = −I/(3600 Q), I = E/(R + R_load): E falls with T = 3600·Q·(R + R_load).
  it('a discharge into a resistor falls exponentially with the voltage itself, to 0.01 %', () => {
    const result = chargeThroughTerminals(
      stepOf([cell(3.9)], line, { loadOhm: 1.99 }, { relaxedVolts: 3.2 }, { direction: 'discharge' }),
    );
    expect(Math.abs(result.stopAtS / (3600 * 10 * 2 * Math.log(3.9 / 3.2)) - 1)).toBeLessThan(1e-4);
    expect(result.endAmps).toBeCloseTo(-1.6, 4);
    expect(result.ampHours).toBeCloseTo(7, 7);
  });

  // A pair through a resistor: the difference falls with T = 3600·R/(k₁ + k₂), k = dU/dQ.
  it('a pair through a resistor comes together exponentially, each by its capacity', () => {
    const first = { groups: [cell(3.8)], curve: line };
    const second = { groups: [cell(3.5, { capacityAh: 30 })], curve: line };
    const result = equaliseThroughResistor({ first, second, resistorOhm: 0.48, stopDifferenceVolts: 0.03 });
    const constant = (3600 * 0.5) / (1 / 10 + 1 / 30);
    expect(Math.abs(result.stopAtS / (constant * Math.log(10)) - 1)).toBeLessThan(1e-4);
    expect(result.peakAmps).toBeCloseTo(0.6, 12);
    expect(result.firstRelaxedVolts).toBeCloseTo(3.8 - (0.27 * 3) / 4, 9);
    expect(result.secondRelaxedVolts).toBeCloseTo(3.5 + 0.27 / 4, 9);
    expect(result.ampHours).toBeCloseTo(2.025, 8);
    // The other way round it is the same meeting, seen from the lower one.
    const mirrored = equaliseThroughResistor({
      first: second,
      second: first,
      resistorOhm: 0.48,
      stopDifferenceVolts: 0.03,
    });
    expect(mirrored.stopAtS).toBeCloseTo(result.stopAtS, 6);
    expect(mirrored.firstRelaxedVolts).toBeCloseTo(result.secondRelaxedVolts, 9);
  });

  it('resistances of nothing leave a taper of no length and a target that is still met', () => {
    const ideal = cell(3.5, { ohmicResistanceOhm: 0 });
    const result = chargeThroughTerminals(stepOf([ideal], line, { maxAmps: 5, setVolts: 3.7 }, { cutoffAmps: 0.5 }));
    expect(Math.abs(result.stopAtS - 1440)).toBeLessThan(0.5);
    expect(result.relaxedVolts).toBeCloseTo(3.7, 4);
  });

  it('a trace starts at 0 s, ends at the stop, and only the charge that has passed moves its states', () => {
    const input = stepOf([cell(3.5), cell(3.45)], line, { maxAmps: 5, setVolts: 7.3 }, { cutoffAmps: 1 });
    const plain = chargeThroughTerminals(input);
    const { trace, ...rest } = chargeThroughTerminals(input, { trace: true });
    expect(rest).toEqual(plain);
    expect(trace![0]!.s).toBe(0);
    expect(trace!.at(-1)!.s).toBe(plain.stopAtS);
    expect(trace!.at(-1)!.terminalVolts).toBeCloseTo(plain.endTerminalVolts, 9);
    let charge = 0;
    for (let k = 1; k < trace!.length; k++) {
      const [a, b] = [trace![k - 1]!, trace![k]!];
      expect(b.s).toBeGreaterThanOrEqual(a.s);
      charge += ((a.amps + b.amps) / 2) * ((b.s - a.s) / 3600);
      expect(b.soc[0]! - 0.5).toBeCloseTo(charge / 10, 2);
    }
  });
});
