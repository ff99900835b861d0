/** Amps of a reading against the charge they belong to: one sentence for the form and the API. */
import type { Direction } from './plan';

/** The sentence where amps flow out of a module that is being charged; null: they may. A discharge is typed either way. */
export function ampsProblem(amps: number, direction: Direction): string | null {
  if (direction === 'discharge' || amps >= 0) return null;
  const size = `${(-amps).toFixed(1)}\u00a0A`;
  return `−${size} would be a discharge; this one charges. ${size}?`;
}
