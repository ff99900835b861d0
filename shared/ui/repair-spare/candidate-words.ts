/** Words of a spare that is offered for a target. Pure. */
import type { CandidateDto, RepairDto } from '@/shared/contract/repair';
import { deviation } from '../format/quantities';

/** '12 days ago', 'yesterday' */
export const agoWords = (words: string): string => (words.endsWith('days') ? `${words} ago` : words);

/** How the spare will stand beside its neighbours, and where to match so that it does least harm. */
export function agreementWords(agreement: NonNullable<CandidateDto['agreement']>): string {
  const { fullMillivolts, lowMillivolts, bestMatchPercent } = agreement;
  const apart = `Beside its neighbours ${deviation(fullMillivolts / 1000)} when full, ${deviation(lowMillivolts / 1000)} at low charge.`;
  const most = Math.max(Math.abs(fullMillivolts), Math.abs(lowMillivolts));
  // Under a millivolt nothing is won by matching elsewhere.
  return most < 1 ? apart : `${apart} Least apart when matched at ${Math.round(bestMatchPercent)}\u00a0% of charge.`;
}

/** The plan screen with repair, spare and target filled in. */
export function planHref(repair: Pick<RepairDto, 'number' | 'failing' | 'target' | 'spare'>): string | null {
  const { spare, target, failing, number } = repair;
  if (spare === null || target === null) return null;
  const query = new URLSearchParams({
    spare: spare.id,
    target: target.volts.toFixed(3),
    tolerance: String(target.toleranceMillivolts),
    repair: number,
    ...(failing === null ? {} : { position: failing }),
  });
  return `/plan?${query.toString()}`;
}
