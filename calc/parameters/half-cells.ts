import type { OcvTable } from '../types';

/** Lithium fraction of an electrode in the empty and in the full cell. */
export interface Window {
  empty: number;
  full: number;
}

/** Grid of a curve that is given as functions: every 1 %, finer below 4 % where the curves bend most. */
const GRID = [0, 0.0025, 0.005, 0.0075, 0.01, 0.015, 0.02, 0.025, 0.03, 0.035];
for (let percent = 4; percent <= 100; percent++) GRID.push(percent / 100);

/**
 * Open-circuit voltage of a whole cell from two half-cell potentials: U(z) = U_pos(y(z)) − U_neg(x(z)), the lithium
 * fractions going in straight lines through their windows.
 *
 * @param positive V against lithium by lithium fraction
 * @param negative the same
 */
export function curveFromHalfCells(
  positive: (fraction: number) => number,
  positiveWindow: Window,
  negative: (fraction: number) => number,
  negativeWindow: Window,
): OcvTable {
  const at = (window: Window, soc: number) => window.empty + soc * (window.full - window.empty);
  return {
    soc: [...GRID],
    volts: GRID.map((soc) => positive(at(positiveWindow, soc)) - negative(at(negativeWindow, soc))),
  };
}
