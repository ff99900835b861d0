import { curveFromHalfCells } from './half-cells';

const { exp, tanh } = Math;

/**
 * LMO against LTO, 25 °C.
 *
 * LMO: M. Doyle, J. Newman, A. S. Gozdz, C. N. Schmutz, J.-M. Tarascon, J. Electrochem. Soc. 143 (1996) 1890 (volume
 * and page from memory), function as in TRI-AMDD/mpet, LiMn2O4_ss.py. LTO: its plateau at 1.55 V against lithium
 * (Vasileiadis 2017, in the same repository), taken as flat throughout.
 */
export const LTO_PLATEAU_VOLTS = 1.55;

/** LMO against lithium, V; for a lithium fraction of 0.17 to 0.998. */
export function doyleLmoVolts(y: number): number {
  return (
    4.19829 +
    0.0565661 * tanh(-14.5546 * y + 8.60942) -
    0.0275479 * ((0.998432 - y) ** -0.492465 - 1.90111) -
    0.157123 * exp(-0.04738 * y ** 8) +
    0.810239 * exp(-40 * (y - 0.133875))
  );
}

/**
 * Rest voltage of the whole cell. The window of the LMO, 0.995 to 0.18, is a guess that gives 2.04 V and 2.70 V at the
 * ends; a real cell is often limited by its LTO and falls off earlier. A workshop should put in its own curve.
 */
export const LTO_LMO_CURVE = curveFromHalfCells(doyleLmoVolts, { empty: 0.995, full: 0.18 }, () => LTO_PLATEAU_VOLTS, {
  empty: 0,
  full: 1,
});
