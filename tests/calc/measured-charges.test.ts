import { CHEMISTRIES, chargeThroughTerminals, longResistance, voltsAtSoc } from '@/calc/index';
import { LMO_BLEND_PULSE_OHM } from '@/calc/parameters/lmo-blend-measured';
import { describe, expect, it } from 'vitest';
import { stepOf } from './reference/modules';

/*
 * Two measured charges of the 33 Ah LMO-blend cell whose rest voltages the curve holds (batterysim/equiv-circ-model,
 * commit 34752e7: cell-discharge-bitrode-1c.csv and cell-low-current-hppc-25c-2.csv), from empty to 4.2 V. A model of
 * first order is asked for about 5 % of the constant current and 3 % of the charge; the taper is worth ±30 % at best.
 */
const charges = [
  { amps: 15.3, endAmps: 1.0, constantS: 6899, totalS: 7791.1, ampHours: 30.3681, wattHours: 119.884 },
  { amps: 10, endAmps: 0.5, constantS: 10_559, totalS: 11_843.6, ampHours: 30.181, wattHours: 119.245 },
];

describe('measured charges of an LMO-blend cell, by its own curve and its 0.5 s resistance', () => {
  it.each(charges)('at $amps A to 4.2 V: constant current to 5 %, whole time to 10 %, Ah and Wh to 3 %', (measured) => {
    const pulse = LMO_BLEND_PULSE_OHM.after0s5[4]!;
    const long = longResistance('pulse-0.5s', pulse);
    const { curve, polarisationTimeConstantS } = CHEMISTRIES['lmo-blend'];
    const cell = {
      capacityAh: 30.5,
      ohmicResistanceOhm: pulse,
      polarisationResistanceOhm: long - pulse,
      polarisationTimeConstantS,
      restVolts: voltsAtSoc(curve, 0),
    };
    const result = chargeThroughTerminals(
      stepOf([cell], curve, { maxAmps: measured.amps, setVolts: 4.2 }, { cutoffAmps: measured.endAmps }),
    );
    const ratio = (actual: number, expected: number) => Math.abs(actual / expected - 1);
    expect(ratio(result.voltageLimitAtS!, measured.constantS)).toBeLessThan(0.05);
    expect(ratio(result.stopAtS, measured.totalS)).toBeLessThan(0.1);
    expect(ratio(result.ampHours, measured.ampHours)).toBeLessThan(0.03);
    expect(ratio(result.wattHours, measured.wattHours)).toBeLessThan(0.03);
  });
});
