/**
 * Limits and doubts of a pack's readings. Sources in SOURCES.md, 'Numbers of a pack'; common practice and guesses are
 * marked there.
 */

/** A pack of road vehicles has up to some 200 groups; a reading with more is another file. */
export const MOST_GROUPS = 400;
/** No cell of any chemistry here reads more; beyond it somebody typed millivolts. A reversed group reads below 0. */
export const MOST_GROUP_VOLTS = 10;

/** The standard deviation of a normal sample is 1.4826 times its median absolute deviation (1/0.6745). */
export const SIGMA_PER_MAD = 1.4826;
/** From this robust z-score on a value is an outlier: Iglewicz and Hoaglin (1993). */
export const ODD_LIMIT = 3.5;
/** Least sigma that groups are judged by, V: with the limit above nobody is accused under 10.5 mV from the median. */
export const ODD_FLOOR_VOLTS = 0.003;
/** The standard error of a median is √(π/2) = 1.2533 times that of a mean, for a normal sample. */
export const MEDIAN_PER_MEAN_ERROR = 1.2533;

/** Scatter of a single reading of a group, V: the last digit of what shows whole millivolts. */
export const READING_VOLTS = 0.001;

/**
 * How far straight on beyond empty and full a rest voltage is taken for a charge. A dead group lies volts below the curve, and
 * the straight line there would invent a charge that no cell holds.
 */
export const BEYOND_SOC = 0.05;

/** A slope taken from a curve, as a share: two tables of one chemistry differ by 1 to 20 %. */
export const SLOPE_RELATIVE = 0.1;
/** Charge over which the error of a curve's slope is much the same: the distance of the points of a measured table. */
export const SLOPE_ALIKE_SOC = 0.1;
/** Charge that two readings must lie apart before the spread can be held against it. */
export const APART_SOC = 0.1;

/** What the trust in a target goes by: from the first on fair, from the second on poor. */
export const TARGET_TRUST = {
  /** Share of the capacity for one millivolt. From half a per cent on 4 mV are 2 %, more than a tolerance is worth. */
  socPerMillivolt: { fair: 0.005, poor: 0.01 },
  /** Share of the capacity that the hysteresis leaves open to either side: as the spread that balancing must take off. */
  hysteresisSoc: { fair: 0.02, poor: 0.05 },
  /** Age, s: a day's self-discharge and drain is under 1 mV, a week with the vehicle's standby load is not. */
  ageS: { fair: 86_400, poor: 7 * 86_400 },
  /** Fewer healthy groups than this: the median is one group's voltage or the mean of two. */
  healthy: { fair: 4, poor: 2 },
  /** Highest minus lowest healthy group, V: the pack itself is out of balance, and no target suits all. */
  spreadVolts: { fair: 0.02, poor: 0.05 },
  /** Time since load, s: 2 mV takes up to 47 min (measured), 10 min leave up to 5 mV. */
  restS: { fair: 3600, poor: 900 },
  /** Away from the temperature of the curve, K: 10 K are up to 3 mV. */
  celsiusAway: { fair: 10, poor: 25 },
} as const;
/** Below this temperature, near empty and near full, a rest takes half as long again: as for the check of a charge. */
export const SLOW_REST = { celsius: 15, belowSoc: 0.1, aboveSoc: 0.9, longer: 1.5 } as const;

/** A drop of the spread beyond this many standard deviations of two readings is one. */
export const CHANGE_SDS = 2;
/** Two balance charges that take off less than one standard deviation together (1 mV each) change nothing. */
export const NO_CHANGE_SDS = 1;
/** How much the drop of single balance charges scatters about their mean, as a share. */
export const BALANCE_RELATIVE = 0.3;
/** A balance charge counts for half of the one after it: the last says most of the next. */
export const BALANCE_FADE = 0.5;
/** Runs that a forecast is made of. */
export const FORECAST_RUNS = 400;

/** An instrument built into a pack and a hand meter that were never compared, V: ±5 mV and ±2 mV, and then some. */
export const OFFSET_UNKNOWN_VOLTS = 0.01;
