import type { OcvTable } from '../types';

const SOC = [
  0.0, 0.01, 0.02, 0.03, 0.05, 0.1, 0.15, 0.2, 0.25, 0.3, 0.35, 0.4, 0.45, 0.5, 0.55, 0.6, 0.65, 0.7, 0.75, 0.8, 0.85,
  0.9, 0.95, 0.97, 0.98, 0.99, 1.0,
];

/**
 * Graphite against LFP, 26650 cell of 2.3 Ah nominal (2.06 Ah found), 25 °C: the branch of a C/30 discharge, the branch
 * of a C/30 charge, and their mean. Each branch is normalised to its own ampere-hours. On the plateau the branches lie
 * 24 to 58 mV apart: a cell rests on one or the other side of the mean, as it was last charged or discharged.
 *
 * Source: measurement in batterysim/esctoolbox-python, commit e82af551ff09d738ffff222915e8586a4b5e3160 (MIT), data of
 * the toolbox to G. L. Plett, Battery Management Systems, vol. 1 (Artech House 2015), scripts 1 and 3 of the OCV test.
 */
export const LFP_MEASURED_DISCHARGE: OcvTable = {
  soc: SOC,
  volts: [
    2.0, 2.6913, 2.8245, 2.9066, 3.013, 3.1625, 3.1979, 3.2217, 3.2374, 3.2507, 3.2645, 3.283, 3.2893, 3.2914, 3.2938,
    3.2975, 3.3027, 3.3105, 3.3247, 3.3316, 3.3353, 3.3399, 3.3534, 3.3757, 3.4037, 3.4568, 3.5799,
  ],
};

/** The C/30 charge branch; source as above. */
export const LFP_MEASURED_CHARGE: OcvTable = {
  soc: SOC,
  volts: [
    2.3213, 2.7573, 2.8816, 2.9592, 3.0615, 3.2041, 3.2392, 3.2682, 3.2911, 3.3088, 3.3189, 3.3202, 3.3222, 3.3248,
    3.3293, 3.3361, 3.343, 3.3501, 3.3572, 3.359, 3.3604, 3.3636, 3.3785, 3.4033, 3.4329, 3.4884, 3.6001,
  ],
};

/** The mean of both branches; source as above. */
export const LFP_MEASURED_MEAN: OcvTable = {
  soc: SOC,
  volts: [
    2.1606, 2.7243, 2.8531, 2.9329, 3.0372, 3.1833, 3.2186, 3.245, 3.2642, 3.2797, 3.2917, 3.3016, 3.3058, 3.3081,
    3.3115, 3.3168, 3.3228, 3.3303, 3.341, 3.3453, 3.3479, 3.3518, 3.3659, 3.3895, 3.4183, 3.4726, 3.59,
  ],
};
