/** How much of today's waiting was put to use. */
import type { WaitsTodayDto } from '@/shared/contract/bench-plan';
import { usesWaitOf } from '../waits/uses-wait';
import { openingOf } from '../working-hours';
import { startOfDay } from './days';
import type { BenchGround } from './ground';
import { common, lengthOf, united, type Stretch } from './spans';
import { stintSpan } from './stint-spans';

/**
 * Of the hours in which repairs have waited today: used where other work was done in them or has been taken, the rest is
 * lost. Hours outside the workshop's are nobody's to use. Each repair counts for itself.
 */
export function waitsToday(ground: BenchGround): WaitsTodayDto {
  const { now, workshop, waits, repairs, files, stints } = ground;
  const from = startOfDay(workshop.zone, now);
  const opening = openingOf(workshop, now);
  const hours: Stretch[] = opening === null ? [] : [opening];
  let [usedMs, lostMs] = [0, 0];
  for (const repairId of new Set(waits.map((wait) => wait.repairId))) {
    const charges = files.flatMap(({ charge }) => (charge.repairId === repairId ? [charge] : []));
    const uses = usesWaitOf(repairs.get(repairId)?.personIds ?? [], charges);
    const waited = waits
      .filter((wait) => wait.repairId === repairId)
      .map(({ fromAt, toAt }) => ({ from: Math.max(from, fromAt), to: Math.min(now, toAt ?? now) }));
    const counted = common(united(waited), hours);
    const filled = stints.filter(uses).map((stint) => stintSpan(stint, now));
    const used = lengthOf(common(counted, united(filled)));
    usedMs += used;
    lostMs += lengthOf(counted) - used;
  }
  return { usedS: Math.round(usedMs / 1000), lostS: Math.round(lostMs / 1000) };
}
