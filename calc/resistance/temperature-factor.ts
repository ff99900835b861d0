import { CalcInputError } from '../errors';

const GAS_CONSTANT = 8.314462618;
const REFERENCE_KELVIN = 298.15;
/**
 * Activation energies, J/mol. Below 25 °C the middle of 20 to 24 kJ/mol, from 10 °C to 25 °C ratios of 1.5 to 1.7 on a
 * 33 Ah LMO-blend cell; above it the same cell fell only by 1.03 to 1.07 up to 40 °C, which is 2.6 kJ/mol
 * (batterysim, equiv-circ-model).
 */
const COLD_ACTIVATION = 22_000;
const WARM_ACTIVATION = 2_600;

/**
 * Resistance at a temperature as a multiple of that at 25 °C: e^(Ea/R·(1/T − 1/298.15 K)), Arrhenius.
 *
 * @param celsius −60 to 120
 * @throws CalcInputError outside that range
 * @example resistanceTemperatureFactor(25) === 1
 */
export function resistanceTemperatureFactor(celsius: number): number {
  if (!(celsius >= -60 && celsius <= 120)) throw new CalcInputError('celsius', celsius, 'between −60 and 120');
  const activation = celsius < 25 ? COLD_ACTIVATION : WARM_ACTIVATION;
  return Math.exp((activation / GAS_CONSTANT) * (1 / (celsius + 273.15) - 1 / REFERENCE_KELVIN));
}
