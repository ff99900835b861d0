/** What the readings after the fit prove, in words. Pure. */
import type { PackReadingDto } from '@/shared/contract/pack-reading';
import type { BalanceForecastDto, RepairDto } from '@/shared/contract/repair';
import { EN_DASH } from '../format/marks';
import { millivolts } from '../format/quantities';

/** Readings that count, the first first. */
export const spreadLog = (readings: readonly PackReadingDto[]): PackReadingDto[] =>
  readings.filter(({ setAside }) => setAside === null).sort((a, b) => Date.parse(a.at) - Date.parse(b.at));

/** 'Arrival', 'After the fit', 'Balance charge 2' */
export const stageWords = ({ stage, balanceCount }: Pick<PackReadingDto, 'stage' | 'balanceCount'>): string =>
  stage === 'arrival' ? 'Arrival' : stage === 'after-fit' ? 'After the fit' : `Balance charge ${balanceCount ?? 1}`;

/** The reading after the fit against what was expected of it; null: one of the two is missing. */
export function fitVerdict(
  log: readonly PackReadingDto[],
  expected: RepairDto['expectedAfterFit'],
): { good: boolean; text: string } | null {
  const fit = log.filter(({ stage }) => stage === 'after-fit').at(-1);
  if (!fit || !expected) return null;
  const spread = fit.spreadMillivolts;
  const [low, high] = [Math.round(expected.low), Math.round(expected.high)];
  const band = `${low === high ? '' : `${low}${EN_DASH}`}${millivolts(high / 1000)}`;
  const said = `${millivolts(spread / 1000)} after the fit, ${band} expected`;
  if (spread > expected.high)
    return {
      good: false,
      // Once a balance charge was read the lid is on.
      text: `Worse than forecast: ${said}.${log.at(-1) === fit ? ' Check the module’s place and its leads before the lid is sealed.' : ''}`,
    };
  return { good: true, text: `${spread < expected.low ? 'Better than forecast' : 'As forecast'}: ${said}.` };
}

const notConverging: Record<NonNullable<BalanceForecastDto['doesNotConverge']>, string> = {
  'capacity-spread': 'It does not converge: the log looks like a spread of capacity, which never balances away.',
  'no-change': 'It does not converge: the last balance charges changed nothing. Check that the pack balances at all.',
  grows: 'It does not converge: the spread grows. Look for a group that loses charge by itself.',
};

/** Balance charges still to come: '1 (1–2)'; in its place the sentence that it does not converge. */
export function forecastWords(forecast: BalanceForecastDto): { converges: boolean; text: string } {
  if (forecast.doesNotConverge) return { converges: false, text: notConverging[forecast.doesNotConverge] };
  if (!forecast.charges) return { converges: true, text: 'not known yet' };
  const [low, likely, high] = [forecast.charges.p10, forecast.charges.p50, forecast.charges.p90].map(Math.round);
  return { converges: true, text: low === high ? String(likely) : `${likely} (${low}${EN_DASH}${high})` };
}
