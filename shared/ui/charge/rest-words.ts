/** Where a rest will settle and when it has rested enough, in words. Pure; instants are epoch ms. */
import type { ChargeDto, RestDto } from '@/shared/contract/charge';
import { moment } from '../format/clock';
import { duration } from '../format/duration';
import { EN_DASH, type LocaleMarks } from '../format/marks';
import { volts, voltsNumber } from '../format/quantities';

/** More groups than this are told by their lowest and highest. */
const mostTold = 4;

/** 'Settles at 3.957 V (3.955–3.959)', each group its own line; of many the one that settles lowest and the highest. */
export function settlesWords({ settledVolts }: Pick<RestDto, 'settledVolts'>, marks: LocaleMarks): string[] {
  const told = settledVolts.map((band, group) => ({
    band,
    name: settledVolts.length === 1 ? 'Settles' : `G${group + 1} settles`,
  }));
  const byVolts = [...told].sort((a, b) => a.band.p50 - b.band.p50);
  const shown = told.length > mostTold ? [byVolts[0]!, byVolts.at(-1)!] : told;
  return shown.map(
    ({ band, name }) =>
      `${name} at ${volts(band.p50, marks)} (${voltsNumber(band.p10, marks)}${EN_DASH}${voltsNumber(band.p90, marks)})`,
  );
}

/** When the minimum rest is over, epoch ms; null while the current has not ended. */
export const leastRestEnd = ({ currentEndAt, minRestS }: Pick<ChargeDto, 'currentEndAt' | 'minRestS'>) =>
  currentEndAt === null ? null : Date.parse(currentEndAt) + minRestS * 1000;

/** The check is due before the minimum rest is over: the readings have said so. */
export function isDueEarly(charge: Pick<ChargeDto, 'stage' | 'currentEndAt' | 'minRestS'>, now: number): boolean {
  const least = leastRestEnd(charge);
  return charge.stage === 'check-due' && least !== null && now < least;
}

/**
 * 'Rested enough at about 14:20.'
 * @param due the check is due already, before the minimum rest is over
 */
export function enoughWords(
  { restedEnough, enoughAt }: Pick<RestDto, 'restedEnough' | 'enoughAt'>,
  at: (instant: number) => string,
  due = false,
): string {
  // Two readings that agree end the rest too, where the forecast from few of them is not sure yet.
  if (due && !restedEnough) return 'Readings ten minutes apart agree: the check may come now.';
  if (enoughAt === null) return 'It still drifts: the readings do not see it rested enough within a day.';
  return restedEnough
    ? `Rested enough since ${at(Date.parse(enoughAt))}: the check may come now.`
    : `Rested enough at about ${at(Date.parse(enoughAt))}.`;
}

/** Where a check now would come before the minimum rest is over; null: it would not. */
export function earlyCheckWords(
  charge: Pick<ChargeDto, 'stage' | 'checkDueAt' | 'currentEndAt' | 'minRestS'>,
  { now, zone, marks }: { now: number; zone: string; marks: LocaleMarks },
): string | null {
  const due = charge.checkDueAt === null ? null : Date.parse(charge.checkDueAt);
  if (due !== null && now < due)
    return `The rest is over at ${moment(due, zone, now, marks)}, in ${duration((due - now) / 1000, 'minute')}. A check before then counts, and the log says that it was early.`;
  const least = leastRestEnd(charge);
  if (least === null || !isDueEarly(charge, now)) return null;
  return `The readings say that it has settled. The minimum rest is over in ${duration((least - now) / 1000, 'minute')}: a check before then counts and is marked early.`;
}
