import type { OcvTable } from '../types';

/**
 * Graphite against an LMO-layered blend, EV pouch cell of 33.1 Ah rated (30.50 Ah found), 25 °C: rest voltages after
 * 1 h, between steps of C/3 discharge.
 *
 * Source: measurement in batterysim/equiv-circ-model, commit 34752e72792dfeeb703d483b3c1469e4ae517c46 (MIT). Nothing
 * was measured below 6.1 % charge: the straight extension there reads too high near empty.
 */
export const LMO_BLEND_MEASURED: OcvTable = {
  soc: [0.061, 0.1653, 0.2697, 0.374, 0.4783, 0.5826, 0.6869, 0.7912, 0.8956, 1.0002],
  volts: [3.531, 3.723, 3.802, 3.869, 3.909, 3.949, 3.984, 4.048, 4.086, 4.182],
};

/** Resistance of that cell at −30 A, 25 °C, ohm, at the same states of charge: after 0.5 s, 10 s and 30 s. */
export const LMO_BLEND_PULSE_OHM = {
  after0s5: [1.667, 1.567, 1.567, 1.567, 1.567, 1.567, 1.533, 1.567, 1.567, 1.767].map((milli) => milli / 1000),
  after10s: [2.533, 2.067, 2.033, 2.033, 2.033, 2.033, 2.0, 2.2, 2.133, 2.6].map((milli) => milli / 1000),
  after30s: [3.933, 2.533, 2.567, 2.533, 2.5, 2.5, 2.433, 2.833, 2.633, 3.333].map((milli) => milli / 1000),
};
