import { CHEMISTRIES, chemistryParameters, slopeAtSoc, voltsAtSoc } from '@/calc/index';
import { LFP_MEASURED_CHARGE, LFP_MEASURED_DISCHARGE, LFP_MEASURED_MEAN } from '@/calc/parameters/lfp-measured';
import { LMO_BLEND_MEASURED } from '@/calc/parameters/lmo-blend-measured';
import { doyleLmoVolts, LTO_LMO_CURVE, LTO_PLATEAU_VOLTS } from '@/calc/parameters/lto-half-cells';
import { NIMH_NREL } from '@/calc/parameters/nimh-nrel';
import { mohtatNegativeVolts, mohtatPositiveVolts, NMC_MOHTAT_2020 } from '@/calc/parameters/nmc-mohtat-2020';
import { chenNegativeVolts, chenPositiveVolts, NMC811_CHEN_2020 } from '@/calc/parameters/nmc811-chen-2020';
import { describe, expect, it } from 'vitest';

/** Share of capacity for 1 mV, %. */
const percentPerMillivolt = (table: typeof NIMH_NREL, soc: number) => 0.1 / slopeAtSoc(table, soc);

describe('published half-cell potentials, to 0.01 mV', () => {
  // Chen et al., J. Electrochem. Soc. 167 (2020) 080534, functions of PyBaMM Chen2020.py evaluated apart.
  it('NMC 811 and graphite-SiOx of Chen 2020', () => {
    [0.40652, 0.13309, 0.09202].forEach((v, i) => expect(chenNegativeVolts([0.1, 0.5, 0.9][i]!)).toBeCloseTo(v, 5));
    [4.20539, 3.97196, 3.5682].forEach((v, i) => expect(chenPositiveVolts([0.3, 0.5, 0.9][i]!)).toBeCloseTo(v, 5));
  });

  // Mohtat et al. (2020), functions of PyBaMM Mohtat2020.py evaluated apart.
  it('NMC and graphite of Mohtat 2020', () => {
    [0.19389, 0.0995, 0.09166].forEach((v, i) => expect(mohtatNegativeVolts([0.1, 0.5, 0.8][i]!)).toBeCloseTo(v, 5));
    [3.96249, 3.81478, 3.68453].forEach((v, i) => expect(mohtatPositiveVolts([0.3, 0.5, 0.85][i]!)).toBeCloseTo(v, 5));
  });

  // Doyle et al., J. Electrochem. Soc. 143 (1996) 1890, function of TRI-AMDD/mpet LiMn2O4_ss.py evaluated apart.
  it('LMO of Doyle 1996, and 2.554 V against the LTO plateau of 1.55 V', () => {
    [4.1769, 4.1183, 4.104, 3.992, 3.9539].forEach((v, i) =>
      expect(doyleLmoVolts([0.2, 0.3, 0.5, 0.7, 0.9][i]!)).toBeCloseTo(v, 4),
    );
    expect(doyleLmoVolts(0.5) - LTO_PLATEAU_VOLTS).toBeCloseTo(2.554, 3);
  });
});

describe('whole-cell curves', () => {
  // The two published sets evaluated apart at 0, 10 … 100 %, to the millivolt.
  it.each([
    {
      name: 'Chen 2020',
      table: NMC811_CHEN_2020,
      volts: [2.498, 3.258, 3.449, 3.548, 3.634, 3.708, 3.809, 3.924, 4.022, 4.094, 4.193],
    },
    {
      name: 'Mohtat 2020',
      table: NMC_MOHTAT_2020,
      volts: [2.81, 3.511, 3.585, 3.639, 3.671, 3.716, 3.797, 3.88, 3.971, 4.077, 4.2],
    },
  ])('$name gives the published voltages at every 10 % to 1 mV', ({ table, volts }) => {
    volts.forEach((v, i) => expect(Math.abs(voltsAtSoc(table, i / 10) - v)).toBeLessThan(0.001));
  });

  // NREL, ADVISOR file ESS2_NIMH6: V over six cells.
  it('NiMH is a sixth of the module measured by NREL', () => {
    [7.237, 7.6909, 7.8078, 8.3645].forEach((v, i) =>
      expect(6 * voltsAtSoc(NIMH_NREL, [0, 0.5, 0.8, 1][i]!)).toBeCloseTo(v, 10),
    );
  });

  // batterysim/esctoolbox-python, C/30 branches at 25 °C.
  it('the LFP branches lie 24 to 58 mV apart on the plateau, with the mean halfway', () => {
    for (let percent = 30; percent <= 95; percent += 5) {
      const soc = percent / 100;
      const charge = voltsAtSoc(LFP_MEASURED_CHARGE, soc);
      const discharge = voltsAtSoc(LFP_MEASURED_DISCHARGE, soc);
      expect(charge - discharge).toBeGreaterThan(0.0235);
      expect(charge - discharge).toBeLessThan(0.0585);
      expect(Math.abs((charge + discharge) / 2 - voltsAtSoc(LFP_MEASURED_MEAN, soc))).toBeLessThan(0.0001);
    }
  });

  // Percent of capacity a millivolt, worked out apart from the same sources; printed to two decimals.
  it.each([
    { name: 'LMO blend', table: LMO_BLEND_MEASURED, shares: [0.13, 0.14, 0.25, 0.26, 0.31, 0.18, 0.25, 0.18] },
    { name: 'LFP', table: LFP_MEASURED_MEAN, shares: [0.22, 0.37, 0.85, 1.82, 0.89, 0.57, 1.54, 0.82] },
    { name: 'NiMH', table: NIMH_NREL, shares: [0.67, 0.9, 1.18, 1.45, 1.59, 1.53, 1.01, 0.35] },
  ])(
    '$name: 1 mV at 20 to 90 % of charge is the tabled share of capacity to 10 % of it or 0.01',
    ({ table, shares }) => {
      shares.forEach((share, i) => {
        const soc = 0.2 + i / 10;
        expect(Math.abs(percentPerMillivolt(table, soc) - share), `at ${soc}`).toBeLessThan(
          Math.max(0.011, 0.1 * share),
        );
      });
    },
  );

  // Energies 12 (2019) 2685: LTO cells work between 1.5 V and 2.8 V.
  it('LTO stays between 1.5 V and 2.8 V from empty to full', () => {
    expect(voltsAtSoc(LTO_LMO_CURVE, 0)).toBeGreaterThan(1.5);
    expect(voltsAtSoc(LTO_LMO_CURVE, 1)).toBeLessThan(2.8);
  });
});

describe('the chemistries', () => {
  it.each(Object.values(CHEMISTRIES).map((chemistry) => ({ id: chemistry.id, chemistry })))(
    '$id: its curve rises inside its limits, and its floor is not above them',
    ({ chemistry }) => {
      const { curve, chargeLimitVolts, dischargeLimitVolts, recoveryFloorVolts } = chemistry;
      expect(voltsAtSoc(curve, 0.95)).toBeLessThan(chargeLimitVolts);
      expect(voltsAtSoc(curve, 0.1)).toBeGreaterThan(dischargeLimitVolts);
      expect(recoveryFloorVolts).toBeLessThanOrEqual(dischargeLimitVolts);
      expect(chemistry.storageSoc.low).toBeLessThan(chemistry.storageSoc.high);
    },
  );

  it('refuses an unknown one by name', () => {
    expect(() => chemistryParameters('lead' as 'lfp')).toThrow(/nmc, lmo-blend, lfp, lto, nimh/);
  });
});
