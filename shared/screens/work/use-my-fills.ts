import { useMyDay } from '@/shared/client/bench-plan';
import type { PlanBlockDto } from '@/shared/contract/bench-plan';

/** A fill whose time has come within this stands in front of what runs, ms. */
const soonMs = 10 * 60_000;

/** One's own fills of today that are not over, the begun one first. */
export function useMyFills(now: number) {
  const day = useMyDay();
  const fills = (day.data?.blocks ?? [])
    .filter(({ kind, stint }) => kind === 'fill' && (stint?.state === 'taken' || stint?.state === 'begun'))
    .sort((a, b) => Number(begun(b)) - Number(begun(a)) || a.from.localeCompare(b.from));
  const isNow = (fill: PlanBlockDto) => begun(fill) || Date.parse(fill.from) <= now + soonMs;
  return {
    fills,
    /** What is to be done now. */
    now: fills.filter(isNow),
    later: fills.filter((fill) => !isNow(fill)),
    renew: () => void day.refetch(),
  };
}

const begun = ({ stint }: PlanBlockDto): boolean => stint?.state === 'begun';
