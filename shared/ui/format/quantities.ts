/** Numbers with their units as the screens print them. Inputs are in the units of `calc` (V, A, Ah, °C, share 0…1). */
import { EN_DASH, NBSP, pointMarks, type LocaleMarks } from './marks';
import { fixed, shortest, signed } from './number';

const withUnit = (number: string, unit: string) => `${number}${NBSP}${unit}`;

/** A cell group's voltage: '3.968 V'. */
export const volts = (value: number, marks = pointMarks): string => withUnit(fixed(value, 3, marks), 'V');
/** The same without its unit, for columns and labels: '3.968'. */
export const voltsNumber = (value: number, marks = pointMarks): string => fixed(value, 3, marks);
/** A voltage at the clips or a limit, two decimals: '11.64 V'. */
export const clipVolts = (value: number, marks = pointMarks): string => withUnit(fixed(value, 2, marks), 'V');
export const clipVoltsNumber = (value: number, marks = pointMarks): string => fixed(value, 2, marks);

/** A difference of volts in whole millivolts: '102 mV', '−7 mV'. */
export const millivolts = (differenceVolts: number): string => withUnit(millivoltsNumber(differenceVolts), 'mV');
export const millivoltsNumber = (differenceVolts: number): string => fixed(differenceVolts * 1000, 0);
/** A deviation with its sign: '+2 mV', '−7 mV', '0 mV'. */
export const deviation = (differenceVolts: number): string => withUnit(deviationNumber(differenceVolts), 'mV');
export const deviationNumber = (differenceVolts: number): string => signed(differenceVolts * 1000, 0);
/** A tolerance: '±5 mV'. */
export const tolerance = (toleranceVolts: number): string => `±${millivolts(Math.abs(toleranceVolts))}`;
/** A deviation in words: '7 mV below', '2 mV above', 'on the mark'. */
export function deviationWords(differenceVolts: number): string {
  const size = millivoltsNumber(Math.abs(differenceVolts));
  if (size === '0') return 'on the mark';
  return `${withUnit(size, 'mV')} ${differenceVolts < 0 ? 'below' : 'above'}`;
}

/** A measured current: '10.0 A'. */
export const amps = (value: number, marks = pointMarks): string => withUnit(fixed(value, 1, marks), 'A');
export const ampsNumber = (value: number, marks = pointMarks): string => fixed(value, 1, marks);
/** A planned or rated current: '20 A', '12.5 A'. */
export const plannedAmps = (value: number, marks = pointMarks): string => withUnit(shortest(value, 1, marks), 'A');

/** A charge or capacity: '29.7 Ah'. */
export const ampHours = (value: number, marks = pointMarks): string => withUnit(fixed(value, 1, marks), 'Ah');
export const ampHoursNumber = (value: number, marks = pointMarks): string => fixed(value, 1, marks);
/** A rated capacity as it stands on the label: '66 Ah'. */
export const ratedAh = (value: number, marks = pointMarks): string => withUnit(shortest(value, 1, marks), 'Ah');
/** A measured capacity with its doubt: '60.4 (59.5–61.3)'; the unit stands in the heading. */
export const capacityBand = (low: number, likely: number, high: number, marks = pointMarks): string =>
  `${fixed(likely, 1, marks)} (${fixed(low, 1, marks)}${EN_DASH}${fixed(high, 1, marks)})`;

/** A temperature in whole degrees: '21 °C'. */
export const celsius = (value: number): string => withUnit(fixed(value, 0), '°C');
export const celsiusNumber = (value: number): string => fixed(value, 0);

/** A share 0…1 in whole per cent: '58 %'. */
export const share = (value: number): string => withUnit(fixed(value * 100, 0), '%');

/** A range with one unit: '10–45 °C'. */
export const range = (low: string, high: string, unit: string): string => withUnit(`${low}${EN_DASH}${high}`, unit);

/** A range in whole numbers: '6–14'; ends that round to the same number: '6'. */
export function wholeRange(low: number, high: number): string {
  const [from, to] = [fixed(low, 0), fixed(high, 0)];
  return from === to ? from : `${from}${EN_DASH}${to}`;
}
/** Likely first, and the band where it has a width: '7 mV (5–9)', '8 mV' */
export const millivoltsWithBand = ({ p10, p50, p90 }: { p10: number; p50: number; p90: number }): string =>
  `${millivolts(p50)}${bandBeside(p50 * 1000, p10 * 1000, p90 * 1000)}`;

/** The band in whole numbers behind its middle, ' (5–9)'; '' where it is no wider than the middle itself. */
export function bandBeside(likely: number, low: number, high: number): string {
  const range = wholeRange(low, high);
  return range === fixed(likely, 0) ? '' : ` (${range})`;
}

/** A power: '1.2 kW', '640 W'. */
export const watts = (value: number, marks: LocaleMarks = pointMarks): string =>
  Math.abs(value) >= 1000 ? withUnit(fixed(value / 1000, 1, marks), 'kW') : withUnit(fixed(value, 0, marks), 'W');
