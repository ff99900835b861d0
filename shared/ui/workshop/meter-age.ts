import type { MeterDto } from '@/shared/contract/equipment';
import { date } from '../format/clock';
import { NBSP } from '../format/marks';

/** A meter is checked against another every so often; past this its readings count as wider (common practice: quarterly). */
export const meterCheckDays = 90;

export const isOldCheck = (meter: Pick<MeterDto, 'checkedAt'>, now: number): boolean =>
  meter.checkedAt === null || now - Date.parse(meter.checkedAt) > meterCheckDays * 86_400_000;

/** '9 June', 'never', or that there is no meter. The day of the week says nothing months later. */
export function meterChecked(meter: MeterDto | null, zone: string, now: number): string {
  if (meter === null) return 'no meter';
  if (meter.checkedAt === null) return 'never';
  return date(Date.parse(meter.checkedAt), zone, now).split(NBSP).slice(1).join(NBSP);
}

/** The sentence under the tables: whose checks are old, and what that does. */
export function oldChecks(meters: readonly MeterDto[], now: number): string | null {
  const old = meters.filter((meter) => isOldCheck(meter, now)).map((meter) => meter.name);
  if (old.length === 0) return null;
  return `${old.join(', ')}: not checked for more than ${meterCheckDays} days. Bands that rest on ${old.length === 1 ? 'it' : 'them'} are wider until ${old.length === 1 ? 'it is' : 'they are'} checked.`;
}
