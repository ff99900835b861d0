import type { Meter } from '../entities/meter';

/** A cross-check counts for this long, days. Common practice: once a quarter. */
export const CROSS_CHECK_GOOD_DAYS = 90;

const DAY_MS = 86_400_000;
/** Hand meter within its cross-check, V: the last digits of the comparison. A guess. */
const FRESH_OFFSET_SD_VOLTS = 0.001;
/** Hand meter whose cross-check is old or was never made, V: what an ordinary one is good for on its 6 V range. A guess. */
const OLD_OFFSET_SD_VOLTS = 0.002;
/** A charger's own voltmeter at its terminals, V: cross-checked, and cross-checked too long ago. Guesses. */
const FRESH_CHARGER_SD_VOLTS = 0.002;
const OLD_CHARGER_SD_VOLTS = 0.005;

/** True where the meter was cross-checked, and not longer ago than that counts. */
export const isCrossChecked = (meter: Pick<Meter, 'checkedAt'>, now: number): boolean =>
  meter.checkedAt !== null && now - meter.checkedAt <= CROSS_CHECK_GOOD_DAYS * DAY_MS;

/**
 * What the groups truly were: the meter's known offset taken off each reading, V.
 * Without a meter the readings stand as they are.
 */
export const correctedVolts = (volts: readonly number[], meter: Pick<Meter, 'offsetMillivolts'> | null): number[] =>
  volts.map((reading) => correctedVolt(reading, meter));

/** The same for one reading; rounded to the microvolt, so that 3.968 − 0.002 is 3.966. */
export const correctedVolt = (volts: number, meter: Pick<Meter, 'offsetMillivolts'> | null): number =>
  meter === null ? volts : Math.round((volts - meter.offsetMillivolts / 1000) * 1e6) / 1e6;

/**
 * Standard deviation of what is left of the offsets of the meters that read pack and spare, V; the least trusted of
 * them counts. Undefined where no reading names a meter: the planner's own default stands then.
 */
export function meterOffsetSdVolts(meters: readonly Pick<Meter, 'checkedAt'>[], now: number): number | undefined {
  if (meters.length === 0) return undefined;
  return meters.every((meter) => isCrossChecked(meter, now)) ? FRESH_OFFSET_SD_VOLTS : OLD_OFFSET_SD_VOLTS;
}

/** The same for a charger's own voltmeter; null where it has none named, or it was never cross-checked. */
export function chargerOffsetSdVolts(meter: Pick<Meter, 'checkedAt'> | null, now: number): number | null {
  if (meter === null || meter.checkedAt === null) return null;
  return isCrossChecked(meter, now) ? FRESH_CHARGER_SD_VOLTS : OLD_CHARGER_SD_VOLTS;
}
