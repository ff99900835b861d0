import { requireFinite } from '../require';
import type { TemperatureCoefficient } from './chemistries';

/**
 * Volts a cell rests away from its 25 °C curve at another temperature: dU/dT(z)·(T − 25 °C), V; 0 where the chemistry's
 * coefficient is not known.
 */
export function temperatureVolts(coefficient: TemperatureCoefficient | null, soc: number, celsius: number): number {
  requireFinite('celsius', celsius);
  if (!coefficient) return 0;
  const { soc: at, voltsPerKelvin } = coefficient;
  const last = at.length - 1;
  const z = Math.min(at[last]!, Math.max(at[0]!, requireFinite('soc', soc)));
  let k = 0;
  while (k < last - 1 && z > at[k + 1]!) k++;
  const part = (z - at[k]!) / (at[k + 1]! - at[k]!);
  return (voltsPerKelvin[k]! + part * (voltsPerKelvin[k + 1]! - voltsPerKelvin[k]!)) * (celsius - 25);
}
