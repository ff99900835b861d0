import type { ChannelParameters, ModuleParameters } from '../plan-types';

/** Below and above these a module is charged with less current, °C: the settings of charger chips (JEITA). */
export const COLD_BELOW_CELSIUS = 10;
export const WARM_ABOVE_CELSIUS = 45;

/** Share of the type's charge current that its temperature leaves: 1 where the type says nothing of it. */
export function moduleCurrentShare(module: ModuleParameters, celsius: number): number {
  if (celsius < COLD_BELOW_CELSIUS) return module.coldCurrentShare ?? 1;
  if (celsius > WARM_ABOVE_CELSIUS) return module.warmCurrentShare ?? 1;
  return 1;
}

/** What a channel gives in a room of this temperature, A. */
export function channelAmps(channel: ChannelParameters, maxAmps: number, roomCelsius: number): number {
  const { derating } = channel;
  return derating && roomCelsius > derating.aboveCelsius ? maxAmps * derating.ampsShare : maxAmps;
}

/** The next lower that its display can show; the lowest step at least. */
export function snappedAmps(channel: ChannelParameters, amps: number): number {
  const step = channel.displayStepAmps ?? 0;
  if (!(step > 0) || amps < step) return amps;
  return Math.round(Math.floor(amps / step + 1e-9) * step * 1e6) / 1e6;
}

/**
 * How much wider a current is off than the spread of all currents says, since the display rounds it: √(sd² + (step/A)²/12)
 * over sd; 1 without a step.
 */
export function ampsWidening(channel: ChannelParameters, amps: number | null, currentRelative: number): number {
  const step = channel.displayStepAmps ?? 0;
  if (!(step > 0) || !(currentRelative > 0) || amps === null || !(amps > 0)) return 1;
  return Math.hypot(currentRelative, step / amps / Math.sqrt(12)) / currentRelative;
}
