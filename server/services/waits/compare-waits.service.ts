import type { CompareWaitsDto, CompareWaitsQuery, WaitPeriodDto } from '@/shared/contract/waits';
import { FEW_CHARGES } from '@/shared/contract/waits';
import type { Deps, Member } from '../../deps';
import { waitLengths, waitTotals, type WaitFilter } from '../../repositories/wait-figures.repository';
import { durationText } from '../charge-words';
import { hours, spreadDto } from './wait-dto';
import { waitAsk } from './wait-filter';
import type { DayPeriod } from './wait-period';
import type { CompareAnswer } from './waits-tasks';

const WEEK_MS = 7 * 86_400_000;
/** Of the draws: the same charges give the same interval. */
const SEED = 7;

/** The period of the filters against another one, and whether the difference may be chance. */
export async function compareWaits(
  deps: Deps,
  member: Member,
  query: CompareWaitsQuery,
  now: number,
): Promise<CompareWaitsDto> {
  const { manager } = deps.dataSource;
  const { compareFrom, compareTo, ...filters } = query;
  const then = await waitAsk(manager, member.workshopId, filters, now);
  const before = await waitAsk(manager, member.workshopId, { ...filters, from: compareFrom, to: compareTo }, now);
  const periodDto = async (filter: WaitFilter, period: DayPeriod): Promise<WaitPeriodDto> => {
    const totals = await waitTotals(manager, filter);
    const weeks = (Math.min(period.toAt, Math.max(now, period.fromAt + 1)) - period.fromAt) / WEEK_MS;
    return {
      ...spreadDto(totals),
      ...{ from: period.from, to: period.to, lostHoursPerWeek: hours(totals.lostMs) / weeks },
    };
  };
  const first = await periodDto(before.filter, before.period);
  const second = await periodDto(then.filter, then.period);
  const enough = Math.min(first.charges, second.charges) >= FEW_CHARGES;
  const found = !enough
    ? null
    : await deps.waits.run({
        kind: 'compare',
        before: await waitLengths(manager, before.filter),
        then: await waitLengths(manager, then.filter),
        seed: SEED,
      });
  return { before: first, then: second, difference: found && differenceDto(found) };
}

function differenceDto({ value, low, high, p }: CompareAnswer): CompareWaitsDto['difference'] {
  const clear = p < 0.05 && (low > 0 || high < 0);
  return {
    ...{ medianS: value / 1000, lowS: low / 1000, highS: high / 1000, p, clear },
    text: `${sentence(value, clear)}: ${signed(value)}, ${signed(low)} to ${signed(high)} with 95\u00a0% (bootstrap of the medians); rank test p ${pText(p)}.`,
  };
}

const sentence = (ms: number, clear: boolean): string =>
  !clear ? 'No clear difference' : ms < 0 ? 'Shorter' : 'Longer';
const signed = (ms: number): string => {
  const size = durationText(Math.abs(ms) / 1000);
  return Math.round(ms / 60_000) === 0 ? size : `${ms < 0 ? '\u2212' : '+'}${size}`;
};
const pText = (p: number): string => (p < 0.001 ? '< 0.001' : `= ${p.toFixed(3)}`);
