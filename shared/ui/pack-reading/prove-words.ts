/** What the readings after the fit prove, in words. Pure. */
import type { PackDto } from '@/shared/contract/pack';
import { readingName, type PackReadingDto } from '@/shared/contract/pack-reading';
import type { BalanceForecastDto, RepairDto } from '@/shared/contract/repair';
import { NBSP, type LocaleMarks } from '../format/marks';
import { shortest } from '../format/number';
import { bandBeside, millivolts, wholeRange } from '../format/quantities';

/** Readings that count, the first first. */
export const spreadLog = (readings: readonly PackReadingDto[]): PackReadingDto[] =>
  readings.filter(({ setAside }) => setAside === null).sort((a, b) => Date.parse(a.at) - Date.parse(b.at));

/** The reading after the fit against what was expected of it; null: one of the two is missing. */
export function fitVerdict(
  log: readonly PackReadingDto[],
  expected: RepairDto['expectedAfterFit'],
): { good: boolean; text: string } | null {
  const fit = log.filter(({ stage }) => stage === 'after-fit').at(-1);
  if (!fit || !expected) return null;
  const spread = fit.spreadMillivolts;
  const band = wholeRange(expected.low, expected.high);
  const said = `${millivolts(spread / 1000)} after the fit, ${band}${NBSP}mV expected`;
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
  const { p10, p50, p90 } = forecast.charges;
  return { converges: true, text: `${Math.round(p50)}${bandBeside(p50, p10, p90)}` };
}

/** Where the forecast comes from, and what one balance charge is taken as; null: nothing is forecast. */
export function forecastFrom(
  { from, charges, hoursPerCharge }: BalanceForecastDto,
  { bleedAmps }: Pick<PackDto, 'bleedAmps'>,
  marks: LocaleMarks,
): string | null {
  if (from === null || !charges || charges.p90 === 0) return null;
  const bleed =
    bleedAmps === null ? 'the usual bleed current' : `a bleed current of ${shortest(bleedAmps, 3, marks)}${NBSP}A`;
  const by = { bleed, log: 'what the last ones took off', both: `${bleed} and what the last ones took off` }[from];
  return `By ${by}, each with ${hoursPerCharge}${NBSP}h on the charger.`;
}

/** One bar of the picture. */
export interface SpreadBar {
  key: string;
  /** 'Balance charge 2' */
  name: string;
  /** 'bal. 2' */
  short: string;
  /** When it was read, an instant; null: it is expected. */
  at: string | null;
  /** mV; of what was read all three alike. */
  spread: { p10: number; p50: number; p90: number };
}

const shortName = ({ stage, balanceCount }: Pick<PackReadingDto, 'stage' | 'balanceCount'>): string =>
  stage === 'arrival' ? 'arrival' : stage === 'after-fit' ? 'fit' : `bal. ${balanceCount ?? 1}`;

/** Further balance charges than these are a count, no picture. */
const MOST_EXPECTED = 5;

/** What was read, the first first, then what is expected after each of the next balance charges. */
export function spreadBars(log: readonly PackReadingDto[], forecast: BalanceForecastDto | null): SpreadBar[] {
  const read = log.map((reading): SpreadBar => {
    const { id, at, spreadMillivolts: mv } = reading;
    return {
      key: id,
      name: readingName(reading),
      short: shortName(reading),
      at,
      spread: { p10: mv, p50: mv, p90: mv },
    };
  });
  const count = Math.max(0, ...log.map(({ balanceCount }) => balanceCount ?? 0));
  const expected = (forecast?.expectedMillivolts ?? []).slice(0, MOST_EXPECTED).map((spread, place): SpreadBar => {
    const next = { stage: 'after-balance', balanceCount: count + place + 1 } as const;
    return { key: `expected ${place}`, name: readingName(next), short: shortName(next), at: null, spread };
  });
  return [...read, ...expected];
}
