import { curveFromHalfCells } from './half-cells';

const { exp, tanh } = Math;

/**
 * NMC 811 against graphite-SiOx, 5 Ah 21700 cell, 25 °C.
 *
 * Source: C.-H. Chen, F. Brosa Planella, K. O'Regan, D. Gastol, W. D. Widanage, E. Kendrick, J. Electrochem. Soc. 167
 * (2020) 080534; functions as in PyBaMM, Chen2020.py (BSD-3). The windows of the lithium fractions are from memory;
 * they give 2.498 V and 4.193 V at the ends, against the cell's limits of 2.5 V and 4.2 V.
 */
export const NMC811_CHEN_2020_LIMITS = { chargeVolts: 4.2, dischargeVolts: 2.5 } as const;

/** Graphite-SiOx against lithium, V. */
export function chenNegativeVolts(x: number): number {
  return (
    1.9793 * exp(-39.3631 * x) +
    0.2482 -
    0.0909 * tanh(29.8538 * (x - 0.1234)) -
    0.04478 * tanh(14.9159 * (x - 0.2769)) -
    0.0205 * tanh(30.4444 * (x - 0.6103))
  );
}

/** NMC 811 against lithium, V. */
export function chenPositiveVolts(y: number): number {
  return (
    -0.809 * y +
    4.4875 -
    0.0428 * tanh(18.5138 * (y - 0.5542)) -
    17.7326 * tanh(15.789 * (y - 0.3117)) +
    17.5842 * tanh(15.9308 * (y - 0.312))
  );
}

export const NMC811_CHEN_2020 = curveFromHalfCells(
  chenPositiveVolts,
  { empty: 0.9084, full: 0.2661 },
  chenNegativeVolts,
  { empty: 0.0279, full: 0.9014 },
);
