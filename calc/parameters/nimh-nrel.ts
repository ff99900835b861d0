import type { OcvTable } from '../types';

/** Six cells in series, 6.5 Ah published (6.0 Ah at 6.5 A), from HPPC at 25 °C, V over the six. */
const SIX_CELLS = [7.237, 7.4047, 7.5106, 7.5873, 7.6459, 7.6909, 7.7294, 7.7666, 7.8078, 7.9143, 8.3645];

/**
 * Nickel–metal hydride, one cell.
 *
 * Source: NREL, ADVISOR data file ESS2_NIMH6, in sateesh12/impact-of-uc-on-li-ion, commit
 * d8096cbac445497706b89db6d2b8f7cdd50efdad.
 */
export const NIMH_NREL: OcvTable = {
  soc: [0, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9, 1],
  volts: SIX_CELLS.map((volts) => volts / 6),
};

/** Share of the charge that stays, five cycles of 90.3 to 91.0 %; source as above. */
export const NIMH_COULOMBIC_EFFICIENCY = 0.905;
