import { curveFromHalfCells } from './half-cells';

const { exp, tanh } = Math;

/**
 * NMC against graphite, 5 Ah pouch cell, 25 °C.
 *
 * Source: P. Mohtat et al. (2020), functions as in PyBaMM, Mohtat2020.py (BSD-3). Windows of the lithium fractions
 * from that file's electrode sizes and lithium balance: 4.968 Ah between 2.81 V and 4.20 V.
 */
export const NMC_MOHTAT_2020_LIMITS = { chargeVolts: 4.2, dischargeVolts: 2.8 } as const;

/** Graphite against lithium, V. */
export function mohtatNegativeVolts(x: number): number {
  return (
    0.063 +
    0.8 * exp(-75 * (x + 0.001)) -
    0.012 * tanh((x - 0.127) / 0.016) -
    0.0118 * tanh((x - 0.155) / 0.016) -
    0.0035 * tanh((x - 0.22) / 0.02) -
    0.0095 * tanh((x - 0.19) / 0.013) -
    0.0145 * tanh((x - 0.49) / 0.02) -
    0.08 * tanh((x - 1.03) / 0.055)
  );
}

/** NMC against lithium, V. */
export function mohtatPositiveVolts(y: number): number {
  return (
    4.3452 +
    y * (-1.6518 + y * (1.6225 + y * (-2.0843 + y * (3.5146 - y * 2.2166)))) -
    0.5623e-4 * exp(109.451 * y - 100.006)
  );
}

export const NMC_MOHTAT_2020 = curveFromHalfCells(
  mohtatPositiveVolts,
  { empty: 0.8907, full: 0.0335 },
  mohtatNegativeVolts,
  { empty: 0.0017, full: 0.8334 },
);
